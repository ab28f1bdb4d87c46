using PoleField.Beam;
using PoleField.Cli.Sketching;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Case;

/// <summary>A case: the sketch, what its layers are, the beam, and what is asked. All values SI, all checked.</summary>
internal sealed record CaseFile
{
    /// <summary>Title; the file's name when it gives none.</summary>
    public required string Title { get; init; }

    public required SketchSection Sketch { get; init; }

    /// <summary>Parts in the order of the file, at least one.</summary>
    public required IReadOnlyList<PartSection> Parts { get; init; }

    public required SurroundingsSection Surroundings { get; init; }

    /// <summary>The sketch shows y ≥ 0 only.</summary>
    public bool MirrorLeftRight { get; init; }

    public required BeamSection Beam { get; init; }

    /// <summary>What is stated about the magnet's use: length, warm coils, levels of stray field.</summary>
    public OperationSetup Operation { get; init; } = OperationSetup.Default;

    /// <summary>Length along the beam, metres; null when not stated.</summary>
    public double? Length => Operation.Length;

    /// <summary>Relative accuracy of field and gradient over the aperture.</summary>
    public double Accuracy { get; init; } = 1e-4;

    /// <summary>What must hold.</summary>
    public IReadOnlyList<Limit> Require { get; init; } = [];

    public required TwoWireSection TwoWire { get; init; }

    /// <summary>What is known of the wires that the poles follow.</summary>
    public StatedWires Wires => new(TwoWire.HalfSpacing, TwoWire.Midpoint);

    public required RampSection Ramp { get; init; }

    public required MapSection Map { get; init; }

    /// <summary>Null when the case does not ask for tuning.</summary>
    public TuneSection? Tune { get; init; }

    /// <summary>Null when the case states no tolerances.</summary>
    public ToleranceSection? Tolerance { get; init; }

    /// <summary>Null when the case flies no beam.</summary>
    public FlightSection? Flight { get; init; }
}

/// <param name="File">Path as written, relative to the case file.</param>
/// <param name="Unit">Drawing unit, overriding the drawing's own.</param>
/// <param name="Join">End points closer than this are one point, metres.</param>
/// <param name="At">Place of the file's name in the case.</param>
internal sealed record SketchSection(string File, LengthUnit? Unit, double Join, Spot At);

/// <summary>A layer that is a part.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="Substance">What it is made of.</param>
/// <param name="AmpereTurns">Ampere-turns of each closed outline, A; null where no current is stated.</param>
/// <param name="Fill">Copper share of the outline.</param>
/// <param name="At">Place in the case file.</param>
internal sealed record PartSection(string Layer, Substance Substance, double? AmpereTurns, double? Fill, Spot At);

/// <summary>What a part is made of.</summary>
internal abstract record Substance
{
    /// <summary>Parts with equal keys may touch and overlap.</summary>
    public abstract string Key { get; }
}

/// <summary>A built-in material, or air.</summary>
internal sealed record NamedSubstance(string Name, Spot At) : Substance
{
    /// <summary>What coils are wound of.</summary>
    public const string Copper = "copper";

    public override string Key => Name;
}

/// <summary>A measured curve from a file, relative to the case file.</summary>
internal sealed record CurveFileSubstance(string File, Spot At) : Substance
{
    public override string Key => "file " + File;
}

/// <summary>Constant permeability.</summary>
internal sealed record LinearSubstance(double RelativePermeability) : Substance
{
    public override string Key => FormattableString.Invariant($"permeability {RelativePermeability:R}");
}

/// <summary>A permanent magnet: remanence T, recoil permeability, direction in radians from +y towards +z.</summary>
internal sealed record MagnetSubstance(double Remanence, double RecoilPermeability, double Direction) : Substance
{
    public override string Key => FormattableString.Invariant($"magnet {Remanence:R} {RecoilPermeability:R} {Direction:R}");
}

/// <param name="RimLayer">Layer that bounds the model; null for open surroundings.</param>
/// <param name="AppliedField">Uniform background (By, Bz), T.</param>
internal sealed record SurroundingsSection(string? RimLayer, Point AppliedField);

/// <summary>Where the beam flies.</summary>
internal abstract record BeamSection;

internal sealed record BeamOnLayer(string Layer) : BeamSection;

internal sealed record BeamRectangle(Point Centre, double Width, double Height) : BeamSection;

/// <summary>Stated wires; what is null is fitted.</summary>
internal sealed record TwoWireSection(double? HalfSpacing, Point? Midpoint);

/// <param name="Factors">Of the case's ampere-turns.</param>
/// <param name="Onset">Fall of gradient per ampere-turn that counts as saturation.</param>
internal sealed record RampSection(IReadOnlyList<double> Factors, double Onset)
{
    /// <summary>What is run when the case says nothing.</summary>
    public static RampSection Default { get; } = new([0.1, 0.25, 0.5, 0.75, 1.0, 1.25, 1.5], 0.02);
}

/// <summary>Grid of the field map; what is null follows from the aperture.</summary>
internal sealed record MapSection(Point? From, Point? To, double? Step);

/// <summary>What tuning may change, what it makes small and what must stay.</summary>
internal sealed record TuneSection
{
    /// <summary>Faces that may move; empty when dimensions are tuned.</summary>
    public IReadOnlyList<TuneFace> Faces { get; init; } = [];

    /// <summary>Dimensions that may change instead; null for faces.</summary>
    public TuneFamily? Family { get; init; }

    /// <summary>Largest normal displacement, metres.</summary>
    public double? Reach { get; init; }

    /// <summary>Smooth modes per face.</summary>
    public required int Freedoms { get; init; }

    /// <summary>Concave curvature radius that is kept, metres; null for none.</summary>
    public double? SmallestRadius { get; init; }

    /// <summary>What is made small.</summary>
    public TuneGoal Goal { get; init; }

    /// <summary>What must stay.</summary>
    public IReadOnlyList<Limit> Hold { get; init; } = [];
}

/// <summary>The family that drew the sketch, with the dimensions it had, and those that may change.</summary>
/// <param name="Family">Family with the sketch's dimensions.</param>
/// <param name="Each">Dimensions that may change, with their ranges in the shown unit.</param>
/// <param name="At">Place in the case file.</param>
internal sealed record TuneFamily(PoleFamily Family, IReadOnlyList<(FamilyOption Option, double Low, double High)> Each, Spot At);

/// <summary>A layer's air-facing outline, or the stretch of it between two places (metres).</summary>
internal sealed record TuneFace(string Layer, Point? From, Point? To);

internal enum TuneGoal
{
    GradientSpread,
    FieldTimesGradientSpread,
}

/// <summary>One sigma of everything that may be off; SI, null where not stated.</summary>
internal sealed record ToleranceSection
{
    /// <summary>Profile error along a face, metres.</summary>
    public double? FormSize { get; init; }

    /// <summary>Its correlation length, metres.</summary>
    public double? FormLength { get; init; }

    public double? PlaceY { get; init; }

    public double? PlaceZ { get; init; }

    /// <summary>Turn of each iron part, radians.</summary>
    public double? Turn { get; init; }

    /// <summary>Relative.</summary>
    public double? AmpereTurns { get; init; }

    /// <summary>Relative, of the saturation polarisation.</summary>
    public double? Saturation { get; init; }

    public double? BeamY { get; init; }

    public double? BeamZ { get; init; }

    /// <summary>Allowed relative one sigma of the gradient by form errors; the loosest form tolerance per stretch of face follows.</summary>
    public double? AllowGradient { get; init; }
}

/// <param name="Species">The beam's particles.</param>
/// <param name="Source">Their speeds.</param>
/// <param name="Drift">Magnet exit to detector, metres.</param>
/// <param name="SlitWidth">Beam along y at the magnet's entrance, metres.</param>
/// <param name="SlitHeight">Beam along z there, metres.</param>
internal sealed record FlightSection(FlightSpecies Species, FlightSource Source, double Drift, double? SlitWidth, double? SlitHeight);

/// <summary>Built-in species by name, or mass (kg) and moment (J/T), fixed or relaxed at a temperature (K).</summary>
internal sealed record FlightSpecies(string? Name, double? Mass, double? Moment, double? RelaxedAt = null);

/// <summary>Effusive source of a temperature (K), or a speed (m/s) with a relative full width at half maximum.</summary>
internal sealed record FlightSource(double? Temperature, double? Speed, double? Width);
