using System.Globalization;
using System.Text.Json.Nodes;
using PoleField.Cli.Case;
using PoleField.Output.Results;

namespace PoleField.Cli.Sweeping;

/// <summary>One varied value of the case: where it stands and what it becomes.</summary>
/// <param name="Path">The place or places in the case.</param>
/// <param name="Unit">Unit of the values; empty for bare numbers, words and factors.</param>
/// <param name="IsFactor">The values multiply what the case says.</param>
/// <param name="Values">The values as texts without unit, at least one.</param>
internal sealed record Axis(CasePath Path, string Unit, bool IsFactor, IReadOnlyList<string> Values)
{
    /// <summary>The case's change at value <paramref name="i"/>.</summary>
    public CaseChange At(int i) => new(Path, IsFactor || WritesBare ? Values[i] : $"{Values[i]} {Unit}", IsFactor);

    /// <summary>True when the unit is what the case means by a bare number and is not written.</summary>
    public bool WritesBare { get; init; }

    public SweepAxis ToFile() => new(Path.Text, Unit, IsFactor, [.. Values.Select(Cell)]);

    private static JsonNode Cell(string value) =>
        double.TryParse(value, NumberStyles.Float, CultureInfo.InvariantCulture, out double number) ? JsonValue.Create(number) : JsonValue.Create(value);
}
