using System.ComponentModel;
using System.Text.Json.Serialization;

namespace PoleField.Output.Results;

// The [Description] texts are the documentation of the properties and of the published schema alike.
// Values that may be missing for a sound reason (a ratio without a denominator) are null in the file, never NaN.

/// <summary>The result file <c>polefield-result/1</c> as it is nested: lengths in mm, everything else SI.</summary>
public sealed record ResultFile(
    [property: JsonPropertyName("format"), Description("Always polefield-result/1.")] string Format,
    [property: JsonPropertyName("title"), Description("Title of the case.")] string Title,
    [property: JsonPropertyName("case_sha256"), Description("SHA-256 of the case file.")] string CaseSha256,
    [property: JsonPropertyName("sketch_sha256"), Description("SHA-256 of the sketch.")] string SketchSha256,
    [property: JsonPropertyName("program_version"), Description("Version of PoleField.")] string ProgramVersion,
    [property: JsonPropertyName("beam"), Description("Values at the beam's centre.")] BeamSection Beam,
    [property: JsonPropertyName("aperture"), Description("Statistics over the aperture.")] ApertureSection Aperture,
    [property: JsonPropertyName("parts"), Description("The parts in the order of the case.")] IReadOnlyList<PartSection> Parts,
    [property: JsonPropertyName("circuit"), Description("Balance of the magnetic circuit.")] CircuitSection Circuit,
    [property: JsonPropertyName("mesh"), Description("The last mesh.")] MeshSection Mesh,
    [property: JsonPropertyName("run"), Description("How the answer was reached.")] RunSection Run,
    [property: JsonPropertyName("require"), Description("The case's requirements.")] IReadOnlyList<RequireSection> Require,
    [property: JsonPropertyName("cautions"), Description("What a two-dimensional solve cannot know, and safety.")] IReadOnlyList<string> Cautions,
    [property: JsonPropertyName("warnings"), Description("Doubts of this run.")] IReadOnlyList<WarningSection> Warnings,
    [property: JsonPropertyName("materials"), Description("Materials of the parts, each once.")] IReadOnlyList<MaterialSection>? Materials = null,
    [property: JsonPropertyName("operation"), Description("Heat, pull, energy, inductance and stray field; without the magnet's ends.")] OperationSection? Operation = null);

/// <summary>Values at the beam's centre.</summary>
public sealed record BeamSection(
    [property: JsonPropertyName("y_mm"), Description("Centre, across the deflection.")] double? Y,
    [property: JsonPropertyName("z_mm"), Description("Centre, along the deflection.")] double? Z,
    [property: JsonPropertyName("field_T"), Description("B = |B|.")] double? Field,
    [property: JsonPropertyName("field_error_T"), Description("Error bar of B (discretisation).")] double? FieldError,
    [property: JsonPropertyName("by_T"), Description("Flux density along y.")] double? By,
    [property: JsonPropertyName("bz_T"), Description("Flux density along z.")] double? Bz,
    [property: JsonPropertyName("gradient_T_per_m"), Description("G = d|B|/dz, signed.")] double? Gradient,
    [property: JsonPropertyName("gradient_error_T_per_m"), Description("Error bar of G (discretisation).")] double? GradientError,
    [property: JsonPropertyName("dbz_dz_T_per_m"), Description("dBz/dz; differs from G off the mid-plane.")] double? DBzDz,
    [property: JsonPropertyName("dby_dz_T_per_m"), Description("dBy/dz = dBz/dy.")] double? DByDz,
    [property: JsonPropertyName("transverse_gradient_T_per_m"), Description("d|B|/dy, signed.")] double? TransverseGradient,
    [property: JsonPropertyName("method"), Description("harmonic-band: one exactly harmonic function; local-fits: fitted place by place beside a part, with longer error bars.")] string Method);

/// <summary>Statistics over the aperture, area-weighted.</summary>
public sealed record ApertureSection(
    [property: JsonPropertyName("area_mm2"), Description("Area.")] double? Area,
    [property: JsonPropertyName("clearance_mm"), Description("Smallest distance to anything that is not air.")] double? Clearance,
    [property: JsonPropertyName("field"), Description("B over the aperture.")] FieldStatistics Field,
    [property: JsonPropertyName("gradient"), Description("G over the aperture.")] GradientStatistics Gradient,
    [property: JsonPropertyName("field_times_gradient"), Description("B·G over the aperture, for induced moments.")] ProductStatistics FieldTimesGradient,
    [property: JsonPropertyName("profile_y"), Description("Values along y through the centre, edge to edge.")] IReadOnlyList<ProfileAlongY> ProfileY,
    [property: JsonPropertyName("profile_z"), Description("Values along z through the centre, edge to edge.")] IReadOnlyList<ProfileAlongZ> ProfileZ);

/// <summary>Statistics of the field.</summary>
public sealed record FieldStatistics(
    [property: JsonPropertyName("mean_T"), Description("Mean.")] double? Mean,
    [property: JsonPropertyName("min_T"), Description("Smallest.")] double? Min,
    [property: JsonPropertyName("max_T"), Description("Largest.")] double? Max,
    [property: JsonPropertyName("spread"), Description("(max - min) / (2 |mean|).")] double? Spread,
    [property: JsonPropertyName("rms"), Description("Standard deviation / |mean|.")] double? Rms);

/// <summary>Statistics of the gradient.</summary>
public sealed record GradientStatistics(
    [property: JsonPropertyName("mean_T_per_m"), Description("Mean.")] double? Mean,
    [property: JsonPropertyName("min_T_per_m"), Description("Smallest.")] double? Min,
    [property: JsonPropertyName("max_T_per_m"), Description("Largest.")] double? Max,
    [property: JsonPropertyName("spread"), Description("(max - min) / (2 |mean|).")] double? Spread,
    [property: JsonPropertyName("rms"), Description("Standard deviation / |mean|.")] double? Rms,
    [property: JsonPropertyName("error_T_per_m"), Description("Error bar of the mean (discretisation).")] double? Error);

/// <summary>Statistics of field times gradient.</summary>
public sealed record ProductStatistics(
    [property: JsonPropertyName("mean_T2_per_m"), Description("Mean.")] double? Mean,
    [property: JsonPropertyName("spread"), Description("(max - min) / (2 |mean|).")] double? Spread,
    [property: JsonPropertyName("rms"), Description("Standard deviation / |mean|.")] double? Rms,
    [property: JsonPropertyName("min_T2_per_m"), Description("Smallest.")] double? Min = null,
    [property: JsonPropertyName("max_T2_per_m"), Description("Largest.")] double? Max = null);

/// <summary>One place of the profile along y.</summary>
public sealed record ProfileAlongY(
    [property: JsonPropertyName("y_mm"), Description("Place.")] double? Y,
    [property: JsonPropertyName("field_T"), Description("B.")] double? Field,
    [property: JsonPropertyName("gradient_T_per_m"), Description("G.")] double? Gradient);

/// <summary>One place of the profile along z.</summary>
public sealed record ProfileAlongZ(
    [property: JsonPropertyName("z_mm"), Description("Place.")] double? Z,
    [property: JsonPropertyName("field_T"), Description("B.")] double? Field,
    [property: JsonPropertyName("gradient_T_per_m"), Description("G.")] double? Gradient);

/// <summary>What became of one part. Keys that do not apply to its kind are left out.</summary>
public sealed record PartSection(
    [property: JsonPropertyName("layer"), Description("Layer of the sketch.")] string Layer,
    [property: JsonPropertyName("kind"), Description("iron, coil, magnet or air.")] string Kind,
    [property: JsonPropertyName("material"), Description("Material.")] string Material,
    [property: JsonPropertyName("area_mm2"), Description("Exact area of the curves.")] double? Area,
    [property: JsonPropertyName("loops"), Description("Closed outlines.")] int Loops,
    [property: JsonPropertyName("ampere_turns"), Description("Ampere-turns of each outline.")] double? AmpereTurns = null,
    [property: JsonPropertyName("current_density_A_per_mm2"), Description("Current density in the copper.")] double? CurrentDensity = null,
    [property: JsonPropertyName("field_max_T"), Description("Largest flux density.")] double? FieldMax = null,
    [property: JsonPropertyName("field_max_at_mm"), Description("Where it is: [y, z].")] IReadOnlyList<double>? FieldMaxAt = null,
    [property: JsonPropertyName("field_p99_T"), Description("Flux density that 99 % of the area stays below.")] double? FieldP99 = null,
    [property: JsonPropertyName("saturated_share"), Description("Share of the area polarised above 90 % of saturation.")] double? SaturatedShare = null,
    [property: JsonPropertyName("mmf_drop_A"), Description("Ampere-turns dropped along the main flux path.")] double? MmfDrop = null,
    [property: JsonPropertyName("force_N_per_m"), Description("Magnetic force per metre of length: [y, z].")] IReadOnlyList<double>? Force = null,
    [property: JsonPropertyName("force_other_way_N_per_m"), Description("The same by another law: stress around conductors, stress along a closed path around iron; the difference is the force's error.")] IReadOnlyList<double>? ForceOtherWay = null,
    [property: JsonPropertyName("force_on_free_faces_only"), Description("True when the part is joined to other iron and the force is the pull on its faces in air alone.")] bool? ForceOnFreeFacesOnly = null);

/// <summary>Balance of the magnetic circuit.</summary>
public sealed record CircuitSection(
    [property: JsonPropertyName("ampere_turns"), Description("Sum of the positive ampere-turns.")] double? AmpereTurns,
    [property: JsonPropertyName("gap_ampere_turns"), Description("Integral of H across the gap through the beam.")] double? GapAmpereTurns,
    [property: JsonPropertyName("iron_ampere_turns"), Description("The rest.")] double? IronAmpereTurns,
    [property: JsonPropertyName("efficiency"), Description("Gap share of the ampere-turns; null without currents.")] double? Efficiency,
    [property: JsonPropertyName("energy_J_per_m"), Description("Stored energy per metre of length.")] double? Energy,
    [property: JsonPropertyName("inductance_uH_per_m_turn2"), Description("Inductance per metre and turn squared; null without currents.")] double? Inductance,
    [property: JsonPropertyName("gap_pull_N_per_m"), Description("Pull across the horizontal line through the beam per metre of length; positive when the poles attract each other.")] double? GapPull = null);

/// <summary>The last mesh.</summary>
public sealed record MeshSection(
    [property: JsonPropertyName("triangles"), Description("Triangles.")] int Triangles,
    [property: JsonPropertyName("unknowns"), Description("Unknowns of the solve.")] int Unknowns,
    [property: JsonPropertyName("order"), Description("Order of the elements.")] int Order,
    [property: JsonPropertyName("smallest_angle_deg"), Description("Smallest angle.")] double? SmallestAngle);

/// <summary>How the answer was reached.</summary>
public sealed record RunSection(
    [property: JsonPropertyName("newton_steps"), Description("Newton steps of all solves.")] int NewtonSteps,
    [property: JsonPropertyName("adaptive_steps"), Description("Meshes refined.")] int AdaptiveSteps,
    [property: JsonPropertyName("meshes"), Description("Mesh by mesh, how the accuracy was reached.")] IReadOnlyList<RoundSection> Meshes,
    [property: JsonPropertyName("seconds"), Description("Wall-clock seconds.")] SecondsSection Seconds,
    [property: JsonPropertyName("peak_memory_MB"), Description("Largest memory held, 10^6 bytes.")] double? PeakMemory,
    [property: JsonPropertyName("accuracy_reached"), Description("Largest relative error bar of field and gradient.")] double? AccuracyReached,
    [property: JsonPropertyName("accuracy_asked"), Description("Relative accuracy asked for.")] double? AccuracyAsked);

/// <summary>One mesh of the run.</summary>
public sealed record RoundSection(
    [property: JsonPropertyName("triangles"), Description("Triangles.")] int Triangles,
    [property: JsonPropertyName("unknowns"), Description("Unknowns.")] int Unknowns,
    [property: JsonPropertyName("newton_steps"), Description("Newton steps on it.")] int NewtonSteps,
    [property: JsonPropertyName("accuracy"), Description("Largest relative error bar of field and gradient over the aperture.")] double? Accuracy);

/// <summary>Wall-clock seconds.</summary>
public sealed record SecondsSection(
    [property: JsonPropertyName("read"), Description("Reading.")] double? Read,
    [property: JsonPropertyName("mesh"), Description("Meshing.")] double? Mesh,
    [property: JsonPropertyName("solve"), Description("Solving.")] double? Solve,
    [property: JsonPropertyName("evaluate"), Description("Evaluating.")] double? Evaluate,
    [property: JsonPropertyName("total"), Description("The whole run.")] double? Total);

/// <summary>One requirement.</summary>
public sealed record RequireSection(
    [property: JsonPropertyName("name"), Description("Key of the case file.")] string Name,
    [property: JsonPropertyName("unit"), Description("Unit of wanted and found; 1 for ratios.")] string Unit,
    [property: JsonPropertyName("wanted"), Description("Limit.")] double? Wanted,
    [property: JsonPropertyName("found"), Description("Value found; null when it could not be found.")] double? Found,
    [property: JsonPropertyName("met"), Description("True when the limit is kept.")] bool Met);

/// <summary>One doubt.</summary>
public sealed record WarningSection(
    [property: JsonPropertyName("where"), Description("File, layer or place.")] string Where,
    [property: JsonPropertyName("text"), Description("What was seen and what to do.")] string Text);

/// <summary>One material and where its numbers come from.</summary>
public sealed record MaterialSection(
    [property: JsonPropertyName("name"), Description("Name, as in parts.")] string Name,
    [property: JsonPropertyName("description"), Description("What it is.")] string Text,
    [property: JsonPropertyName("source"), Description("Where its curve comes from.")] string Source,
    [property: JsonPropertyName("state"), Description("State of the sample: heat treatment, form, scatter.")] string State,
    [property: JsonPropertyName("caution"), Description("What the numbers cannot promise; null when there is nothing to say.")] string? Caution);

/// <summary>What running the magnet takes and what is around it.</summary>
public sealed record OperationSection(
    [property: JsonPropertyName("length_mm"), Description("Length along the beam; null when not stated, and then the values over the length are null too.")] double? Length,
    [property: JsonPropertyName("coil_temperature_C"), Description("Temperature of the warm winding.")] double? Celsius,
    [property: JsonPropertyName("heat_W_at_20_C"), Description("Heat of all coils over the length at 20 degrees Celsius.")] double? ColdHeat,
    [property: JsonPropertyName("heat_W_warm"), Description("The same at coil_temperature_C.")] double? WarmHeat,
    [property: JsonPropertyName("heat_W_per_m_at_20_C"), Description("Heat of all coils per metre; null when no coil states its copper share.")] double? ColdHeatPerMetre,
    [property: JsonPropertyName("heat_W_per_m_warm"), Description("The same at coil_temperature_C.")] double? WarmHeatPerMetre,
    [property: JsonPropertyName("gap_pull_N"), Description("Pull between the poles over the length.")] double? Pull,
    [property: JsonPropertyName("energy_J"), Description("Stored energy over the length: what a switch-off must take up.")] double? Energy,
    [property: JsonPropertyName("inductance_uH_per_turn2"), Description("Inductance over the length, flux linkage per current; times the turns squared.")] double? Inductance,
    [property: JsonPropertyName("linkage_Wb_per_turn"), Description("Flux linked with one turn over the length; over the time of a switch-off it is the mean voltage of a turn.")] double? Linkage,
    [property: JsonPropertyName("coils"), Description("Coils whose copper share is stated.")] IReadOnlyList<CoilSection> Coils,
    [property: JsonPropertyName("stray_field"), Description("How far the field around the magnet exceeds a level; empty where it does not fall off.")] IReadOnlyList<StraySection> Stray);

/// <summary>One coil.</summary>
public sealed record CoilSection(
    [property: JsonPropertyName("layer"), Description("Layer of the sketch.")] string Layer,
    [property: JsonPropertyName("copper_area_mm2"), Description("Copper of all its outlines.")] double? CopperArea,
    [property: JsonPropertyName("current_density_A_per_mm2"), Description("Current density in the copper.")] double? CurrentDensity,
    [property: JsonPropertyName("heat_W_per_m_at_20_C"), Description("Heat per metre of length.")] double? ColdHeat,
    [property: JsonPropertyName("heat_W_per_m_warm"), Description("The same at coil_temperature_C.")] double? WarmHeat);

/// <summary>Reach of a level of stray field.</summary>
public sealed record StraySection(
    [property: JsonPropertyName("level_mT"), Description("Flux density.")] double? Level,
    [property: JsonPropertyName("distance_m"), Description("Distance from the middle of the section beyond which it stays below; null when not known.")] double? Distance,
    [property: JsonPropertyName("is_bound"), Description("True when it is weaker already on the circle around the section, whose radius the distance then is.")] bool IsBound);
