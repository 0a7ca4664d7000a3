namespace EvapMonitor.Core.Properties;

/// <summary>Coefficients of IAPWS-IF97 region 2, residual part: R7-97(2012), table 11, for equation 17. Term k is Nk · π-factor^I[k] ·
/// τ-factor^J[k].</summary>
internal static class Region2Table
{
    public const double N1 = -1.7731742473213e-3; // I = 1, J = 0
    public const double N2 = -1.7834862292358e-2; // I = 1, J = 1
    public const double N3 = -4.5996013696365e-2; // I = 1, J = 2
    public const double N4 = -5.7581259083432e-2; // I = 1, J = 3
    public const double N5 = -5.032527872793e-2; // I = 1, J = 6
    public const double N6 = -3.3032641670203e-5; // I = 2, J = 1
    public const double N7 = -1.8948987516315e-4; // I = 2, J = 2
    public const double N8 = -3.9392777243355e-3; // I = 2, J = 4
    public const double N9 = -4.3797295650573e-2; // I = 2, J = 7
    public const double N10 = -2.6674547914087e-5; // I = 2, J = 36
    public const double N11 = 2.0481737692309e-8; // I = 3, J = 0
    public const double N12 = 4.3870667284435e-7; // I = 3, J = 1
    public const double N13 = -3.227767723857e-5; // I = 3, J = 3
    public const double N14 = -1.5033924542148e-3; // I = 3, J = 6
    public const double N15 = -4.0668253562649e-2; // I = 3, J = 35
    public const double N16 = -7.8847309559367e-10; // I = 4, J = 1
    public const double N17 = 1.2790717852285e-8; // I = 4, J = 2
    public const double N18 = 4.8225372718507e-7; // I = 4, J = 3
    public const double N19 = 2.2922076337661e-6; // I = 5, J = 7
    public const double N20 = -1.6714766451061e-11; // I = 6, J = 3
    public const double N21 = -2.1171472321355e-3; // I = 6, J = 16
    public const double N22 = -2.3895741934104e1; // I = 6, J = 35
    public const double N23 = -5.905956432427e-18; // I = 7, J = 0
    public const double N24 = -1.2621808899101e-6; // I = 7, J = 11
    public const double N25 = -3.8946842435739e-2; // I = 7, J = 25
    public const double N26 = 1.1256211360459e-11; // I = 8, J = 8
    public const double N27 = -8.2311340897998; // I = 8, J = 36
    public const double N28 = 1.9809712802088e-8; // I = 9, J = 13
    public const double N29 = 1.0406965210174e-19; // I = 10, J = 4
    public const double N30 = -1.0234747095929e-13; // I = 10, J = 10
    public const double N31 = -1.0018179379511e-9; // I = 10, J = 14
    public const double N32 = -8.0882908646985e-11; // I = 16, J = 29
    public const double N33 = 1.0693031879409e-1; // I = 16, J = 50
    public const double N34 = -3.3662250574171e-1; // I = 18, J = 57
    public const double N35 = 8.9185845355421e-25; // I = 20, J = 20
    public const double N36 = 3.0629316876232e-13; // I = 20, J = 35
    public const double N37 = -4.2002467698208e-6; // I = 20, J = 48
    public const double N38 = -5.9056029685639e-26; // I = 21, J = 21
    public const double N39 = 3.7826947613457e-6; // I = 22, J = 53
    public const double N40 = -1.2768608934681e-15; // I = 23, J = 39
    public const double N41 = 7.3087610595061e-29; // I = 24, J = 26
    public const double N42 = 5.5414715350778e-17; // I = 24, J = 40
    public const double N43 = -9.436970724121e-7; // I = 24, J = 58

    /// <summary>Exponents of the pressure factor, in the order of the table.</summary>
    public static readonly int[] I =
    [
        1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 3, 3, 3, 3, 3, 4, 4, 4, 5, 6, 6, 6, 7, 7, 7, 8, 8, 9, 10, 10, 10, 16, 16, 18, 20, 20, 20, 21, 22,
        23, 24, 24, 24
    ];

    /// <summary>Exponents of the temperature factor, in the order of the table.</summary>
    public static readonly int[] J =
    [
        0, 1, 2, 3, 6, 1, 2, 4, 7, 36, 0, 1, 3, 6, 35, 1, 2, 3, 7, 3, 16, 35, 0, 11, 25, 8, 36, 13, 4, 10, 14, 29, 50, 57, 20, 35, 48,
        21, 53, 39, 26, 40, 58
    ];

    /// <summary>The coefficients as a list, in the order of the table.</summary>
    public static readonly double[] N =
    [
        N1, N2, N3, N4, N5, N6, N7, N8, N9, N10, N11, N12, N13, N14, N15, N16, N17, N18, N19, N20, N21, N22, N23, N24, N25, N26, N27,
        N28, N29, N30, N31, N32, N33, N34, N35, N36, N37, N38, N39, N40, N41, N42, N43
    ];
}
