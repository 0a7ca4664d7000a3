namespace EvapMonitor.Simulator;

/// <summary>
/// How scale grows on a surface, as a rate equation on its resistance R: dR/dt = deposition·(q/q_ref) − removal·R. With no removal and no flux it grows at a
/// constant rate; with flux at a rate that follows the heat flux (at constant driving force the law of McCabe and Robinson 1924); with removal it levels off
/// (Kern and Seaton 1959).
/// </summary>
/// <param name="Deposition">m²·K/W per day.</param>
/// <param name="Removal">Share of R per day; 0: nothing goes off.</param>
/// <param name="FluxReference">Heat flux at which the deposition holds, W/m²; 0: it does not depend on the flux.</param>
public sealed record FoulingLaw(double Deposition, double Removal, double FluxReference)
{
    /// <summary>dR/dt = k.</summary>
    public static FoulingLaw Constant(double deposition) => new(deposition, 0, 0);

    /// <summary>dR/dt = k·q/q_ref.</summary>
    public static FoulingLaw WithFlux(double deposition, double fluxReference) => new(deposition, 0, fluxReference);

    /// <summary>dR/dt = k_d − k_r·R, given by k_d and the resistance k_d/k_r at which it levels off.</summary>
    public static FoulingLaw Levelling(double deposition, double level) => new(deposition, deposition / level, 0);

    /// <summary>The resistance a while later, m²·K/W: exact for a heat flux that stays as it is.</summary>
    /// <param name="resistance">Now, m²·K/W.</param>
    /// <param name="flux">Heat flux, W/m².</param>
    /// <param name="days">How much later.</param>
    public double After(double resistance, double flux, double days)
    {
        double deposition = FluxReference > 0 ? Deposition * flux / FluxReference : Deposition;
        if (Removal == 0) return resistance + (deposition * days);
        double level = deposition / Removal;
        return level + ((resistance - level) * double.Exp(-Removal * days));
    }
}

/// <summary>A heating surface: what it does clean, and how it fouls.</summary>
/// <param name="Name">Name of the body; of an effect that is its own body, the effect's.</param>
/// <param name="Clean">Coefficient with clean surfaces at the reference solids and flux, W/(m²·K).</param>
/// <param name="Law">How scale grows.</param>
/// <param name="AtStart">Resistance when the story begins, m²·K/W.</param>
public sealed record Surface(string Name, double Clean, FoulingLaw Law, double AtStart = 0)
{
    /// <summary>Solids of the leaving liquor at which <see cref="Clean"/> holds, mass fraction.</summary>
    public double SolidsReference { get; init; } = 1;

    /// <summary>Exponent of the solids in the clean coefficient; 0: it does not depend on them.</summary>
    public double SolidsExponent { get; init; }

    /// <summary>Coefficient, W/(m²·K), with a resistance (m²·K/W) and solids of the leaving liquor (mass fraction).</summary>
    public double Coefficient(double resistance, double solids)
    {
        double clean = solids > 0 ? Clean * double.Pow(solids / SolidsReference, SolidsExponent) : Clean;
        return 1 / ((1 / clean) + resistance);
    }
}
