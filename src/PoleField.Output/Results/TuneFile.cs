using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Beam;
using PoleField.Design;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

internal sealed class TuneFile(AnalysisHead head, TuneOutcome outcome) : AnalysisFile(Name, head)
{
    public const string Name = "polefield-tune/1";

    [JsonPropertyName("verified"), Description("True when the tuned magnet was solved to full accuracy; false when it was stopped before that.")]
    public bool Verified { get; } = outcome.After is not null;

    [JsonPropertyName("before"), Description("The magnet as it was.")]
    public TuneStateSection Before { get; } = new(outcome.Before);

    [JsonPropertyName("after"), Description("The tuned magnet; by the mesh of the last step, and null where that says nothing, when it is not verified.")]
    public TuneStateSection After { get; } = outcome.After is { } after ? new(after) : new(outcome.Tuned.State.Steps.Last(s => s.Accepted));

    [JsonPropertyName("limited_by"), Description("What keeps it from becoming better, in words.")]
    public IReadOnlyList<string> Limits { get; } = [.. outcome.Tuned.Limits];

    [JsonPropertyName("faces"), Description("The faces that moved.")]
    public IReadOnlyList<TunedFaceSection> Faces { get; } = [.. outcome.Tuned.Moves.Select(m => new TunedFaceSection(m.Layer, m.Points))];

    [JsonPropertyName("dimensions"), Description("The dimensions that changed.")]
    public IReadOnlyList<TunedDimensionSection> Dimensions { get; } = [.. outcome.Tuned.Dimensions.Select(d => new TunedDimensionSection(d))];

    [JsonPropertyName("trade_off"), Description("Gradient against uniformity, the largest gradient first; empty when it was not looked for.")]
    public IReadOnlyList<TradeOffSection> TradeOff { get; } = [.. outcome.TradeOff.Select(p => new TradeOffSection(p))];

    [JsonPropertyName("solves"), Description("Solves of all steps.")]
    public int Solves { get; } = outcome.Tuned.State.Solves;

    [JsonPropertyName("steps"), Description("The way there, step 0 first.")]
    public IReadOnlyList<TuneStepSection> Steps { get; } = [.. outcome.Tuned.State.Steps.Select(s => new TuneStepSection(s))];
}

internal sealed class TuneStateSection
{
    public TuneStateSection(BeamReport r)
    {
        Field = Finite(r.Beam.Field);
        FieldError = Finite(r.FieldError);
        Gradient = Finite(r.Beam.Gradient);
        GradientError = Finite(r.GradientError);
        Mean = Finite(r.Gradient.Mean);
        Spread = Finite(r.Gradient.Spread);
        Rms = Finite(r.Gradient.Rms);
        ProductSpread = Finite(r.FieldTimesGradient.Spread);
        ProductRms = Finite(r.FieldTimesGradient.Rms);
        Clearance = Millimetres(r.Clearance);
    }

    public TuneStateSection(TuneStep last) => (Gradient, Rms, Clearance) = (Finite(last.Gradient), Finite(last.Rms), Millimetres(last.Clearance));

    [JsonPropertyName("field_T"), Description("B at the beam.")]
    public double? Field { get; }

    [JsonPropertyName("field_error_T"), Description("Error bar of B.")]
    public double? FieldError { get; }

    [JsonPropertyName("gradient_T_per_m"), Description("G = d|B|/dz at the beam, signed.")]
    public double? Gradient { get; }

    [JsonPropertyName("gradient_error_T_per_m"), Description("Error bar of G.")]
    public double? GradientError { get; }

    [JsonPropertyName("gradient_mean_T_per_m"), Description("Mean of G over the aperture.")]
    public double? Mean { get; }

    [JsonPropertyName("spread"), Description("(max - min) / (2 |mean|) of G.")]
    public double? Spread { get; }

    [JsonPropertyName("rms"), Description("Standard deviation / |mean| of G.")]
    public double? Rms { get; }

    [JsonPropertyName("field_times_gradient_spread"), Description("The spread of B times G.")]
    public double? ProductSpread { get; }

    [JsonPropertyName("field_times_gradient_rms"), Description("The rms of B times G.")]
    public double? ProductRms { get; }

    [JsonPropertyName("clearance_mm"), Description("Smallest distance of the aperture to anything that is not air.")]
    public double? Clearance { get; }
}

internal sealed class TunedDimensionSection(TunedDimension d)
{
    [JsonPropertyName("name"), Description("Dimension of the family.")]
    public string Name { get; } = d.Name;

    [JsonPropertyName("before"), Description("As it was, mm or degrees.")]
    public double Before { get; } = d.Before;

    [JsonPropertyName("after"), Description("As it is now, mm or degrees.")]
    public double After { get; } = d.After;
}

internal sealed class TradeOffSection(TradeOffPoint p)
{
    [JsonPropertyName("least_gradient_T_per_m"), Description("Gradient that had to hold.")]
    public double LeastGradient { get; } = p.LeastGradient;

    [JsonPropertyName("shape"), Description("The best shape found, solved to full accuracy.")]
    public TuneStateSection Shape { get; } = new(p.Report);

    [JsonPropertyName("limited_by"), Description("What keeps it from becoming better, in words.")]
    public IReadOnlyList<string> Limits { get; } = p.Limits;
}

internal sealed class TunedFaceSection(string layer, IReadOnlyList<FaceMove> points)
{
    [JsonPropertyName("layer"), Description("Layer of the part.")]
    public string Layer { get; } = layer;

    [JsonPropertyName("points"), Description("Places along the face as it was.")]
    public IReadOnlyList<TunedPointSection> Points { get; } = [.. points.Select(p => new TunedPointSection(p))];
}

internal sealed class TunedPointSection(FaceMove p)
{
    [JsonPropertyName("s_mm"), Description("Length along the face.")]
    public double ArcLength { get; } = 1e3 * p.ArcLength;

    [JsonPropertyName("y_mm"), Description("Place.")]
    public double Y { get; } = 1e3 * p.At.Y;

    [JsonPropertyName("z_mm"), Description("Place.")]
    public double Z { get; } = 1e3 * p.At.Z;

    [JsonPropertyName("move_um"), Description("Outward move; positive where iron is added.")]
    public double Move { get; } = 1e6 * p.Move;
}

internal sealed class TuneStepSection(TuneStep s)
{
    [JsonPropertyName("step"), Description("Number of the step.")]
    public int Number { get; } = s.Number;

    [JsonPropertyName("rms"), Description("Relative standard deviation of what is made even.")]
    public double? Rms { get; } = Finite(s.Rms);

    [JsonPropertyName("gradient_T_per_m"), Description("G at the beam.")]
    public double? Gradient { get; } = Finite(s.Gradient);

    [JsonPropertyName("clearance_mm"), Description("Clearance of the beam.")]
    public double? Clearance { get; } = Millimetres(s.Clearance);

    [JsonPropertyName("accepted"), Description("True when the step was taken.")]
    public bool Accepted { get; } = s.Accepted;
}
