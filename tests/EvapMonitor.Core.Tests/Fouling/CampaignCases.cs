using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>What happened while the surface was out of production.</summary>
internal enum HappenedKind
{
    UnloggedCleaning,
    Stop,
    FailedLoggedCleaning,
    ProductChange,
    LoadChange,
    LoggedCleaning,
}

/// <summary>What a year of happenings was taken for.</summary>
/// <param name="Kind">What happened.</param>
/// <param name="Rise">True rise of ln U, conditions apart.</param>
/// <param name="Standard">Its standard uncertainty as stated; NaN without a test.</param>
/// <param name="TakenFor">The cleaning it was taken for; null for a stop.</param>
/// <param name="Why">The reason of a stop.</param>
internal sealed record Happening(HappenedKind Kind, double Rise, double Standard, SurfaceCleaning? TakenFor, string Why);

/// <summary>Surfaces with a past from which to learn, and then a mixture of happenings some days apart.</summary>
internal static class CampaignCases
{
    public static IReadOnlyList<Happening> Year(int state, int happenings)
    {
        (SimulatedSurface surface, List<(HappenedKind Kind, long At, double Rise)> happened) = Make(state, happenings);
        SurfaceHistory history = surface.History();
        return [.. happened.Select(one =>
        {
            SurfaceCleaning? cleaning = history.Cleanings.SingleOrDefault(found => found.Start == one.At);
            SurfaceStop? stop = history.Stops.SingleOrDefault(found => found.Start == one.At);
            return new Happening(one.Kind, one.Rise, (cleaning?.Test ?? stop?.Test)?.Rise.Random ?? double.NaN, cleaning, stop?.Reason ?? "");
        })];
    }

    /// <summary>The surface, with what happened to it.</summary>
    public static (SimulatedSurface Surface, List<(HappenedKind Kind, long At, double Rise)> Happened) Make(int state, int happenings)
    {
        var random = new Random(state);
        var surface = new SimulatedSurface(state)
        {
            Season = 8, SlowShare = 0.2, LoadVaries = 0.04, ConstantDrivingForce = state % 2 == 1,
            DutyNoise = 0.01 + (0.02 * random.NextDouble()), StatedRandom = 0.005, Growth = 1e-5 + (2e-5 * random.NextDouble()),
        };
        for (int campaign = 0; campaign < 6; campaign++)
        {
            Set(surface, campaign % 2 == 1);
            surface.Load = campaign == 4 ? 0.8 : 1;
            surface.Produce(168);
            surface.CleanFor(4);
        }

        var happened = new List<(HappenedKind Kind, long At, double Rise)>();
        for (int k = 0; k < happenings; k++)
        {
            surface.Produce(random.Next(80, 200));
            // Beyond so much scale the plant cleans, whatever else was to come.
            HappenedKind kind = surface.Resistance > 4e-4 ? HappenedKind.LoggedCleaning : (HappenedKind)random.Next(6);
            double before = surface.Resistance, clean = surface.Truth[^1].Clean;
            happened.Add((kind, surface.Now, 0));
            double hours = 1.5 + (8 * random.NextDouble());
            switch (kind)
            {
                case HappenedKind.UnloggedCleaning: surface.CleanFor(hours, 0.3 + (0.7 * random.NextDouble()), logged: false); break;
                case HappenedKind.LoggedCleaning: surface.CleanFor(hours, 0.8 + (0.2 * random.NextDouble())); break;
                case HappenedKind.FailedLoggedCleaning: surface.CleanFor(hours, 0); break;
                case HappenedKind.ProductChange:
                    surface.Stand(hours);
                    Set(surface, surface.Product == "A");
                    break;
                case HappenedKind.LoadChange:
                    surface.Stand(hours);
                    surface.Load = surface.Load < 0.9 ? 1 : 0.8;
                    break;
                default: surface.Stand(hours); break;
            }

            happened[^1] = happened[^1] with { Rise = double.Log(((1 / clean) + before) / ((1 / clean) + surface.Resistance)) };
        }

        surface.Produce(48);
        return (surface, happened);
    }

    /// <summary>A surface on which everything happens at random: three products with and without stops between them, cleanings of all kinds, recalibrations.</summary>
    public static SimulatedSurface Jumble(int state)
    {
        var random = new Random(state);
        var surface = new SimulatedSurface(state) { Product = "A" };
        for (int k = 0; k < 25; k++)
        {
            surface.Produce(random.Next(5, 120));
            switch (random.Next(6))
            {
                case 0: surface.CleanFor(3, random.NextDouble(), logged: random.Next(2) == 0); break;
                case 1: surface.Stand(random.Next(1, 6)); break;
                case 2: surface.CleanFor(4); break;
                case 3: surface.Events.Add(new SurfaceEvent(surface.Now, surface.Now, SurfaceEventKind.Recalibration, "", null)); break;
                default:
                    int product = random.Next(3);
                    (surface.Product, surface.Clean) = ("ABC"[product].ToString(), 2000 + (500 * product));
                    break;
            }
        }

        surface.Produce(30);
        return surface;
    }

    private static void Set(SimulatedSurface surface, bool other)
    {
        surface.Product = other ? "B" : "A";
        surface.Clean = other ? 2000 : 2500;
    }
}
