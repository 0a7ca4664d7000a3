namespace EvapMonitor.Core.Properties;

/// <summary>
/// Solids of a food by composition: Choi and Okos, "Effects of temperature and composition on the thermal properties of foods", Food Engineering and
/// Process Applications 1 (1986) 93 to 101; for -40 to 150 °C. Shares are mass fractions of the solids and add up to one.
/// </summary>
internal readonly record struct FoodSolids(double Protein, double Fat, double Carbohydrate, double Fibre, double Ash)
{
    /// <summary>Heat capacity of the solution, J/(kg·K): mass-weighted.</summary>
    public double HeatCapacity(double solids, double celsius) =>
        1000 * ((1 - solids) * Water.At(celsius) + solids * Solids.At(celsius));

    /// <summary>∫ from 0 °C of [cp(x) - cp(0)] dt, J/kg.</summary>
    public double ContentBesideWater(double solids, double celsius) =>
        1000 * solids * (Solids.Integral(celsius) - Water.Integral(celsius));

    /// <summary>Density of the solids, kg/m³. The densities are from memory of the same publication.</summary>
    public double SolidsDensity(double t) => 1 / (
        Protein / (1329.9 - 0.51840 * t) + Fat / (925.59 - 0.41757 * t) + Carbohydrate / (1599.1 - 0.31046 * t)
        + Fibre / (1311.5 - 0.36589 * t) + Ash / (2423.8 - 0.28063 * t));

    private Quadratic Solids => new(
        Protein * 2.0082 + Fat * 1.9842 + Carbohydrate * 1.5488 + Fibre * 1.8459 + Ash * 1.0926,
        Protein * 1.2089e-3 + Fat * 1.4733e-3 + Carbohydrate * 1.9625e-3 + Fibre * 1.8306e-3 + Ash * 1.8896e-3,
        -(Protein * 1.3129e-6 + Fat * 4.8008e-6 + Carbohydrate * 5.9399e-6 + Fibre * 4.6509e-6 + Ash * 3.6817e-6));

    private static Quadratic Water => new(4.1762, -9.0864e-5, 5.4731e-6);

    private readonly record struct Quadratic(double A, double B, double C)
    {
        public double At(double t) => A + t * (B + t * C);

        public double Integral(double t) => t * (A + t * (B / 2 + t * C / 3));
    }
}
