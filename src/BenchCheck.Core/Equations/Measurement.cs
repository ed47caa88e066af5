namespace BenchCheck.Core.Equations;

/// <summary>How a meter is connected to a compiled network: between two unknowns, with its loading or its test current.</summary>
/// <param name="High">index in x of the unknown that is read; −1 for the reference</param>
/// <param name="Low">index in x of the one it is read against; −1 for the reference</param>
/// <param name="LoadSiemens">conductance of a voltmeter between the two; zero for none</param>
/// <param name="TestAmperes">current of an ohmmeter into High, out of Low; the reading is then volts over amperes; zero for none</param>
public readonly record struct Measurement(int High, int Low, double LoadSiemens = 0, double TestAmperes = 0);
