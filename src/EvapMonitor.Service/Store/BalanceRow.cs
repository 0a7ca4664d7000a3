using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using EvapMonitor.Core.Balances;

namespace EvapMonitor.Service.Store;

/// <summary>A balance in the form in which it is stored: lists of lists as one row of numbers, each list ended by −1; variables by name.</summary>
internal static class BalanceRow
{
    private static readonly Dictionary<string, VariableKind> Kinds = Enum.GetValues<VariableKind>().ToDictionary(NameOf, StringComparer.Ordinal);

    /// <summary>The plain name of a variable: feed_flow, leaving_solids N2, liquor_flow N1 to N2.</summary>
    public static string NameOf(VariableKey key) => key.Place.Length == 0 ? NameOf(key.Kind) : $"{NameOf(key.Kind)} {key.Place}";

    /// <summary>The variable of a plain name; null when a later program no longer has it.</summary>
    public static VariableKey? KeyOf(string name)
    {
        int end = name.IndexOf(' ', StringComparison.Ordinal);
        return Kinds.TryGetValue(end < 0 ? name : name[..end], out VariableKind kind) ? new VariableKey(kind, end < 0 ? "" : name[(end + 1)..]) : null;
    }

    /// <summary>Lists in one row.</summary>
    public static short[] Row(IEnumerable<IReadOnlyList<int>> lists) => [.. lists.SelectMany(list => list.Select(one => (short)one).Append((short)-1))];

    /// <summary>The lists of a row.</summary>
    public static IReadOnlyList<IReadOnlyList<int>> Lists(short[] row)
    {
        var lists = new List<IReadOnlyList<int>>();
        var open = new List<int>();
        foreach (short one in row)
        {
            if (one >= 0)
            {
                open.Add(one);
                continue;
            }

            lists.Add([.. open]);
            open.Clear();
        }

        return lists;
    }

    /// <summary>Key of a layout: a number from its content, so that the same one is never kept twice.</summary>
    public static long KeyOf(BalanceLayout layout)
    {
        string content = string.Join('\n', layout.Variables.Select(NameOf).Concat(layout.Signals).Append(string.Join(' ', Row(layout.Instruments))));
        return BinaryPrimitives.ReadInt64BigEndian(SHA256.HashData(Encoding.UTF8.GetBytes(content)));
    }

    /// <summary>Numbers with seven figures, which is more than any of a balance has.</summary>
    public static float[] Short(double[] values) => Array.ConvertAll(values, value => (float)value);

    /// <summary>Back.</summary>
    public static double[] Long(float[] values) => Array.ConvertAll(values, value => (double)value);

    private static string NameOf(VariableKind kind) => JsonNamingPolicy.SnakeCaseLower.ConvertName(kind.ToString());
}
