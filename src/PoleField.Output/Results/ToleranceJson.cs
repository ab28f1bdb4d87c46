using System.Text.Json;
using System.Text.Json.Serialization;
using PoleField.Design;

namespace PoleField.Output.Results;

/// <summary>Writes the result of a tolerance budget, <c>polefield-tolerance/1</c>: lengths in mm, moves in µm, everything else SI.</summary>
public static class ToleranceJson
{
    private const double PerMicrometreAndMillimetre = 1e-9;

    /// <summary>Writes the budget with what it was made for.</summary>
    /// <param name="head">Result of the solve, whose title, hashes and beam are repeated.</param>
    /// <param name="budget">Budget.</param>
    /// <param name="allowances">Loosest form tolerances, empty when none were asked for.</param>
    /// <param name="stream">Trial by re-solved magnets, if there was one, and where to write.</param>
    public static void Write(
        ResultFile head, ToleranceBudget budget, IReadOnlyList<FormAllowance> allowances, (ToleranceTrial? Trial, Stream To) stream)
    {
        var file = new ToleranceFile(
            "polefield-tolerance/1",
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            head.Beam,
            [.. budget.Contributions.Select(c => new ContributionSection(
                c.Name, c.Assumed, Relative(budget, 0, c.OneSigma), Relative(budget, 1, c.OneSigma), c.OneSigma[2]))],
            Effect(budget, budget.Total),
            Effect(budget, budget.Worst),
            [.. budget.Faces.Select((f, i) => Face(budget, f, i))],
            [.. allowances.Select(a => new AllowanceSection(
                budget.Faces[a.Face].Layer, a.Face, 1e3 * a.From, 1e3 * a.To, 1e6 * a.OneSigma))],
            Trial(budget, stream.Trial));
        JsonSerializer.Serialize(stream.To, file, ResultJson.Options);
        stream.To.Write("\n"u8);
    }

    private static double Relative(ToleranceBudget budget, int quantity, IReadOnlyList<double> effects) =>
        effects[quantity] / Math.Abs(budget.Derivatives[quantity].Value);

    private static EffectSection Effect(ToleranceBudget budget, IReadOnlyList<double> effects) =>
        new(Relative(budget, 0, effects), Relative(budget, 1, effects), effects[2]);

    private static FaceSection Face(ToleranceBudget budget, Face face, int index) => new(
        face.Layer,
        [.. budget.Along(index).Select(p => new FacePointSection(
            1e3 * p.ArcLength,
            1e3 * p.At.Y,
            1e3 * p.At.Z,
            PerMicrometreAndMillimetre * p.Density[0],
            PerMicrometreAndMillimetre * p.Density[1]))]);

    private static TrialSection? Trial(ToleranceBudget budget, ToleranceTrial? trial) => trial is null
        ? null
        : new TrialSection(
            trial.Draws,
            trial.SamplingError,
            Effect(budget, trial.Predicted),
            Effect(budget, trial.Found),
            Effect(budget, trial.Residual));

    private sealed record ToleranceFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("contributions")] IReadOnlyList<ContributionSection> Contributions,
        [property: JsonPropertyName("total")] EffectSection Total,
        [property: JsonPropertyName("worst_case")] EffectSection Worst,
        [property: JsonPropertyName("faces")] IReadOnlyList<FaceSection> Faces,
        [property: JsonPropertyName("form_allowances")] IReadOnlyList<AllowanceSection> Allowances,
        [property: JsonPropertyName("trial")] TrialSection? Trial);

    private sealed record ContributionSection(
        [property: JsonPropertyName("name")] string Name,
        [property: JsonPropertyName("assumed")] string Assumed,
        [property: JsonPropertyName("field_rel")] double Field,
        [property: JsonPropertyName("gradient_rel")] double Gradient,
        [property: JsonPropertyName("spread_abs")] double Spread);

    private sealed record EffectSection(
        [property: JsonPropertyName("field_rel")] double Field,
        [property: JsonPropertyName("gradient_rel")] double Gradient,
        [property: JsonPropertyName("spread_abs")] double Spread);

    private sealed record FaceSection(
        [property: JsonPropertyName("layer")] string Layer,
        [property: JsonPropertyName("points")] IReadOnlyList<FacePointSection> Points);

    private sealed record FacePointSection(
        [property: JsonPropertyName("s_mm")] double ArcLength,
        [property: JsonPropertyName("y_mm")] double Y,
        [property: JsonPropertyName("z_mm")] double Z,
        [property: JsonPropertyName("dfield_T_per_um_mm")] double Field,
        [property: JsonPropertyName("dgradient_T_per_m_per_um_mm")] double Gradient);

    private sealed record AllowanceSection(
        [property: JsonPropertyName("layer")] string Layer,
        [property: JsonPropertyName("face")] int Face,
        [property: JsonPropertyName("from_s_mm")] double From,
        [property: JsonPropertyName("to_s_mm")] double To,
        [property: JsonPropertyName("one_sigma_um")] double OneSigma);

    private sealed record TrialSection(
        [property: JsonPropertyName("draws")] int Draws,
        [property: JsonPropertyName("sampling_error")] double SamplingError,
        [property: JsonPropertyName("predicted")] EffectSection Predicted,
        [property: JsonPropertyName("found")] EffectSection Found,
        [property: JsonPropertyName("beyond_linear")] EffectSection Residual);
}
