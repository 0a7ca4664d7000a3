using System.Globalization;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Simulator;

/// <summary>
/// The invented plant of the demo: one line of four effects in forward feed with two bleeds, and the history that its instruments would have written.
/// The same start and seed always give the same readings.
/// </summary>
public static class DemoPlant
{
    private const int Seed = 20260301;
    private const double ZeroCelsius = 273.15;

    /// <summary>Name, heating surface (m²), coefficient with clean surfaces (W/(m²·K)), vapour drawn off for other users (kg/s) and who they are.</summary>
    private static readonly (string Name, double Area, double Clean, double Bleed, string To)[] Effects =
    [
        ("N1", 1450, 2900, 1.1, "heater"), ("N2", 1300, 2450, 2.2, "pans"), ("N3", 1300, 1850, 0, ""), ("N4", 1350, 980, 0, ""),
    ];

    /// <summary>Fouling of each effect: rate in m²·K/W per day, and the resistance it levels off at (0: it does not).</summary>
    private static readonly (double Rate, double Level)[] Fouling = [(2.0e-6, 0), (3.6e-6, 4.5e-5), (6.5e-6, 0), (2.1e-5, 0)];

    /// <summary>Days on which an effect was cleaned, and the share of the resistance that stayed.</summary>
    private static readonly (int Effect, double Day, double Left)[] Cleanings = [(3, 10, 0.06), (2, 17, 0.1)];

    /// <summary>Days of history.</summary>
    public const int Days = 28;

    /// <summary>The plant file, with the instant from which history is accepted.</summary>
    public static string PlantFile(DateTimeOffset start) => $$$"""
        # An invented plant. The program's documentation explains every member.
        site: Fennholm
        time-zone: Europe/Copenhagen
        atmosphere: 1013 mbar
        window: 5 min
        history-from: {{{start.UtcDateTime.AddDays(-1).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)}}}
        liquors:
          juice:
            kind: custom
            boiling-point-elevation: {polynomial: [0, 0.0178, 0.000622]}
            heat-capacity: {polynomial: [4190, -23.5]}
            density: {polynomial: [998, 3.9, 0.013]}
        lines:
          north:
            liquor: juice
            producing-when: {feed-flow-above: 60 t/h}
            required-evaporation: 118 t/h
            feed:
              flow:        {signal: N.FT-10, unit: t/h, accuracy: 1 %, range: [0, 300]}
              solids:      {signal: N.DT-10, unit: "%", accuracy: 0.15 abs}
              temperature: {signal: N.TT-10, unit: degC, accuracy: 0.5 abs}
            product:
              flow:   {signal: N.FT-90, unit: t/h, accuracy: 1 %}
              solids: {signal: N.DT-90, unit: "%", accuracy: 0.3 abs}
            steam:
              flow:     {signal: N.FT-01, unit: t/h, accuracy: 1.5 %}
              pressure: {signal: N.PT-01, unit: bar(g), accuracy: 0.01 abs, at: chest}
            effects:
        {{{string.Join("\n", Effects.Select((_, i) => EffectText(i)))}}}
            bleeds:
              - {from: N1, to: heater, flow: {signal: N1.FT-4, unit: t/h, accuracy: 3 %}}
              - {from: N2, to: pans, flow: {signal: N2.FT-4, unit: t/h, accuracy: 3 %}}
            cleaning-groups:
              circuit: {effects: [N1, N2, N3, N4], duration: 8 h}

        """;

    /// <summary>Writes the history as a wide CSV, a row every two minutes.</summary>
    /// <param name="text">Receives the file.</param>
    /// <param name="start">The first instant.</param>
    /// <param name="end">Rows before this are written.</param>
    public static void WriteHistory(TextWriter text, DateTimeOffset start, DateTimeOffset end)
    {
        ArgumentNullException.ThrowIfNull(text);
        var rating = new Rating(new LineGraph(Line()), new LineProperties(Juice()));
        OperatingPoint? point = null;
        var noise = new Noise(Seed);
        text.Write("time,N.FT-10,N.DT-10,N.TT-10,N.FT-90,N.DT-90,N.FT-01,N.PT-01,N1.FT-4,N2.FT-4");
        foreach (var (name, _, _, _, _) in Effects) text.Write($",{name}.PT-2,{name}.TT-2,{name}.TT-1,{name}.FT-3,{name}.DT-2");
        text.WriteLine();
        int step = 0;
        for (DateTimeOffset at = start; at < end; at = at.AddMinutes(2), step++)
        {
            double day = (at - start).TotalDays;
            text.Write(at.UtcDateTime.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));
            if (IsStopped(day)) WriteStopped(text, noise);
            else
            {
                RatingConditions conditions = ConditionsAt(day);
                RatingResult result = rating.Solve(conditions, point);
                point = result.Point ?? throw new InvalidOperationException(result.Reason);
                WriteRow(text, noise, point, conditions, day);
            }

            text.WriteLine();
        }
    }

    /// <summary>Instants of the cleanings: effect, start, end.</summary>
    public static IEnumerable<(string Effect, DateTimeOffset Start, DateTimeOffset End)> LoggedCleanings(DateTimeOffset start) =>
        Cleanings.Select(cleaning => (Effects[cleaning.Effect].Name, start.AddDays(cleaning.Day), start.AddDays(cleaning.Day).AddHours(8)));

    /// <summary>Fouling resistance of an effect after a time, m²·K/W.</summary>
    public static double ResistanceAt(int effect, double day)
    {
        (double rate, double level) = Fouling[effect];
        double grown = 0, at = 0;
        foreach ((_, double cleaned, double left) in Cleanings.Where(cleaning => cleaning.Effect == effect && cleaning.Day < day))
        {
            grown = Grow(grown, cleaned - at) * left;
            at = cleaned;
        }

        return Grow(grown, day - at);

        double Grow(double from, double days) => level == 0 ? from + (rate * days) : level - ((level - from) * double.Exp(-rate * days / level));
    }

    private static CustomLiquor Juice() => CustomLiquor.Create(
        "juice", new SolidsPolynomial([0, 0.0178, 0.000622]), new SolidsPolynomial([4190, -23.5]), new SolidsPolynomial([998, 3.9, 0.013]));

    private static bool IsStopped(double day) => Cleanings.Any(cleaning => day >= cleaning.Day && day < cleaning.Day + (8 / 24.0));

    /// <summary>The line without losses and vents, so that the coefficients put in are exactly those that the readings hold.</summary>
    private static Line Line() => new()
    {
        Name = "north",
        Liquor = new LiquorChoice(Juice(), null, new Dictionary<int, Liquor>()),
        Effects = [.. Effects.Select((effect, i) => new Effect
        {
            Name = effect.Name, Area = effect.Area, HeatLoss = new(0, 0), Vent = new(0, 0),
            Heating = [i == 0 ? HeatSource.Steam : new HeatSource(Effects[i - 1].Name)], Liquor = [i == 0 ? LiquorSource.Feed : new LiquorSource(Effects[i - 1].Name)],
        })],
        Bleeds = [.. Effects.Where(effect => effect.Bleed > 0).Select(effect => new Bleed(effect.Name, effect.To, null))],
    };

    private static RatingConditions ConditionsAt(double day) => new()
    {
        Coefficients = Effects.Select((effect, i) => (effect.Name, U: 1 / ((1 / effect.Clean) + ResistanceAt(i, day)))).ToDictionary(pair => pair.Name, pair => pair.U),
        SteamPressure = 1.40e5 + (2.5e3 * double.Sin(day * 2.1)) + (1.2e3 * double.Sin(day * 13.7)),
        LastVapourPressure = 1.95e4 + (4e2 * double.Sin(day * double.Tau)),
        FeedSolids = 0.135 + (0.004 * double.Sin(day * 0.9)),
        FeedTemperature = ZeroCelsius + 98 + (1.5 * double.Sin(day * 1.7)),
        ProductSolids = 0.58 + (0.006 * double.Sin(day * 3.3)),
        Bleeds = Effects.Where(effect => effect.Bleed > 0).ToDictionary(effect => VariableKey.Way(effect.Name, effect.To), effect => effect.Bleed),
    };

    private static void WriteRow(TextWriter text, Noise noise, OperatingPoint point, RatingConditions conditions, double day)
    {
        void Put(double value, double scatter) => text.Write(string.Create(CultureInfo.InvariantCulture, $",{value + (scatter * noise.Next()):0.####}"));
        const double tonsPerHour = 3.6;
        Put(point.FeedFlow * tonsPerHour, 0.9);
        Put(conditions.FeedSolids * 100, 0.03);
        Put(conditions.FeedTemperature - ZeroCelsius, 0.15);
        Put(point.ProductFlow * tonsPerHour, 0.25);
        Put(conditions.ProductSolids!.Value * 100, 0.08);
        Put(point.FreshSteam * tonsPerHour, 0.5);
        Put((conditions.SteamPressure!.Value - 101_300) / 1e5, 0.002);
        Put(Effects[0].Bleed * tonsPerHour, 0.05);
        Put(Effects[1].Bleed * tonsPerHour, 0.08);
        for (int i = 0; i < Effects.Length; i++)
        {
            EffectPoint effect = point.Effects[i];
            Put(effect.VapourPressure / 1e5, 0.001);
            Put(effect.BoilingTemperature - ZeroCelsius, 0.1);
            Put(effect.HeatingTemperature - ZeroCelsius, 0.1);
            // The condensate meter of N2 fails for half a day: the program must say so, not make up a number.
            if (i == 1 && day is > 22 and < 22.5) text.Write(",");
            else Put(effect.Condensate * tonsPerHour, 0.3);
            Put(effect.LeavingSolids * 100, 0.06);
        }
    }

    private static void WriteStopped(TextWriter text, Noise noise)
    {
        text.Write(string.Create(CultureInfo.InvariantCulture, $",0,,{25 + (0.1 * noise.Next()):0.##},0,,0,{-0.9 + (0.002 * noise.Next()):0.####},0,0"));
        for (int i = 0; i < Effects.Length; i++) text.Write(string.Create(CultureInfo.InvariantCulture, $",{1 + (0.002 * noise.Next()):0.####},25,25,0,"));
    }

    private static string EffectText(int i)
    {
        string name = Effects[i].Name, heating = i == 0 ? "steam" : $"vapour of {Effects[i - 1].Name}", from = i == 0 ? "feed" : Effects[i - 1].Name;
        string limit = i == 3 ? "{coefficient-below: 720 W/(m2.K), cleanliness-below: 70 %, hours-since-cleaning: 900}" : "{cleanliness-below: 75 %}";
        return string.Create(CultureInfo.InvariantCulture, $$$"""
                  - name: {{{name}}}
                    heating: {{{heating}}}
                    liquor: {{{from}}}
                    area: {{{Effects[i].Area}}} m2
                    clean-coefficient: {{{Effects[i].Clean}}} W/(m2.K)
                    heat-loss: 0 %
                    vent: 0 %
                    vapour: {pressure: {signal: {{{name}}}.PT-2, unit: bar, accuracy: 0.003 abs, range: [0, 4]}}
                    chest:
                      temperature: {signal: {{{name}}}.TT-1, unit: degC, accuracy: 0.3 abs, sees: saturation}
                      condensate-flow: {signal: {{{name}}}.FT-3, unit: t/h, accuracy: 2 %}
                    leaving:
                      temperature: {signal: {{{name}}}.TT-2, unit: degC, accuracy: 0.3 abs, sees: flashed-liquor}
                      solids: {signal: {{{name}}}.DT-2, unit: "%", accuracy: 0.3 abs}
                    due-when: {{{limit}}}
            """);
    }
}
