using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Design;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

/// <summary>A tolerance budget with what was worked out beside it.</summary>
/// <param name="Budget">Budget.</param>
/// <param name="Allowances">Loosest form tolerances.</param>
/// <param name="Trial">Trial by re-solved magnets, if there was one.</param>
public sealed record ToleranceAnswer(ToleranceBudget Budget, FormAllowances Allowances, ToleranceTrial? Trial);

/// <summary>Loosest form tolerances that together keep the gradient.</summary>
/// <param name="Gradient">Relative one sigma of the gradient at the beam that they keep.</param>
/// <param name="Stretches">Every stretch of the faces.</param>
public sealed record FormAllowances(double Gradient, IReadOnlyList<FormAllowance> Stretches);

internal sealed class ToleranceFile(AnalysisHead head, ToleranceAnswer answer) : AnalysisFile(Name, head)
{
    public const string Name = "polefield-tolerance/1";

    [JsonPropertyName("contributions"), Description("Each error's effect, one sigma, the largest effect on the gradient first.")]
    public IReadOnlyList<ContributionSection> Contributions { get; } = [.. answer.Budget.Contributions.Select(c => new ContributionSection(answer.Budget, c))];

    [JsonPropertyName("total"), Description("Root of the sum of squares.")]
    public EffectSection Total { get; } = new(answer.Budget, answer.Budget.Total);

    [JsonPropertyName("worst_case"), Description("All at one sigma with the worst signs.")]
    public EffectSection Worst { get; } = new(answer.Budget, answer.Budget.Worst);

    [JsonPropertyName("faces"), Description("Where on the faces an error matters.")]
    public IReadOnlyList<SensitiveFaceSection> Faces { get; } = [.. answer.Budget.Faces.Select((_, i) => new SensitiveFaceSection(answer.Budget, i))];

    [JsonPropertyName("allowed_gradient_rel"), Description("Relative one sigma of G that the form allowances keep together: what the case allows, or 0.005.")]
    public double? AllowedGradient { get; } = Finite(answer.Allowances.Gradient);

    [JsonPropertyName("form_allowances"), Description("Loosest form error along each stretch that keeps the gradient within what is allowed.")]
    public IReadOnlyList<AllowanceSection> Allowances { get; } = [.. answer.Allowances.Stretches.Select(a => new AllowanceSection(answer.Budget, a))];

    [JsonPropertyName("trial"), Description("Magnets with random errors, solved anew; null when none were asked for.")]
    public TrialSection? Trial { get; } = answer.Trial is { } trial ? new(answer.Budget, trial) : null;
}

internal sealed class ContributionSection(ToleranceBudget budget, ToleranceContribution c)
{
    [JsonPropertyName("name"), Description("What is off.")]
    public string Name { get; } = c.Name;

    [JsonPropertyName("assumed"), Description("How much, one sigma.")]
    public string Assumed { get; } = c.Assumed;

    [JsonPropertyName("field_rel"), Description("Relative change of B at the beam.")]
    public double? Field { get; } = EffectSection.Relative(budget, 0, c.OneSigma);

    [JsonPropertyName("gradient_rel"), Description("Relative change of G at the beam.")]
    public double? Gradient { get; } = EffectSection.Relative(budget, 1, c.OneSigma);

    [JsonPropertyName("spread_abs"), Description("Change of the gradient's spread.")]
    public double? Spread { get; } = Finite(c.OneSigma[2]);

    [JsonPropertyName("gradient_mean_rel"), Description("Relative change of the mean gradient over the aperture.")]
    public double? Mean { get; } = EffectSection.Relative(budget, 3, c.OneSigma);

    [JsonPropertyName("rms_abs"), Description("Change of the gradient's rms deviation over the aperture, relative to its mean.")]
    public double? Rms { get; } = Finite(c.OneSigma[4]);
}

internal sealed class EffectSection(ToleranceBudget budget, IReadOnlyList<double> effects)
{
    /// <summary>Names of the members, in the order of <see cref="ToleranceBudget.Quantities"/>.</summary>
    public static readonly IReadOnlyList<string> Members = ["field_rel", "gradient_rel", "spread_abs", "gradient_mean_rel", "rms_abs"];

    [JsonPropertyName("field_rel"), Description("Relative change of B at the beam.")]
    public double? Field { get; } = Relative(budget, 0, effects);

    [JsonPropertyName("gradient_rel"), Description("Relative change of G at the beam.")]
    public double? Gradient { get; } = Relative(budget, 1, effects);

    [JsonPropertyName("spread_abs"), Description("Change of the gradient's spread.")]
    public double? Spread { get; } = Finite(effects[2]);

    [JsonPropertyName("gradient_mean_rel"), Description("Relative change of the mean gradient over the aperture.")]
    public double? Mean { get; } = Relative(budget, 3, effects);

    [JsonPropertyName("rms_abs"), Description("Change of the gradient's rms deviation over the aperture, relative to its mean.")]
    public double? Rms { get; } = Finite(effects[4]);

    public static double? Relative(ToleranceBudget budget, int quantity, IReadOnlyList<double> effects) =>
        Finite(effects[quantity] / Math.Abs(budget.Derivatives[quantity].Value));
}

internal sealed class SensitiveFaceSection(ToleranceBudget budget, int face)
{
    [JsonPropertyName("layer"), Description("Layer of the part.")]
    public string Layer { get; } = budget.Faces[face].Layer;

    [JsonPropertyName("points"), Description("Places along the face.")]
    public IReadOnlyList<SensitivePointSection> Points { get; } = [.. budget.Along(face).Select(p => new SensitivePointSection(p.ArcLength, p.At, p.Density))];
}

internal sealed class SensitivePointSection(double arcLength, Geometry.Point at, IReadOnlyList<double> density)
{
    private const double PerMicrometreAndMillimetre = 1e-9;

    [JsonPropertyName("s_mm"), Description("Length along the face.")]
    public double ArcLength { get; } = 1e3 * arcLength;

    [JsonPropertyName("y_mm"), Description("Place.")]
    public double Y { get; } = 1e3 * at.Y;

    [JsonPropertyName("z_mm"), Description("Place.")]
    public double Z { get; } = 1e3 * at.Z;

    [JsonPropertyName("dfield_T_per_um_mm"), Description("Change of B per micrometre of outward move and millimetre of face.")]
    public double? Field { get; } = Finite(PerMicrometreAndMillimetre * density[0]);

    [JsonPropertyName("dgradient_T_per_m_per_um_mm"), Description("Change of G, likewise.")]
    public double? Gradient { get; } = Finite(PerMicrometreAndMillimetre * density[1]);
}

internal sealed class AllowanceSection(ToleranceBudget budget, FormAllowance a)
{
    [JsonPropertyName("layer"), Description("Layer of the part.")]
    public string Layer { get; } = budget.Faces[a.Face].Layer;

    [JsonPropertyName("face"), Description("Number of the face.")]
    public int Face { get; } = a.Face;

    [JsonPropertyName("from_s_mm"), Description("Where the stretch begins, along the face.")]
    public double From { get; } = 1e3 * a.From;

    [JsonPropertyName("to_s_mm"), Description("Where it ends.")]
    public double To { get; } = 1e3 * a.To;

    [JsonPropertyName("one_sigma_um"), Description("Allowed form error, one sigma.")]
    public double? OneSigma { get; } = Finite(1e6 * a.OneSigma);
}

internal sealed class TrialSection(ToleranceBudget budget, ToleranceTrial trial)
{
    [JsonPropertyName("draws"), Description("Magnets solved.")]
    public int Draws { get; } = trial.Draws;

    [JsonPropertyName("sampling_error"), Description("Relative sampling error of what was found.")]
    public double? SamplingError { get; } = Finite(trial.SamplingError);

    [JsonPropertyName("predicted"), Description("One sigma by the budget.")]
    public EffectSection Predicted { get; } = new(budget, trial.Predicted);

    [JsonPropertyName("found"), Description("One sigma found.")]
    public EffectSection Found { get; } = new(budget, trial.Found);

    [JsonPropertyName("beyond_linear"), Description("Deviation of what was found from the linear prediction, magnet by magnet.")]
    public EffectSection Residual { get; } = new(budget, trial.Residual);

    [JsonPropertyName("linear_not_enough_for"), Description("Quantities for which the linear budget is not enough, named as the members above.")]
    public IReadOnlyList<string> NotLinear { get; } = [.. EffectSection.Members.Where((_, q) => trial.IsBeyondLinear(q) || trial.Disagrees(q))];
}
