using System.CommandLine;
using BenchCheck.Benchmarks.Scoreboard.Cases;
using BenchCheck.Benchmarks.Scoreboard.Faults;
using BenchCheck.Benchmarks.Scoreboard.Physics;

namespace BenchCheck.Benchmarks.Scoreboard;

/// <summary>Checks of the truth generator itself, so that a mistake in it is not taken for one of the program under test.</summary>
public static class TruthCheck
{
    private const double RelativeLimit = 1e-10;
    private const double FloorAmperes = 1e-14;
    private const int Boards = 8000;

    public static Command Command
    {
        get
        {
            var command = new Command("truth-check", "Check the truth generator against a closed form and Kirchhoff's current law.");
            command.SetAction(_ => ClosedForm(Console.Out) & EarlyEffect(Console.Out) & Kirchhoff(Console.Out) ? 0 : 1);
            return command;
        }
    }

    /// <summary>
    /// A source, a resistor and a diode in series: i = (nV_T/R) W(I_s R/(nV_T) · exp((V + I_s R)/(nV_T))) − I_s
    /// with W(x)·exp(W(x)) = x (Corless et al., "On the Lambert W function", Adv. Comput. Math. 5 (1996)).
    /// </summary>
    private static bool ClosedForm(TextWriter output)
    {
        var worst = 0.0;
        var solver = new TruthSolver();
        foreach (var volts in new[] { -5, -0.3, 0.2, 0.6, 1, 5, 12, 24 })
        {
            foreach (var ohms in new[] { 10, 1e3, 100e3, 10e6 })
            {
                foreach (var slope in new[] { 0.02569, 0.045 })
                {
                    const double sourceOhms = 0.05, seriesOhms = 0.5;
                    var law = new Junction(1e-3, 0.65, slope);
                    var circuit = new TruthCircuit("0");
                    var (supply, anode) = (circuit.Node("S"), circuit.Node("A"));
                    circuit.AddSource(supply, -1, volts, sourceOhms);
                    circuit.AddResistor(supply, anode, ohms);
                    circuit.AddDiode(anode, -1, law, seriesOhms);
                    var solution = solver.Solve(circuit, Load.None);
                    var found = solution.Between(supply, anode) / ohms;
                    var expected = Current(volts, ohms + sourceOhms + seriesOhms, 1e-3 * Math.Exp(-0.65 / slope), slope);

                    // What leaks away at the diode's two nodes passes the resistor too, or is taken from the diode.
                    var leakage = 2 * TruthCircuit.LeakageSiemens * Math.Abs(solution.Between(anode, -1));
                    worst = Math.Max(worst, Math.Abs(found - expected) / (RelativeLimit * Math.Abs(expected) + leakage + FloorAmperes));
                }
            }
        }

        output.WriteLine($"diode and resistor against Lambert W: worst difference {worst:G3} of the limit ({RelativeLimit:G1} of the current + leakage + {FloorAmperes:G1} A)");
        return worst <= 1;
    }

    private static double Current(double volts, double ohms, double saturation, double slope)
    {
        // W(e^y) from y, as e^y itself may overflow: the root of w − e^(y − w) by Newton.
        var y = Math.Log(saturation * ohms / slope) + (volts + saturation * ohms) / slope;
        var w = y > 1 ? y - Math.Log(y) : Math.Exp(y);
        for (var i = 0; i < 50; i++) w -= (w - Math.Exp(y - w)) / (1 + Math.Exp(y - w));
        return slope / ohms * w - saturation;
    }

    /// <summary>Base current forced into a grounded-emitter stage of either polarity: I_C = β_F I_B (1 − v_BC/V_A) wherever it is active.</summary>
    private static bool EarlyEffect(TextWriter output)
    {
        const double gain = 150, early = 60, ohms = 1e3, limit = 2e-5;
        var worst = 0.0;
        var solver = new TruthSolver();
        foreach (var sign in new[] { 1, -1 })
        {
            foreach (var amperes in new[] { 1e-7, 1e-6, 1e-5, 5e-5 })
            {
                var circuit = new TruthCircuit("0");
                var (supply, @base, collector) = (circuit.Node("S"), circuit.Node("B"), circuit.Node("C"));
                circuit.AddSource(supply, -1, sign * 15, 0.05);
                circuit.AddResistor(supply, collector, ohms);
                circuit.AddCurrent(-1, @base, sign * amperes);
                var leads = (Collector: 1.0, Base: 20.0, Emitter: 0.2);
                circuit.AddBipolar("Q", (collector, @base, -1), sign > 0, new Junction(1e-3, 0.65, 0.0257), gain, 2, early, leads);
                var solution = solver.Solve(circuit, Load.None);
                var found = sign * solution.Between(supply, collector) / ohms;
                var reverse = sign * solution.Between(@base, collector) - amperes * leads.Base + found * leads.Collector;
                worst = Math.Max(worst, Math.Abs(found / (gain * amperes * (1 - reverse / early)) - 1));
            }
        }

        output.WriteLine($"collector current with Early effect, either polarity: worst relative difference {worst:G2}, limit {limit:G1} (half of it leakage at 0.1 µA)");
        return worst <= limit;
    }

    /// <summary>Kirchhoff's current law at every node of many random boards, most of them faulty, met at every place where a meter was put.</summary>
    private static bool Kirchhoff(TextWriter output)
    {
        var solver = new TruthSolver();
        var (failures, failed) = (0, new List<int>());
        for (var i = 0; i < Boards; i++)
        {
            var truth = TruthCase.From(CaseSeeds.Of(99, i), FaultMix.Even, solver);
            failures += truth.Failures;
            if (truth.Failures > 0) failed.Add(truth.Seed);
        }

        output.WriteLine($"Kirchhoff's current law on {Boards} boards: {failures} solutions beyond {TruthSolver.ResidualFraction:G1} of the largest current + {TruthSolver.ResidualFloor:G1} A"
            + (failed.Count > 0 ? $", seeds {string.Join(", ", failed.Take(10))}" : ""));
        return failures == 0;
    }
}
