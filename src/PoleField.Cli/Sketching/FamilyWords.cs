using PoleField.Cli.Case;
using PoleField.Drawing;

namespace PoleField.Cli.Sketching;

/// <summary>A family of pole pairs in words: its options, and what a case of it starts with.</summary>
internal sealed record FamilyWords
{
    /// <summary>The family with its usual dimensions.</summary>
    public required PoleFamily Usual { get; init; }

    /// <summary>Its dimensions; the first is the leading length.</summary>
    public required IReadOnlyList<FamilyOption> Options { get; init; }

    /// <summary>The family with a larger or smaller frame.</summary>
    public Func<PoleFamily, double, PoleFamily> ScaleFrame { get; init; } = (family, _) => family;

    /// <summary>True when the pair has iron.</summary>
    public bool HasIron { get; init; } = true;

    /// <summary>Field at the beam when none is asked for, T.</summary>
    public double UsualField { get; init; } = 0.8;

    /// <summary>Half spacing of the wires whose field it makes, mm; null when it makes another field.</summary>
    public Func<PoleFamily, double?> HalfSpacing { get; init; } = _ => null;

    /// <summary>What the leading length is called.</summary>
    public required string LeadingLength { get; init; }

    /// <summary>All families, in the library's order.</summary>
    public static IReadOnlyList<FamilyWords> All { get; } = [.. PoleFamilies.All.Select(Of)];

    /// <summary>
    /// The family with the given dimensions. Lengths that are not given, the frame's included, keep their proportion to the leading length.
    /// </summary>
    public PoleFamily With(IReadOnlyDictionary<FamilyOption, double> given)
    {
        PoleFamily family = Usual;
        if (given.TryGetValue(Options[0], out double leading) && leading > 0 && double.IsFinite(leading))
        {
            double factor = leading / Options[0].Get(family);
            family = ScaleFrame(Options.Where(o => o.Scales).Aggregate(family, (f, o) => o.Set(f, factor * o.Get(f))), factor);
        }

        return Options.Where(given.ContainsKey).Aggregate(family, (f, o) => o.Set(f, given[o]));
    }

    private static FamilyWords Of(PoleFamily family) => family switch
    {
        TwoWirePair => TwoWire(),
        RoundWirePair => RoundWires(),
        EquipotentialPair pair => Equipotential(pair),
        _ => throw new InvalidOperationException($"The family {family.Name} has no words."),
    };

    private static FamilyWords TwoWire() => new()
    {
        Usual = new TwoWirePair(),
        LeadingLength = "half spacing",
        HalfSpacing = f => ((TwoWirePair)f).HalfSpacing,
        ScaleFrame = (f, factor) => ((TwoWirePair)f) with { Frame = ((TwoWirePair)f).Frame.Scaled(factor) },
        Options =
        [
            FamilyOption.Length<TwoWirePair>("--half-spacing", "Half the distance a of the imagined wires.", f => f.HalfSpacing, (f, v) => f with { HalfSpacing = v }),
            FamilyOption.Length<TwoWirePair>("--ridge-radius", "Radius of the ridge's face, a or more.", f => f.RidgeRadius, (f, v) => f with { RidgeRadius = v }),
            FamilyOption.Length<TwoWirePair>("--ridge-reach", "|y| where the ridge's face ends.", f => f.RidgeReach, (f, v) => f with { RidgeReach = v }),
            FamilyOption.Length<TwoWirePair>("--groove-radius", "Radius of the groove's face, a or more.", f => f.GrooveRadius, (f, v) => f with { GrooveRadius = v }),
            FamilyOption.Of<TwoWirePair>(
                "--groove-half-angle", "From the groove's apex to the end of its face.", Dimension.Direction, f => f.GrooveHalfAngle, (f, v) => f with { GrooveHalfAngle = v }),
            FamilyOption.Length<TwoWirePair>("--land-edge", "|y| to which a flat land continues the groove's face.", f => f.LandEdge, (f, v) => f with { LandEdge = v }),
            FamilyOption.Of<TwoWirePair>(
                "--beam-place", "Height of the beam above the wires, in a.", Dimension.Ratio, f => f.BeamPlace, (f, v) => f with { BeamPlace = v }),
            .. Beam<TwoWirePair>(f => f.Beam, (f, b) => f with { Beam = b }),
            .. Frame<TwoWirePair>(f => f.Frame, (f, frame) => f with { Frame = frame }),
        ],
    };

    private static FamilyWords RoundWires() => new()
    {
        Usual = new RoundWirePair(),
        LeadingLength = "half spacing",
        HalfSpacing = f => ((RoundWirePair)f).HalfSpacing,
        HasIron = false,
        UsualField = 0.01, // more would melt wires of a few millimetres
        Options =
        [
            FamilyOption.Length<RoundWirePair>("--half-spacing", "Half the distance a of the conductors' axes.", f => f.HalfSpacing, (f, v) => f with { HalfSpacing = v }),
            FamilyOption.Length<RoundWirePair>("--wire-radius", "Radius of the conductors, less than a.", f => f.WireRadius, (f, v) => f with { WireRadius = v }),
            FamilyOption.Of<RoundWirePair>(
                "--beam-place", "Height of the beam above the axes, in a.", Dimension.Ratio, f => f.BeamPlace, (f, v) => f with { BeamPlace = v }),
            .. Beam<RoundWirePair>(f => f.Beam, (f, b) => f with { Beam = b }),
        ],
    };

    private static FamilyWords Equipotential(EquipotentialPair usual) => new()
    {
        Usual = usual,
        LeadingLength = "B/G",
        ScaleFrame = (f, factor) => ((EquipotentialPair)f) with { Frame = ((EquipotentialPair)f).Frame.Scaled(factor) },
        Options =
        [
            FamilyOption.Length<EquipotentialPair>(
                "--field-over-gradient", "B/|G| at the beam, the length over which the field falls.", f => f.FieldOverGradient, (f, v) => f with { FieldOverGradient = v }),
            FamilyOption.Length<EquipotentialPair>("--ridge-distance", "From the beam down to the ridge.", f => f.RidgeDistance, (f, v) => f with { RidgeDistance = v }),
            FamilyOption.Length<EquipotentialPair>("--groove-distance", "From the beam up to the groove.", f => f.GrooveDistance, (f, v) => f with { GrooveDistance = v }),
            FamilyOption.Length<EquipotentialPair>("--ridge-reach", "|y| where the ridge's face ends.", f => f.RidgeReach, (f, v) => f with { RidgeReach = v }),
            FamilyOption.Length<EquipotentialPair>("--groove-reach", "|y| where the groove's face ends.", f => f.GrooveReach, (f, v) => f with { GrooveReach = v }),
            FamilyOption.Length<EquipotentialPair>("--land-edge", "|y| to which a flat land continues the groove's face.", f => f.LandEdge, (f, v) => f with { LandEdge = v }),
            FamilyOption.Of<EquipotentialPair>(
                "--face-tolerance", "Largest distance of the drawn arcs from the ideal face.", Dimension.Length, f => f.Tolerance, (f, v) => f with { Tolerance = v }),
            .. Beam<EquipotentialPair>(f => f.Beam, (f, b) => f with { Beam = b }),
            .. Frame<EquipotentialPair>(f => f.Frame, (f, frame) => f with { Frame = frame }),
        ],
    };

    private static IEnumerable<FamilyOption> Beam<T>(Func<T, BeamExtent> get, Func<T, BeamExtent, PoleFamily> set)
        where T : PoleFamily =>
    [
        FamilyOption.Length<T>("--beam-width", "Width of the beam along y.", f => get(f).Width, (f, v) => set(f, get(f) with { Width = v })),
        FamilyOption.Length<T>("--beam-height", "Height of the beam along z.", f => get(f).Height, (f, v) => set(f, get(f) with { Height = v })),
    ];

    // The frame's lengths grow together, with --frame-scale or the leading length; single ones are set after that.
    private static IEnumerable<FamilyOption> Frame<T>(Func<T, YokeFrame> get, Func<T, YokeFrame, PoleFamily> set)
        where T : PoleFamily =>
    [
        FamilyOption.Of<T>("--frame-scale", "Size of poles, yoke and coil windows against the usual.", Dimension.Ratio, _ => 1, (f, v) => set(f, get(f).Scaled(v))),
        FamilyOption.Of<T>("--pole-half-width", "Half the width of the pole bodies.", Dimension.Length, f => get(f).PoleHalfWidth, (f, v) => set(f, get(f) with { PoleHalfWidth = v })),
        FamilyOption.Of<T>("--flank-angle", "Slope of the poles' flanks against y.", Dimension.Direction, f => get(f).FlankAngle, (f, v) => set(f, get(f) with { FlankAngle = v })),
        FamilyOption.Of<T>("--yoke-thickness", "Thickness of the yoke.", Dimension.Length, f => get(f).Thickness, (f, v) => set(f, get(f) with { Thickness = v })),
    ];
}
