namespace BenchCheck.Core.Quantities;

/// <summary>A value read from text, or the reason why there is none. Exactly one of the two is set.</summary>
public readonly record struct Parsed<T>
{
    private readonly T? value;

    private Parsed(T? value, TextFault? fault)
    {
        this.value = value;
        Fault = fault;
    }

    /// <summary>Null when the text was understood.</summary>
    public TextFault? Fault { get; }

    public bool IsValue => Fault is null;

    /// <exception cref="InvalidOperationException">the text was not understood</exception>
    public T Value => Fault is null ? value! : throw new InvalidOperationException($"{Fault.Read}: expected {Fault.Expected}");

    public static implicit operator Parsed<T>(T value) => new(value, null);

    public static implicit operator Parsed<T>(TextFault fault) => new(default, fault);
}
