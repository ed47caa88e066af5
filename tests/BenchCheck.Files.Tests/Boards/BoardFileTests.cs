using BenchCheck.Core.Boards;
using BenchCheck.Core.Quantities;
using CsCheck;
using Xunit;

namespace BenchCheck.Files.Tests.Boards;

public class BoardFileTests
{
    [Fact]
    public void A_board_file_gives_parts_conditions_and_meters()
    {
        var bench = Samples.Bench;
        Assert.Equal("Vent-motor driver, sensor stage", bench.Board.Title);
        Assert.Equal(BoardOrigin.Service, bench.Board.Origin);
        Assert.Equal(["V1", "R1", "R2", "R3", "R4", "Q1"], bench.Board.Parts.Select(p => p.Designator));
        Assert.Equal(["C1", "B1", "E1"], bench.Board.Find("Q1")!.Nodes);
        Assert.Equal(0.25, bench.Board.Find("R1")!.RatedWatts);
        Assert.Equal(2200, ((Resistor)bench.Board.Find("R3")!).Ohms.Value);
        Assert.Equal(["powered", "unpowered"], bench.Board.Conditions.Select(c => c.Name));
        Assert.True(bench.Board.Conditions[1].SuppliesRemoved);
        var meter = bench.Meters[0];
        Assert.Equal(("handheld", 10e6, 6000), (meter.Name, meter.InputOhms, meter.FullScaleCounts));
        Assert.Equal((0.005, 2.0), (meter.Voltage!.ReadingFraction, meter.Voltage.Counts));
        Assert.Equal([0.6, 6, 60], meter.Voltage.Ranges);
        Assert.Equal(0.2, meter.Current!.BurdenVolts);
        Assert.Equal(double.PositiveInfinity, bench.Meters[1].InputOhms);
        Assert.Empty(bench.Assumed);
    }

    [Fact]
    public void A_current_at_which_the_data_sheet_states_its_figures_is_read()
    {
        var result = Samples.WithParts("""
            D1 = { kind = "led", drop = "2 V ± 0.1 V", at = "20 mA", pins = { anode = "E1", cathode = "GND" } }
            Z1 = { kind = "zener", breakdown = "5.1 V 5%", at = "1 mA", pins = { anode = "GND", cathode = "C1" } }
            Q2 = { kind = "npn", gain = "100..300", at = "2 mA", output_resistance = "50k", pins = { collector = "C1", base = "B1", emitter = "E1" } }
            """);
        var board = result.Bench!.Board;
        Assert.Equal(20e-3, ((Diode)board.Find("D1")!).ReferenceAmperes);
        Assert.Equal(1e-3, ((Diode)board.Find("Z1")!).BreakdownAmperes);
        var q = (Transistor)board.Find("Q2")!;
        Assert.Equal((2e-3, 50e3), (q.StatedAmperes, q.OutputOhms!.Value));
    }

    [Fact]
    public void Every_kind_of_part_is_read_with_its_keys()
    {
        var result = Samples.WithParts("""
            P1 = { kind = "potentiometer", value = "10k 20%", position = "0.3 ± 0.1", pins = { low = "GND", wiper = "W", high = "VCC" } }
            W1 = { kind = "jumper", value = "50m ± 20m", pins = ["W", "J"] }
            S1 = { kind = "switch", state = "closed", pins = ["J", "N1"] }
            V2 = { kind = "supply", value = "5 V", resistance = "0.5 10%", pins = { plus = "N1", minus = "GND" } }
            I1 = { kind = "current source", value = "1 mA 2%", pins = { plus = "OUT", minus = "GND" } }
            D1 = { kind = "diode", pins = { anode = "OUT", cathode = "N1" } }
            D2 = { kind = "led", drop = "1.9 V ± 0.1 V", pins = { anode = "OUT", cathode = "N1" } }
            D3 = { kind = "zener", breakdown = "5V1", pins = { anode = "GND", cathode = "OUT" } }
            Q1 = { kind = "npn", gain = "?", drop = "0.6 V", saturation = "0.1 V", pins = { collector = "OUT", base = "W", emitter = "GND" } }
            Q2 = { kind = "pnp", pins = { collector = "OUT", base = "W", emitter = "VCC" } }
            U1 = { kind = "opamp", gain = "100k", offset = "2 mV", headroom = "1.2 V", pins = { plus = "W", minus = "OUT", output = "OUT", positive_supply = "VCC", negative_supply = "GND" } }
            U2 = { kind = "regulator", value = "5 V 2%", drop_out = "1.2 V", idle_current = "4 mA", pins = { input = "VCC", output = "OUT", common = "GND" } }
            M1 = { kind = "nmos", on_resistance = "2.5", threshold = "1 V..2.5 V", transconductance = "80 mS", pins = { drain = "OUT", gate = "W", source = "GND" } }
            M2 = { kind = "pmos", pins = { drain = "OUT", gate = "W", source = "VCC" } }
            C1 = { kind = "capacitor", value = "10 uF", pins = ["OUT", "GND"] }
            L1 = { kind = "inductor", value = "1 mH", resistance = "2 10%", pins = ["OUT", "W"] }
            E1 = { kind = "vcvs", gain = "10 1%", control = ["OUT", "GND"], pins = { plus = "X1", minus = "GND" } }
            G1 = { kind = "vccs", gain = "2 mS 1%", control = ["OUT", "GND"], pins = { plus = "X1", minus = "GND" } }
            H1 = { kind = "ccvs", gain = "1k 1%", control = "R1", pins = { plus = "X2", minus = "GND" } }
            F1 = { kind = "cccs", gain = "2 1%", control = "R1", pins = { plus = "X2", minus = "GND" } }
            """);
        Assert.DoesNotContain(result.Problems, p => p.IsError);
        var board = result.Bench!.Board;
        Assert.Equal(0.2, ((Potentiometer)board.Find("P1")!).Position.Low, 1e-12);
        Assert.True(((Switch)board.Find("S1")!).IsClosed);
        Assert.Equal(0.55, ((Supply)board.Find("V2")!).SourceOhms!.High, 1e-12);
        Assert.Equal((4.9, 5.1), (((Supply)board.Find("V2")!).Volts.Low, ((Supply)board.Find("V2")!).Volts.High));
        Assert.Equal(Diode.UsualDrop, ((Diode)board.Find("D1")!).Drop);
        Assert.Equal(5.1, ((Diode)board.Find("D3")!).Breakdown!.Value);
        Assert.True(((Transistor)board.Find("Q1")!).Gain.IsUnknown);
        Assert.Equal(Transistor.UsualGain, ((Transistor)board.Find("Q2")!).Gain);
        Assert.Equal((-0.002, 0.002, 1.2), (((OpAmp)board.Find("U1")!).Offset.Low, ((OpAmp)board.Find("U1")!).Offset.High, ((OpAmp)board.Find("U1")!).Headroom));
        Assert.Equal((1.2, 4e-3), (((Regulator)board.Find("U2")!).DropOut.Value, ((Regulator)board.Find("U2")!).IdleAmperes.Value));
        Assert.Equal((2.5, 2.5, 0.08), (((Mosfet)board.Find("M1")!).OnOhms.Value, ((Mosfet)board.Find("M1")!).Threshold.High, ((Mosfet)board.Find("M1")!).Siemens!.Value));
        Assert.Equal(Mosfet.UsualThreshold, ((Mosfet)board.Find("M2")!).Threshold);
        Assert.Equal(2, ((Inductor)board.Find("L1")!).WindingOhms.Value);
        Assert.Equal(new Control.NodePair("OUT", "GND"), ((ControlledSource)board.Find("E1")!).Control);
        Assert.Equal(new Control.PartCurrent("R1"), ((ControlledSource)board.Find("F1")!).Control);
    }

    [Fact]
    public void What_was_assumed_is_said_in_plain_sentences_with_the_parts_named()
    {
        var assumed = Samples.WithParts("""
            R3 = { kind = "resistor", value = "1k", pins = ["VCC", "OUT"] }
            R4 = { kind = "resistor", value = "2k", pins = ["VCC", "OUT"] }
            """).Bench!.Assumed;
        Assert.Contains("R3, R4: no tolerance stated, 5 % taken", assumed);
        Assert.Contains(assumed, s => s.StartsWith("No meter described", StringComparison.Ordinal));
    }

    [Fact]
    public void A_supply_that_a_condition_sets_keeps_its_tolerance_with_a_floor_of_10_mV()
    {
        var board = Samples.WithParts("""
            V2 = { kind = "supply", value = "0 V 1%", pins = { plus = "IN", minus = "GND" } }
            V3 = { kind = "supply", value = "5 V 4%", pins = { plus = "IN2", minus = "GND" } }
            R9 = { kind = "resistor", value = "1k 5%", pins = ["IN", "IN2"] }
            """, """
            [conditions.bright]
            set = { V2 = "5 V", V3 = "2.5 V" }
            [conditions.dark]
            set = { V2 = "0 V", V3 = "1 V 0.1%" }
            """).Bench!.Board;
        double Half(string condition, string part) => (board.FindCondition(condition)!.Set[part].High - board.FindCondition(condition)!.Set[part].Low) / 2;
        Assert.Equal(0.010, ((Supply)board.Find("V2")!).Volts.High, 1e-12);
        Assert.Equal(0.1, Half("bright", "V2"), 1e-12);
        Assert.Equal(0.1, Half("bright", "V3"), 1e-12);
        Assert.Equal(0.010, Half("dark", "V2"), 1e-12);
        Assert.Equal(0.010, Half("dark", "V3"), 1e-12);
    }

    [Fact]
    public void A_small_signal_condition_stands_on_a_named_dc_condition()
    {
        var rest = """
            [conditions.powered]
            [conditions.signal]
            kind = "small-signal"
            operating_point = "powered"
            frequency = "1 kHz"
            """;
        var condition = Samples.WithParts("", rest).Bench!.Board.Conditions[1];
        Assert.Equal(("powered", 1000.0), (condition.OperatingPoint, condition.Hertz));
        var wrong = Samples.WithParts("", rest.Replace("\"powered\"", "\"powerd\"", StringComparison.Ordinal));
        Assert.Contains("did you mean \"powered\"?", Assert.Single(wrong.Problems).ToString(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("""R3 = { kind = "resistro", value = "1k 5%", pins = ["VCC", "OUT"] }""", "resistro", "did you mean \"resistor\"?")]
    [InlineData("""R3 = { kind = "resistor", valeu = "1k 5%", pins = ["VCC", "OUT"] }""", "valeu", "did you mean \"value\"?")]
    [InlineData("""R3 = { kind = "resistor", value = "1k 5%", pins = ["VCC", "OUT"], raitng = "1 W" }""", "raitng", "did you mean \"rating\"?")]
    [InlineData("""Q1 = { kind = "npn", pins = { collector = "OUT", base = "VCC", emiter = "GND" } }""", "emiter", "did you mean \"emitter\"?")]
    [InlineData("""R3 = { kind = "resistor", value = "0", pins = ["VCC", "OUT"] }""", "\"0\"", "jumper")]
    [InlineData("""R3 = { kind = "resistor", value = "-1k", pins = ["VCC", "OUT"] }""", "\"-1k\"", "1 µΩ to 1 TΩ")]
    [InlineData("""R3 = { kind = "resistor", value = "2T", pins = ["VCC", "OUT"] }""", "\"2T\"", "1 TΩ")]
    [InlineData("""R3 = { kind = "resistor", value = "5 V", pins = ["VCC", "OUT"] }""", "a voltage (V)", "a resistance (Ω)")]
    [InlineData("""R3 = { kind = "resistor", pins = ["VCC", "OUT"] }""", "R3 has no value", "?")]
    [InlineData("""R3 = { kind = "resistor", value = "1k 5%" }""", "R3 has no pins", "pins = [")]
    [InlineData("""R3 = { kind = "resistor", value = "1k 5%", pins = ["VCC"] }""", "1 pins", "2 pins of a resistor")]
    [InlineData("""R3 = { kind = "resistor", value = "1k 5%", pins = ["VCC", ""] }""", "pin 2", "a node's name")]
    [InlineData("""V3 = { kind = "supply", value = "20 kV", pins = { plus = "OUT", minus = "GND" } }""", "20 kV", "10 kV")]
    [InlineData("""R3 = { kind = "resistor", value = 1k, pins = ["VCC", "OUT"] }""", "k", "double quotes")]
    [InlineData("""R3 = { kind = "resistor", value = "1k 5%, pins = ["VCC", "OUT"] }""", "VCC", "closing quotation mark")]
    [InlineData("""E1 = { kind = "vcvs", gain = "2 1%", control = ["OT", "GND"], pins = { plus = "X", minus = "GND" } }""", "no node \"OT\"", "did you mean \"OUT\"?")]
    [InlineData("""F1 = { kind = "cccs", gain = "2 1%", control = "R0", pins = { plus = "OUT", minus = "GND" } }""", "\"R0\"", "another part")]
    [InlineData("""S1 = { kind = "switch", state = "close", pins = ["VCC", "OUT"] }""", "\"close\"", "did you mean \"closed\"?")]
    [InlineData("""D1 = 5""", "a number", "a part")]
    public void A_slip_in_a_part_is_an_error_on_its_line_with_what_was_read_expected_and_meant(string line, string read, string expected)
    {
        var result = Samples.WithParts(line);
        Assert.Null(result.Bench);
        Assert.All(result.Problems, p => Assert.True(p is { IsError: true, Line: 8, Column: > 0 }));
        Assert.Contains(result.Problems, p => p.ToString() is var text && text.StartsWith("board.toml:8:", StringComparison.Ordinal)
            && text.Contains(read, StringComparison.Ordinal) && text.Contains(expected, StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("[conditions.on]\nset = { V9 = \"5 V\" }", "V9", "V1")]
    [InlineData("[conditions.on]\nset = { R1 = \"5 V\" }", "R1 is a resistor", "a supply")]
    [InlineData("[conditions.on]\nsupplies = \"remove\"", "remove", "did you mean \"removed\"?")]
    [InlineData("[conditions.on]\nswitches = { R1 = \"open\" }", "R1", "a switch")]
    [InlineData("[meters.m]\nvoltage = { accuracy = \"good\" }", "good", "0.5% + 2 counts")]
    [InlineData("[meters.m]\nvoltage = { ranges = [\"6 V\"] }", "no accuracy", "0.5% + 2 counts")]
    [InlineData("[meters.m]\nvoltage = { accuracy = \"1%\", ranges = [\"6 A\"] }", "a current (A)", "a voltage (V)")]
    [InlineData("[meters.m]\ninput_resistance = \"10\"", "\"10\"", "infinite")]
    [InlineData("[metres.m]\ncounts = 6000", "metres", "did you mean \"meters\"?")]
    public void A_slip_in_a_condition_or_meter_is_an_error_too(string rest, string read, string expected)
    {
        var result = Samples.WithParts("", rest);
        Assert.Null(result.Bench);
        Assert.Contains(result.Problems, p => p.IsError && p.Line >= 9 && p.ToString().Contains(read, StringComparison.Ordinal) && p.ToString().Contains(expected, StringComparison.Ordinal));
    }

    [Fact]
    public void Problems_of_the_connections_stand_at_the_line_of_their_part()
    {
        var contradiction = Samples.WithParts("""V2 = { kind = "supply", value = "5 V 1%", pins = { plus = "VCC", minus = "GND" } }""");
        Assert.Null(contradiction.Bench);
        Assert.StartsWith("board.toml:8:1: error: V2 contradicts V1", Assert.Single(contradiction.Problems).ToString(), StringComparison.Ordinal);
        var stub = Samples.WithParts("""R3 = { kind = "resistor", value = "1k 5%", pins = ["OUT", "STUB"] }""");
        Assert.NotNull(stub.Bench);
        Assert.StartsWith("board.toml:8:1: warning: node STUB has a single pin, R3.2", Assert.Single(stub.Problems).ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void All_problems_of_a_file_come_at_once_in_the_order_of_their_lines_also_past_syntax_errors()
    {
        var result = Samples.WithParts("""
            R3 = { kind = "resistro", value = "1k", pins = ["VCC", "OUT"] }
            R4 = { kind = "resistor", value = 1k, pins = ["VCC", "OUT"] }
            R5 = { kind = "resistor", value = "1x", pins = ["VCC", "OUT"] }
            R6 = { kind = "resistor", value = "1k", pins = ["VCC", "OUT" }
            """, "[conditions.on]\nset = { V1 = \"5 A\", R6 = \"1 V\" }");
        Assert.Equal([8, 9, 10, 11, 13], result.Problems.Where(p => p.IsError).Select(p => p.Line));
    }

    [Fact]
    public void A_designator_given_twice_is_an_error_that_names_both_lines()
    {
        var error = Assert.Single(Samples.WithParts("""R1 = { kind = "resistor", value = "1k 5%", pins = ["VCC", "OUT"] }""").Problems, p => p.IsError);
        Assert.Contains("\"R1\" is given twice, on line 6 and on line 8", error.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Sections_given_as_tables_of_their_own_or_by_dotted_keys_are_the_same_board()
    {
        var result = Samples.Board("""
            reference = "GND"
            [parts.V1]
            kind = "supply"
            value = "12 V 1%"
            pins.plus = "VCC"
            pins.minus = "GND"
            [parts]
            R1.kind = "resistor"
            R1.value = 1000
            R1.pins = ["VCC", "GND"]
            """);
        Assert.DoesNotContain(result.Problems, p => p.IsError);
        Assert.Equal(["V1", "R1"], result.Bench!.Board.Parts.Select(p => p.Designator));
    }

    [Fact]
    public void Names_with_control_characters_are_refused_and_never_shown_raw()
    {
        var result = Samples.WithParts("R3 = { kind = \"resistor\", value = \"1k\", pins = [\"VCC\", \"\\u001b[31mX\"] }");
        Assert.Null(result.Bench);
        Assert.All(result.Problems, p => Assert.DoesNotContain('\u001b', p.ToString()));
    }

    [Fact]
    public void An_empty_binary_missing_or_oversized_file_is_one_clear_error()
    {
        var folder = Directory.CreateTempSubdirectory();
        try
        {
            FileProblem Only(string name, byte[] bytes)
            {
                var path = Path.Combine(folder.FullName, name);
                File.WriteAllBytes(path, bytes);
                var result = BoardFile.Read(path);
                Assert.Null(result.Bench);
                return Assert.Single(result.Problems);
            }

            Assert.Contains("empty", Only("empty.toml", []).Read, StringComparison.Ordinal);
            Assert.Contains("binary", Only("binary.toml", [0x7F, 0x45, 0, 0, 0, 1, 2, 3]).Read, StringComparison.Ordinal);
            Assert.Contains("at most 1000000 bytes", Only("big.toml", new byte[BoardFile.LargestFile + 1]).ToString(), StringComparison.Ordinal);
            Assert.Equal(2, Only("latin.toml", [.. "title = 'a'\nreference = '"u8, 0xB5, (byte)'\'']).Line);
            Assert.Contains("no such file", Assert.Single(BoardFile.Read(Path.Combine(folder.FullName, "none.toml")).Problems).Read, StringComparison.Ordinal);
            Assert.Null(BoardFile.Read(folder.FullName).Bench);
        }
        finally
        {
            folder.Delete(true);
        }
    }

    [Fact]
    public void Utf16_and_byte_order_marks_are_recognised()
    {
        var path = Path.GetTempFileName();
        try
        {
            foreach (var encoding in (System.Text.Encoding[])[new System.Text.UTF8Encoding(true), System.Text.Encoding.Unicode, System.Text.Encoding.BigEndianUnicode])
            {
                File.WriteAllText(path, Samples.BoardText, encoding);
                Assert.Empty(BoardFile.Read(path).Problems);
            }
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Fact]
    public void A_file_cut_off_anywhere_gives_a_bench_or_errors_but_never_fails() =>
        Gen.Int[0, Samples.BoardText.Length].Sample(length =>
        {
            var result = Samples.Board(Samples.BoardText[..length]);
            Assert.True(result.Bench is not null || result.Problems.Any(p => p.IsError));
        }, iter: 300);

    [Fact]
    public void Whatever_the_text_reading_a_board_file_returns() =>
        Gen.Select(Gen.String, Gen.Int[0, Samples.BoardText.Length - 1], Gen.Int[0, 60], Gen.Bool).Sample((noise, at, cut, alone) =>
        {
            var text = alone ? noise : Samples.BoardText[..at] + noise + Samples.BoardText[Math.Min(at + cut, Samples.BoardText.Length)..];
            var result = Samples.Board(text);
            Assert.True(result.Bench is not null || result.Problems.Any(p => p.IsError));
            Assert.All(result.Problems, p => Assert.DoesNotContain(p.ToString(), char.IsControl));
        }, iter: 500);

    [Theory]
    [InlineData("[")]
    [InlineData("{a=")]
    [InlineData("a.")]
    public void Deep_nesting_is_refused_without_harm(string piece) =>
        Assert.Null(Samples.Board("a = " + string.Concat(Enumerable.Repeat(piece, 100_000))).Bench);

    [Fact]
    public void A_file_that_is_no_board_file_at_all_gets_a_short_answer()
    {
        var result = Samples.Board("at,value\n" + string.Concat(Enumerable.Repeat("C1,5.2\n", 20_000)));
        Assert.Null(result.Bench);
        Assert.InRange(result.Problems.Length, 1, 5);
        Assert.Contains(result.Problems, p => p.Hint == "is this a board file?");
    }

    [Fact]
    public void More_parts_than_the_limit_are_refused_with_the_limit_named()
    {
        var parts = string.Join('\n', Enumerable.Range(3, BoardFile.MostParts).Select(i => $$"""R{{i}} = { kind = "resistor", value = "1k 5%", pins = ["VCC", "OUT"] }"""));
        Assert.Contains("at most 2000 parts", Assert.Single(Samples.WithParts(parts).Problems).ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void A_meters_accuracy_is_read_in_the_forms_of_data_sheets()
    {
        foreach (var (text, fraction, counts) in ((string, double, double)[])
            [("0.5% + 2 counts", 0.005, 2), ("0,5 % + 2", 0.005, 2), ("±(0.5% of reading + 2 digits)", 0.005, 2), ("1%", 0.01, 0), ("3 counts", 0, 3), ("0.05 % rdg + 5 dgt", 0.0005, 5)])
        {
            var result = Samples.WithParts("", $"[meters.m]\nvoltage = {{ accuracy = \"{text}\", ranges = [\"6 V\"] }}");
            Assert.Empty(result.Problems);
            var bench = result.Bench!;
            Assert.Equal(fraction, bench.Meters[0].Voltage!.ReadingFraction, 1e-15);
            Assert.Equal(counts, bench.Meters[0].Voltage!.Counts);
        }
    }

    [Fact]
    public void Nodes_side_by_side_on_the_layout_are_read_and_checked()
    {
        Assert.Equal([["OUT", "VCC"]], Samples.Board("adjacent = [[\"OUT\", \"VCC\"]]\n" + Divider).Bench!.Board.Adjacent.Select(g => g.ToArray()).ToArray());
        Assert.Contains("did you mean \"OUT\"?", Assert.Single(Samples.Board("adjacent = [[\"OUTT\", \"VCC\"]]\n" + Divider).Problems).ToString(), StringComparison.Ordinal);
        Assert.Equal(40, Samples.Board("temperature = 40\n" + Divider).Bench!.Board.Celsius);
    }

    private const string Divider = """
        title = "Divider"
        reference = "GND"
        origin = "new build"
        [parts]
        V1 = { kind = "supply", value = "12 V 1%", pins = { plus = "VCC", minus = "GND" } }
        R1 = { kind = "resistor", value = "10k 5%", pins = ["VCC", "OUT"] }
        R2 = { kind = "resistor", value = "10k 5%", pins = ["OUT", "GND"] }
        """;
}
