using PoleField.Cli.Case;
using PoleField.Cli.Sketching;
using PoleField.Design;
using PoleField.Drawing;

namespace PoleField.Cli.Commands;

/// <summary>Tuning of the dimensions of a family that drew the case's sketch.</summary>
internal static class FamilyTuning
{
    private const double SameDrawing = 1e-6; // metres: farther apart, the sketch is not what the family draws

    /// <summary>The dimensions with the drawing they make.</summary>
    /// <exception cref="InputException">The case's sketch is not the family's drawing.</exception>
    public static DrawnDimensions Of(LoadedCase loaded, TuneFamily tune, Pipeline pipeline, CrossSection section)
    {
        SectionRequest request = SketchQuestion.RequestOf(loaded.Case!);
        CrossSection Draw(IReadOnlyList<double> values)
        {
            SectionReading reading = pipeline.Cut(With(tune, values).Draw().Sketch, request);
            return reading.Section ?? throw new InputException(reading.Findings);
        }

        TuneDimension[] each = [.. tune.Each.Select(e => new TuneDimension(e.Option.Key, e.Option.Get(tune.Family), e.Low, e.High))];
        CrossSection drawn = Draw([.. each.Select(e => e.Value)]);
        double off = Math.Max(Farthest(drawn, section), Farthest(section, drawn));
        return off <= SameDrawing
            ? new DrawnDimensions(each, Draw)
            : throw new InputException([new Finding(
                Severity.Fault,
                "other-drawing",
                FormattableString.Invariant($"The sketch is not what the family {tune.Family.Name} draws with these dimensions: they are up to {1e3 * off:g3} mm apart."),
                "Give under drawn_with every dimension that differs from the family's usual one, or tune faces instead.")
            {
                File = Path.GetFileName(loaded.Path),
                Line = tune.At.Line,
            }]);
    }

    /// <summary>The family with other values of its dimensions.</summary>
    public static PoleFamily With(TuneFamily tune, IReadOnlyList<double> values) =>
        tune.Each.Select((e, k) => (e.Option, Value: values[k])).Aggregate(tune.Family, (f, e) => e.Option.Set(f, e.Value));

    /// <summary>What <c>drawn_with</c> says of a family: every dimension that is not the usual one.</summary>
    public static string DrawnWith(PoleFamily family)
    {
        FamilyWords words = FamilyWords.All.First(w => w.Usual.Name == family.Name);
        IEnumerable<string> other = words.Options
            .Where(o => o.Get(family) != o.Get(words.Usual))
            .Select(o => o.Kind == Dimension.Ratio
                ? FormattableString.Invariant($"{o.Key} = \"{o.Get(family):R}\"")
                : FormattableString.Invariant($"{o.Key} = \"{o.Get(family):R} {o.Kind.Shown.Name}\""));
        return $"{{ {string.Join(", ", other)} }}";
    }

    private static double Farthest(CrossSection from, CrossSection to)
    {
        const int samples = 4;
        return from.Edges.Max(e => Enumerable.Range(0, samples + 1)
            .Max(k => to.Edges.Min(o => o.Curve.DistanceTo(e.Curve.At((double)k / samples)))));
    }
}
