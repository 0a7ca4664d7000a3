using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What became of a plant file.</summary>
/// <param name="Site">The site; null when there is any problem.</param>
/// <param name="Problems">Every problem, in file order; empty when the file is sound.</param>
/// <param name="Notes">What is not wrong but worth knowing, in file order.</param>
public sealed record PlantFileResult(Site? Site, IReadOnlyList<PlantFileProblem> Problems, IReadOnlyList<PlantFileNote> Notes);
