using System.ComponentModel;
using System.Text.Json.Nodes;
using System.Text.Json.Serialization;

namespace PoleField.Output.Results;

/// <summary>The plan of a sweep, <c>polefield-sweep-plan/1</c>: what is varied and from which inputs. Written once, before the first point.</summary>
public sealed record SweepPlanFile(
    [property: JsonPropertyName("format"), Description("Always polefield-sweep-plan/1.")] string Format,
    [property: JsonPropertyName("case"), Description("Name of the case file.")] string Case,
    [property: JsonPropertyName("title"), Description("Title of the case.")] string Title,
    [property: JsonPropertyName("program_version"), Description("Version of PoleField.")] string ProgramVersion,
    [property: JsonPropertyName("accuracy_asked"), Description("Accuracy set on the command line; null where the case sets it.")] double? Accuracy,
    [property: JsonPropertyName("inputs"), Description("All files that are read, with their SHA-256.")] IReadOnlyList<SweepInput> Inputs,
    [property: JsonPropertyName("axes"), Description("What is varied; the last axis runs fastest.")] IReadOnlyList<SweepAxis> Axes)
{
    /// <summary>Name and version of the format.</summary>
    public const string Name = "polefield-sweep-plan/1";
}

/// <summary>A file a sweep reads.</summary>
public sealed record SweepInput(
    [property: JsonPropertyName("file"), Description("Path as the case gives it.")] string File,
    [property: JsonPropertyName("sha256"), Description("SHA-256 of its bytes.")] string Sha256);

/// <summary>A varied value of the case.</summary>
public sealed record SweepAxis(
    [property: JsonPropertyName("name"), Description("Path of the value in the case file; * stands for any characters of a key.")] string Name,
    [property: JsonPropertyName("unit"), Description("Unit of the values; empty for none.")] string Unit,
    [property: JsonPropertyName("factor"), Description("True when the values multiply what the case says.")] bool Factor,
    [property: JsonPropertyName("values"), Description("The values: numbers in the unit, or words.")] IReadOnlyList<JsonNode> Values)
{
    /// <summary>Head of its column: the path and the unit.</summary>
    [JsonIgnore]
    public string Column => Factor ? Name + "_factor" : Unit.Length > 0 ? $"{Name}_{Unit}" : Name;
}

/// <summary>One finished point of a sweep, <c>polefield-sweep-point/1</c>.</summary>
public sealed record SweepPointFile(
    [property: JsonPropertyName("format"), Description("Always polefield-sweep-point/1.")] string Format,
    [property: JsonPropertyName("plan_sha256"), Description("SHA-256 of the plan's file.")] string PlanSha256,
    [property: JsonPropertyName("point"), Description("Number of the point, from 0.")] int Point,
    [property: JsonPropertyName("exit_status"), Description("What solve would have ended with: 0, 1, 2 or 3.")] int ExitStatus,
    [property: JsonPropertyName("reason"), Description("Why the status is not 0; empty when it is.")] string Reason,
    [property: JsonPropertyName("seconds"), Description("Wall-clock seconds.")] double Seconds,
    [property: JsonPropertyName("result"), Description("The result file of the point; null when there is none.")] ResultFile? Result)
{
    /// <summary>Name and version of the format.</summary>
    public const string Name = "polefield-sweep-point/1";
}

/// <summary>The table of a sweep, <c>polefield-sweep/1</c>.</summary>
public sealed record SweepTableFile(
    [property: JsonPropertyName("format"), Description("Always polefield-sweep/1.")] string Format,
    [property: JsonPropertyName("plan"), Description("What was varied.")] SweepPlanFile Plan,
    [property: JsonPropertyName("rows"), Description("One row per point, in order.")] IReadOnlyList<SweepRow> Rows)
{
    /// <summary>Name and version of the format.</summary>
    public const string Name = "polefield-sweep/1";
}

/// <summary>One row of the table; null where there is no value.</summary>
public sealed record SweepRow(
    [property: JsonPropertyName("point"), Description("Number of the point, from 0.")] int Point,
    [property: JsonPropertyName("values"), Description("The varied values in the order of the axes.")] IReadOnlyList<JsonNode> Values,
    [property: JsonPropertyName("exit_status"), Description("0, 1, 2 or 3 as of solve; null when the point has not been solved.")] int? ExitStatus,
    [property: JsonPropertyName("reason"), Description("Why the status is not 0.")] string Reason,
    [property: JsonPropertyName("field_T"), Description("B at the beam's centre.")] double? Field = null,
    [property: JsonPropertyName("field_error_T"), Description("Its error bar.")] double? FieldError = null,
    [property: JsonPropertyName("gradient_T_per_m"), Description("d|B|/dz at the beam's centre.")] double? Gradient = null,
    [property: JsonPropertyName("gradient_error_T_per_m"), Description("Its error bar.")] double? GradientError = null,
    [property: JsonPropertyName("mean_field_T"), Description("Mean of B over the aperture.")] double? MeanField = null,
    [property: JsonPropertyName("mean_gradient_T_per_m"), Description("Mean gradient over the aperture.")] double? MeanGradient = null,
    [property: JsonPropertyName("mean_gradient_error_T_per_m"), Description("Its error bar.")] double? MeanGradientError = null,
    [property: JsonPropertyName("gradient_spread"), Description("(max - min) / (2 |mean|) of the gradient.")] double? GradientSpread = null,
    [property: JsonPropertyName("gradient_rms"), Description("Standard deviation / |mean| of the gradient.")] double? GradientRms = null,
    [property: JsonPropertyName("field_spread"), Description("(max - min) / (2 |mean|) of the field.")] double? FieldSpread = null,
    [property: JsonPropertyName("clearance_mm"), Description("Smallest distance from the aperture to a part.")] double? Clearance = null,
    [property: JsonPropertyName("iron_field_max_T"), Description("Largest flux density in iron.")] double? IronFieldMax = null,
    [property: JsonPropertyName("saturated_share_max"), Description("Largest saturated share of an iron part.")] double? SaturatedShare = null,
    [property: JsonPropertyName("current_density_max_A_per_mm2"), Description("Largest current density in copper.")] double? CurrentDensity = null,
    [property: JsonPropertyName("ampere_turns_A"), Description("Sum of the positive ampere-turns.")] double? AmpereTurns = null,
    [property: JsonPropertyName("efficiency"), Description("Gap share of the ampere-turns.")] double? Efficiency = null,
    [property: JsonPropertyName("energy_J_per_m"), Description("Stored energy per metre of length.")] double? Energy = null,
    [property: JsonPropertyName("accuracy_reached"), Description("Largest relative error bar of field and gradient.")] double? Accuracy = null,
    [property: JsonPropertyName("unknowns"), Description("Unknowns of the solve.")] int? Unknowns = null,
    [property: JsonPropertyName("seconds"), Description("Wall-clock seconds of the point.")] double? Seconds = null);
