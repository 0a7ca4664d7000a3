using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>The balances alone, fed with the enthalpies of the books, must give the books' figures to their printed digits.</summary>
public class WorkedExampleAlgebraTests
{
    private const double PerHour = 1.0 / 3600;

    [Fact]
    public void SingleEffect_BooksEnthalpies_GiveBooksFigures()
    {
        // Geankoplis, Transport Processes and Unit Operations, example 8.4-1. Datum 373.2 K, so the leaving liquor carries nothing; cp 4.14 kJ/(kg·K).
        const double feed = 9072 * PerHour, product = 6048 * PerHour, vapour = 3024 * PerHour, latent = 2257e3;
        double duty = HeatBalance.LiquorDuty(feed * 4140 * (311.0 - 373.2), product, 0, vapour, latent);
        Assert.Equal(2.545e6, duty, 0.0005e6);
        Assert.Equal(1704, HeatBalance.Coefficient(duty, 149.3, 383.2 - 373.2), 0.7);
        // The book's steam flow of 4108 kg/h gives up that heat at its latent heat of 2230 kJ/kg.
        Assert.Equal(duty, HeatBalance.ChestDuty(4108 * PerHour, 2230e3, 0, 0), 0.001e6);
    }

    [Fact]
    public void SodiumHydroxide_BooksEnthalpies_GiveBooksFigures()
    {
        // Geankoplis, example 8.4-3: 4536 kg/h from 20 to 50 %, hf 214, hL 505, HV 2667 kJ/kg.
        const double feed = 4536 * PerHour, product = 1814 * PerHour, vapour = 2722 * PerHour;
        double duty = HeatBalance.LiquorDuty(feed * 214e3, product, 505e3, vapour, 2667e3);
        Assert.Equal(2.001e6, duty, 0.0005e6);
        Assert.Equal(1560, HeatBalance.Coefficient(duty, 49.2, 115.6 - 89.5), 2.0);
        Assert.Equal(0.836, 2722.0 / 3255, 0.0005);
    }

    [Fact]
    public void TripleEffect_BooksEnthalpies_GiveBooksFigures()
    {
        // Geankoplis, example 8.5-1 (problem from memory, figures recomputed so that they agree): duties of effects 1 to 3 from steam 8960 kg/h and the vapours,
        // with the latent heats as used there; areas and coefficients of the book.
        (double Steam, double Latent, double Duty, double Area, double Force, double Coefficient)[] effects =
        [
            (8960, 2200e3, 5.476e6, 104.6, 16.77, 3123), (5675, 2243e3, 3.539e6, 105.6, 16.87, 1987), (6053, 2293e3, 3.855e6, 104.9, 32.36, 1136),
        ];
        foreach (var effect in effects)
        {
            double duty = HeatBalance.ChestDuty(effect.Steam * PerHour, effect.Latent, 0, 0);
            // Flows and latent heats of the table are rounded to four figures: 0.1 %.
            Assert.Equal(effect.Duty, duty, 0.001 * effect.Duty);
            Assert.Equal(effect.Coefficient, HeatBalance.Coefficient(effect.Duty, effect.Area, effect.Force), 2.5);
        }
    }

    [Fact]
    public void SodiumHydroxideInPounds_BooksEnthalpies_GiveBooksFigures()
    {
        // McCabe and Smith, example 16.1 (problem from memory, recomputed): 20,000 lb/h from 20 to 50 %, hf 55, h 221, HV 1149 Btu/lb; latent heat 939 Btu/lb.
        double duty = HeatBalance.LiquorDuty(20_000 * 55, 8_000, 221, 12_000, 1149);
        Assert.Equal(14.456e6, duty, 0.0005e6);
        Assert.Equal(duty, HeatBalance.ChestDuty(15_400, 939, 0, 0), 0.01e6);
        Assert.Equal(250, HeatBalance.Coefficient(duty, 930, 259 - 197), 1.0);
    }
}
