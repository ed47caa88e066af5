namespace BenchCheck.Core.Checking;

/// <summary>Verdict of one reading against its prediction.</summary>
public enum ReadingVerdict
{
    In,
    Doubtful,
    Out,
}

/// <summary>Verdict of the whole board.</summary>
public enum BoardVerdict
{
    Agrees,
    Undecided,
    Disagrees,
}

/// <summary>How far the readings determined a parameter: its posterior against what the parts list already said.</summary>
public enum Determination
{
    No,
    Partly,
    Yes,
}
