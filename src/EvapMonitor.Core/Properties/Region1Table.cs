namespace EvapMonitor.Core.Properties;

/// <summary>Coefficients of IAPWS-IF97 region 1: R7-97(2012), table 2, for equation 7. Term k is Nk · π-factor^I[k] · τ-factor^J[k].</summary>
internal static class Region1Table
{
    public const double N1 = 1.4632971213167e-1; // I = 0, J = -2
    public const double N2 = -8.4548187169114e-1; // I = 0, J = -1
    public const double N3 = -3.756360367204; // I = 0, J = 0
    public const double N4 = 3.3855169168385; // I = 0, J = 1
    public const double N5 = -9.5791963387872e-1; // I = 0, J = 2
    public const double N6 = 1.5772038513228e-1; // I = 0, J = 3
    public const double N7 = -1.6616417199501e-2; // I = 0, J = 4
    public const double N8 = 8.1214629983568e-4; // I = 0, J = 5
    public const double N9 = 2.8319080123804e-4; // I = 1, J = -9
    public const double N10 = -6.0706301565874e-4; // I = 1, J = -7
    public const double N11 = -1.8990068218419e-2; // I = 1, J = -1
    public const double N12 = -3.2529748770505e-2; // I = 1, J = 0
    public const double N13 = -2.1841717175414e-2; // I = 1, J = 1
    public const double N14 = -5.283835796993e-5; // I = 1, J = 3
    public const double N15 = -4.7184321073267e-4; // I = 2, J = -3
    public const double N16 = -3.0001780793026e-4; // I = 2, J = 0
    public const double N17 = 4.7661393906987e-5; // I = 2, J = 1
    public const double N18 = -4.4141845330846e-6; // I = 2, J = 3
    public const double N19 = -7.2694996297594e-16; // I = 2, J = 17
    public const double N20 = -3.1679644845054e-5; // I = 3, J = -4
    public const double N21 = -2.8270797985312e-6; // I = 3, J = 0
    public const double N22 = -8.5205128120103e-10; // I = 3, J = 6
    public const double N23 = -2.2425281908e-6; // I = 4, J = -5
    public const double N24 = -6.5171222895601e-7; // I = 4, J = -2
    public const double N25 = -1.4341729937924e-13; // I = 4, J = 10
    public const double N26 = -4.0516996860117e-7; // I = 5, J = -8
    public const double N27 = -1.2734301741641e-9; // I = 8, J = -11
    public const double N28 = -1.7424871230634e-10; // I = 8, J = -6
    public const double N29 = -6.8762131295531e-19; // I = 21, J = -29
    public const double N30 = 1.4478307828521e-20; // I = 23, J = -31
    public const double N31 = 2.6335781662795e-23; // I = 29, J = -38
    public const double N32 = -1.1947622640071e-23; // I = 30, J = -39
    public const double N33 = 1.8228094581404e-24; // I = 31, J = -40
    public const double N34 = -9.3537087292458e-26; // I = 32, J = -41

    /// <summary>Exponents of the pressure factor, in the order of the table.</summary>
    public static readonly int[] I =
    [
        0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 3, 3, 3, 4, 4, 4, 5, 8, 8, 21, 23, 29, 30, 31, 32
    ];

    /// <summary>Exponents of the temperature factor, in the order of the table.</summary>
    public static readonly int[] J =
    [
        -2, -1, 0, 1, 2, 3, 4, 5, -9, -7, -1, 0, 1, 3, -3, 0, 1, 3, 17, -4, 0, 6, -5, -2, 10, -8, -11, -6, -29, -31, -38, -39, -40,
        -41
    ];

    /// <summary>The coefficients as a list, in the order of the table.</summary>
    public static readonly double[] N =
    [
        N1, N2, N3, N4, N5, N6, N7, N8, N9, N10, N11, N12, N13, N14, N15, N16, N17, N18, N19, N20, N21, N22, N23, N24, N25, N26, N27,
        N28, N29, N30, N31, N32, N33, N34
    ];
}
