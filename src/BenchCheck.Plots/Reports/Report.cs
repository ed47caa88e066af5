using System.Collections.Immutable;
using BenchCheck.Core.Checking;

namespace BenchCheck.Plots.Reports;

/// <summary>All that a report shows.</summary>
/// <param name="Settings">with which the check was made</param>
/// <param name="Inputs">the files that were read, as they were: board, readings, rates</param>
/// <param name="ProgramVersion">name and version of the program</param>
/// <param name="Time">of the check</param>
public sealed record Report(CheckResult Result, CheckSettings Settings, ImmutableArray<ReportInput> Inputs, string ProgramVersion, DateTimeOffset Time);

/// <summary>A file that was read.</summary>
/// <param name="Role">what it is: "Board file"</param>
/// <param name="Name">as the user gave it</param>
/// <param name="Text">all of it</param>
public sealed record ReportInput(string Role, string Name, string Text);
