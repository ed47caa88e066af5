namespace BenchCheck.Core.Equations;

/// <summary>No combination of device states satisfies the equations of a board, or none was found within the stated number of steps.</summary>
public sealed class NoOperatingStateException(string message) : Exception(message)
{
    public NoOperatingStateException() : this("no operating state")
    {
    }

    public NoOperatingStateException(string message, Exception inner) : this($"{message} ({inner.Message})")
    {
    }
}
