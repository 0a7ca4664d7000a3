namespace EvapMonitor.Service.PlantFile;

/// <summary>One thing that is wrong in a plant file. A file with any problem gives no site: nothing is half applied.</summary>
/// <param name="Line">Line in the file, 1 or more.</param>
/// <param name="Column">Column in that line, 1 or more.</param>
/// <param name="Path">Where it stands, such as <c>lines.north.effects[0].area</c>; empty for the file as a whole.</param>
/// <param name="Found">What was found there.</param>
/// <param name="Allowed">What is allowed there.</param>
public sealed record PlantFileProblem(int Line, int Column, string Path, string Found, string Allowed)
{
    /// <summary>The problem in one line, as compilers write it, so that editors can jump to it.</summary>
    /// <param name="fileName">The name of the plant file as the person gave it.</param>
    public string ToLine(string fileName) =>
        Invariant($"{fileName}:{Line}:{Column} {(Path.Length == 0 ? "file" : Path)}: found {Found}; allowed: {Allowed}");
}

/// <summary>Something that a reader of the plant file should know though it is not wrong, such as an assumed accuracy.</summary>
/// <param name="Line">Line in the file, 1 or more.</param>
/// <param name="Column">Column in that line, 1 or more.</param>
/// <param name="Path">Where it stands.</param>
/// <param name="Text">The note, one sentence.</param>
public sealed record PlantFileNote(int Line, int Column, string Path, string Text)
{
    /// <summary>The note in one line, in the form of <see cref="PlantFileProblem.ToLine"/>.</summary>
    /// <param name="fileName">The name of the plant file as the person gave it.</param>
    public string ToLine(string fileName) => Invariant($"{fileName}:{Line}:{Column} {Path}: {Text}");
}
