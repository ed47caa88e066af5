namespace BenchCheck.Records;

/// <summary>The bench log cannot be used: where, why, and what to do, fit to be shown as it is.</summary>
public sealed class BenchLogException : IOException
{
    public BenchLogException()
    {
    }

    public BenchLogException(string message)
        : base(message)
    {
    }

    public BenchLogException(string message, Exception inner)
        : base(message, inner)
    {
    }
}
