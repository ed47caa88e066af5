using BenchCheck.Core.Quantities;

namespace BenchCheck.Core.Boards;

/// <summary>One number of a part and what the parts list says of it.</summary>
public sealed record PartParameter(ParameterKind Kind, Nominal Nominal);
