using System.Reflection;
using System.Xml.Linq;

namespace EvapMonitor.Core.Tests.Code;

/// <summary>Rules about the code itself.</summary>
public class StationTests
{
    private static readonly Assembly Core = typeof(LineEvaluation).Assembly;

    /// <summary>The stations in the order of the journey; Plant, Properties and Readings are known to all and know none.</summary>
    private static readonly string[] Stations = ["Conditioning", "Balances", "Coefficients", "Fouling", "Outlook", "Advice"];

    [Fact]
    public void Station_NeverUsesALaterOne()
    {
        var offences = new List<string>();
        foreach (Type type in Core.GetTypes())
        {
            foreach (Type used in UsedBy(type))
            {
                if (Rank(used) > Rank(type)) offences.Add($"{type.FullName} uses {used.FullName}");
            }
        }

        Assert.Empty(offences.Distinct());
    }

    [Fact]
    public void UsesAreSeen()
    {
        // The rule above holds only as long as uses are found at all: this one is real.
        Assert.Contains(typeof(EvapMonitor.Core.Balances.Reconciliation), UsedBy(typeof(EvapMonitor.Core.Coefficients.BalanceQuantities)));
        Assert.True(Rank(typeof(EvapMonitor.Core.Coefficients.BalanceQuantities)) > Rank(typeof(EvapMonitor.Core.Balances.Reconciliation)));
    }

    [Fact]
    public void Core_RefersToNothingButTheBaseLibraryAndMathNet()
    {
        string[] foreign = [.. Core.GetReferencedAssemblies().Select(name => name.Name!)
            .Where(name => !name.StartsWith("System.", StringComparison.Ordinal) && name is not "MathNet.Numerics" and not "netstandard")];
        Assert.Empty(foreign);
        string[] worldly = ["System.Net", "System.IO.FileSystem", "System.Text.Json", "System.Console", "System.Diagnostics.Process", "System.Data"];
        Assert.DoesNotContain(Core.GetReferencedAssemblies(), name => worldly.Any(one => name.Name!.StartsWith(one, StringComparison.Ordinal)));
    }

    [Fact]
    public void PublicTypesAndMembers_AreDocumented()
    {
        var documented = XDocument.Load(Path.ChangeExtension(Core.Location, ".xml")).Descendants("member").Select(member => (string)member.Attribute("name")!).ToHashSet();
        string[] silent = [.. Core.GetExportedTypes().Select(type => "T:" + type.FullName!.Replace('+', '.')).Where(name => !documented.Contains(name))];
        Assert.Empty(silent);
    }

    private static int Rank(Type type)
    {
        // What joins the stations stands at the root and may use all of them.
        if (type.Namespace is not { } space || !space.StartsWith("EvapMonitor.Core", StringComparison.Ordinal)) return -1;
        if (space == "EvapMonitor.Core") return type == typeof(LineEvaluation) || type.FullName!.Contains("LineEvaluation", StringComparison.Ordinal) ? int.MaxValue : -1;
        return Array.IndexOf(Stations, space.Split('.')[2]);
    }

    private static IEnumerable<Type> UsedBy(Type type)
    {
        const BindingFlags all = BindingFlags.DeclaredOnly | BindingFlags.Public | BindingFlags.NonPublic | BindingFlags.Instance | BindingFlags.Static;
        IEnumerable<Type> used = type.GetFields(all).Select(field => field.FieldType).Append(type.BaseType ?? typeof(object)).Concat(type.GetInterfaces());
        foreach (MethodBase method in type.GetMethods(all).Cast<MethodBase>().Concat(type.GetConstructors(all)))
        {
            used = used.Concat(method.GetParameters().Select(parameter => parameter.ParameterType));
            if (method is MethodInfo info) used = used.Append(info.ReturnType);
            if (method.GetMethodBody() is { } body) used = used.Concat(body.LocalVariables.Select(local => local.LocalType)).Concat(Called(method, body));
        }

        return used.SelectMany(Parts);
    }

    /// <summary>Types whose members a method's code names: the four bytes after call, callvirt, newobj, ldsfld and ldfld are a token.</summary>
    private static IEnumerable<Type> Called(MethodBase method, MethodBody body)
    {
        byte[] code = body.GetILAsByteArray() ?? [];
        for (int i = 0; i + 4 < code.Length; i++)
        {
            if (code[i] is not (0x28 or 0x6F or 0x73 or 0x7E or 0x7B)) continue;
            Type? named = null;
            try
            {
                named = method.Module.ResolveMember(BitConverter.ToInt32(code, i + 1), method.DeclaringType?.GetGenericArguments(), method.IsGenericMethod ? method.GetGenericArguments() : null)?.DeclaringType;
            }
            catch (Exception error) when (error is ArgumentException or BadImageFormatException)
            {
                // Not a token: some other instruction's operand.
            }

            if (named is not null) yield return named;
        }
    }

    private static IEnumerable<Type> Parts(Type type)
    {
        yield return type.HasElementType ? type.GetElementType()! : type;
        foreach (Type argument in type.GetGenericArguments()) yield return argument;
    }
}
