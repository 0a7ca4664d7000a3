using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>
/// A surface whose truth is known: 1/U = 1/U_clean(solids, boiling temperature, flux) + R, R growing with the hours. Each hour's duty is read with an error that enters
/// coefficient and flux alike.
/// </summary>
internal sealed class SimulatedSurface(int state)
{
    public const double FluxAtFullLoad = 30_000, SolidsUsual = 0.4, BoilingUsual = 350;

    private readonly Gaussian _noise = new(state);
    private double _load, _solids, _boiling, _slow;

    /// <summary>1 January 2026.</summary>
    public long Now { get; set; } = 1_767_225_600_000;

    public double Clean { get; set; } = 2500;

    public double[] Slopes { get; set; } = [-0.5, 0.012, 0.2];

    /// <summary>Growth, m²·K/W per day.</summary>
    public double Growth { get; set; } = 1.5e-5;

    public double Resistance { get; set; }

    /// <summary>Standard deviation of an hour's duty, and the part of its square that lasts for hours.</summary>
    public double DutyNoise { get; set; } = 0.02;

    public double SlowShare { get; set; }

    /// <summary>What the hour says its random part is.</summary>
    public double StatedRandom { get; set; } = 0.01;

    public double LoadVaries { get; set; } = 0.05;

    public double SolidsVary { get; set; } = 0.03;

    public double BoilingVaries { get; set; } = 1;

    /// <summary>Half the swing of the boiling temperature over the year.</summary>
    public double Season { get; set; }

    public double Load { get; set; } = 1;

    public string Product { get; set; } = "";

    /// <summary>True: the driving force stays and the flux follows the coefficient. False: the flux follows the load.</summary>
    public bool ConstantDrivingForce { get; set; }

    public bool WithFeed { get; set; } = true;

    public List<SurfaceHour> Hours { get; } = [];

    public List<SurfaceHour> Water { get; } = [];

    public List<SurfaceSpan> Spans { get; } = [];

    public List<SurfaceEvent> Events { get; } = [];

    /// <summary>The true clean coefficient and cleanliness of each hour.</summary>
    public List<(double Clean, double Cleanliness, double Resistance)> Truth { get; } = [];

    public SurfaceHistory History(double? design = null, SurfaceSettings? settings = null) =>
        SurfaceHistory.Of(settings ?? new SurfaceSettings(design), Hours, Water, Spans, Events);

    public void Produce(int hours)
    {
        for (int i = 0; i < hours; i++, Now += Milliseconds.Hour) ProduceOne();
    }

    public void Stand(double hours, SpanKind kind = SpanKind.Standing)
    {
        long end = Now + (long)(hours * Milliseconds.Hour);
        Spans.Add(new SurfaceSpan(Now, end, kind));
        Now = end + Milliseconds.Modulo(-end, Milliseconds.Hour);
    }

    /// <summary>Stands, is cleaned by a share, and says so in the log or not.</summary>
    public void CleanFor(double hours, double removes = 1, bool logged = true, string word = "boil-out")
    {
        if (logged) Events.Add(new SurfaceEvent(Now, Now + (long)(hours * Milliseconds.Hour), SurfaceEventKind.Cleaning, word, new Guid(Events.Count + 1, 0, 0, new byte[8])));
        Stand(hours);
        Resistance *= 1 - removes;
    }

    private void ProduceOne()
    {
        _load = Wander(_load, 0.8);
        _solids = Wander(_solids, 0.9);
        _boiling = Wander(_boiling, 0.9);
        _slow = Wander(_slow, 0.95);
        double day = (Now % Milliseconds.Day) / (double)Milliseconds.Day, year = Now / (365.25 * Milliseconds.Day);
        double solids = SolidsUsual * double.Exp(SolidsVary * _solids);
        double boiling = BoilingUsual + (BoilingVaries * (_boiling + double.Sin(double.Tau * day))) + (Season * double.Sin(double.Tau * year));
        double wanted = FluxAtFullLoad * Load * double.Exp(LoadVaries * _load);
        Resistance += Growth / 24;
        double atConditions = Clean * double.Exp((Slopes[0] * double.Log(solids / SolidsUsual)) + (Slopes[1] * (boiling - BoilingUsual)));
        double flux = wanted, clean = 0, coefficient = 0;
        for (int step = 0; step < 60; step++)
        {
            clean = atConditions * double.Pow(flux / FluxAtFullLoad, Slopes[2]);
            coefficient = 1 / ((1 / clean) + Resistance);
            if (!ConstantDrivingForce) break;
            flux = coefficient * wanted / Clean;
        }

        double duty = double.Exp(DutyNoise * ((double.Sqrt(1 - SlowShare) * _noise.Next()) + (double.Sqrt(SlowShare) * _slow)));
        double feed = 10 * flux / FluxAtFullLoad * double.Exp(0.005 * _noise.Next());
        Hours.Add(new SurfaceHour(Now, "N1", Product, 12, new Measured(coefficient * duty, 0.02 * coefficient, StatedRandom * coefficient), flux / coefficient, boiling, solids, flux * duty, WithFeed ? feed : double.NaN));
        Truth.Add((clean, coefficient / clean, Resistance));
    }

    private double Wander(double from, double correlation) => (correlation * from) + (double.Sqrt(1 - (correlation * correlation)) * _noise.Next());
}
