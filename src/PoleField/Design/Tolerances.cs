namespace PoleField.Design;

/// <summary>One sigma of everything that may be off; SI, zero where it is taken as right.</summary>
public sealed record Tolerances
{
    /// <summary>Form error of the iron faces along their normals, metres.</summary>
    public double FormSize { get; init; }

    /// <summary>Length along the face at which its correlation exp(−(Δs/length)²) has fallen to 1/e, metres.</summary>
    public double FormLength { get; init; } = 2e-3;

    /// <summary>Place of each iron part as a whole along y, metres.</summary>
    public double PlaceY { get; init; }

    /// <summary>Place of each iron part as a whole along z, metres.</summary>
    public double PlaceZ { get; init; }

    /// <summary>Turn of each iron part about the middle of its box, radians.</summary>
    public double Turn { get; init; }

    /// <summary>Ampere-turns of all coils together, relative.</summary>
    public double AmpereTurns { get; init; }

    /// <summary>Saturation polarisation of each material, relative.</summary>
    public double Saturation { get; init; }

    /// <summary>Place of the beam along y, metres.</summary>
    public double BeamY { get; init; }

    /// <summary>Place of the beam along z, metres.</summary>
    public double BeamZ { get; init; }
}

/// <summary>What one error does to each quantity.</summary>
/// <param name="Name">What is off: "form of RIDGE", "place of YOKE along y", ...</param>
/// <param name="Assumed">Its one sigma in words: "10 um over 2 mm".</param>
/// <param name="OneSigma">One sigma of each quantity of <see cref="ToleranceBudget.Quantities"/>, SI; not negative.</param>
/// <param name="Worst">The most it changes each quantity when everywhere at its one sigma with the worst sign, SI.</param>
public sealed record ToleranceContribution(
    string Name, string Assumed, IReadOnlyList<double> OneSigma, IReadOnlyList<double> Worst);

/// <summary>The loosest form tolerance of a stretch of a face.</summary>
/// <param name="Face">Index into the budget's faces.</param>
/// <param name="From">Arc length where it begins, metres.</param>
/// <param name="To">Arc length where it ends, metres.</param>
/// <param name="OneSigma">One sigma of its form error that the allowance leaves it, metres.</param>
public sealed record FormAllowance(int Face, double From, double To, double OneSigma);
