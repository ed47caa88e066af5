using BenchCheck.Core.Metering;

namespace BenchCheck.Screens;

/// <content>Forms about a reading.</content>
internal sealed partial class BenchScreen
{
    private void EditNote()
    {
        if (bench is not { } b) return;
        if (b.Session.Row?.Reading is not { } reading)
        {
            Say("A note belongs to a reading: nothing was read in this row yet.", Tone.Doubt);
            return;
        }

        Put(new FormPanel(palette, $"Note on {b.Session.Cursor.Name(b.Session.Bench.Board)}", [new("note", reading.Note ?? "", "empty removes it")],
            values => Finish(b.Enter((s, _) => s.WithNote(values[0]))), Close));
    }

    private void EditSerial()
    {
        if (bench is { } b)
            Put(new FormPanel(palette, "Serial of the board on the bench", [new("serial", b.Session.Readings.Serial ?? "", "empty for none")], values => Finish(b.Enter((s, _) => s.WithSerial(values[0]))), Close));
    }

    private void AddReading()
    {
        if (bench is { } b) Put(ReadingForm(b, "Add a reading", new ReadingText(b.Session.Condition, ReadingQuantity.Voltage.Name(), "", "", ""), null));
    }

    private void EditReading()
    {
        if (bench is not { } b) return;
        if (b.Session.Row?.Reading is { } reading) Put(ReadingForm(b, "Edit the reading", ReadingText.Of(reading), reading));
        else Say("Nothing was read in this row yet: type a value first, or press F6.", Tone.Doubt);
    }

    private FormPanel ReadingForm(Workbench b, string title, ReadingText text, Reading? replaced)
    {
        var board = b.Session.Bench.Board;
        return new FormPanel(palette, title,
        [
            new("value", text.Value, "with or without unit: 6.42, 652 mV, 4k7"),
            new("at", text.At, "a node (C1); for a current a part (R3) or a pin (Q1.base)"),
            new("against", text.Against, $"a node; empty is {board.Reference}"),
            new("quantity", text.Quantity, "voltage, current, resistance, gain, input resistance, output resistance"),
            new("condition", text.Condition, string.Join(", ", board.Conditions.Select(c => c.Name))),
            new("meter", text.Meter, string.Join(", ", b.Session.Bench.Meters.Select(m => m.Name)) + "; empty is the first"),
            new("range", text.Range, "full scale, when it was set by hand: 6 V"),
            new("uncertainty", text.Uncertainty, "standard uncertainty, where the meter's accuracy does not hold"),
            new("note", text.Note, ""),
        ],
        v => Finish(b.Enter((s, time) => s.Put(new ReadingText(v[4], v[3], v[1], v[2], v[0]) { Meter = v[5], Range = v[6], Uncertainty = v[7], Note = v[8] }, replaced, time))), Close);
    }

    /// <summary>Closes the form when what it held was taken.</summary>
    private string? Finish(string? refused)
    {
        if (refused is not null) return refused;
        Close();
        Say("Taken. Ctrl+U undoes it.");
        return null;
    }
}
