using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>The beam's numbers of one solution, and the same numbers after one step in the next order: their difference is the error.</summary>
internal sealed record BeamEstimate
{
    // With corners in saturated iron the estimate was seen low by up to 2.7.
    public const double ErrorBarFactor = 3.0;

    // At one point contributions of many corners may cancel in the estimate and not in the error: on the model problem the
    // centre's field was seen off by 4.5 times its estimate, and by at most 1.9 times the largest one over the aperture.
    private const double ElsewhereFactor = 2.0;
    private const double QuadratureTolerance = 1e-9;

    public required FieldSolution Solution { get; init; }

    public required BeamExtraction Extraction { get; init; }

    public required BeamField Field { get; init; }

    public required BeamMeasures Measures { get; init; }

    public required BeamMeasures CorrectedMeasures { get; init; }

    public required HigherOrderStep Higher { get; init; }

    /// <summary>Extraction in the next order.</summary>
    public required BeamExtraction Better { get; init; }

    /// <summary>Field in the next order.</summary>
    public required BeamField Corrected { get; init; }

    /// <summary>Largest relative error bar of field and gradient over the aperture.</summary>
    public double Accuracy => ErrorBarFactor * Math.Max(
        Measures.FieldDifference(CorrectedMeasures), Measures.GradientDifference(CorrectedMeasures));

    /// <summary>Takes the step in the next order and evaluates both.</summary>
    /// <param name="solution">The solution.</param>
    /// <param name="chi">Cut-off of the extraction, by node of the solution's space.</param>
    /// <param name="place">Aperture and the places to look at.</param>
    /// <param name="threads">Threads.</param>
    /// <param name="cancellation">Checked between the parts.</param>
    public static BeamEstimate Of(
        FieldSolution solution, double[] chi, BeamPlace place, int threads, CancellationToken cancellation)
    {
        BeamExtraction extraction = BeamExtraction.Create(solution.Problem.Space, chi);
        BeamField field = extraction.FieldOf(place.Aperture, solution.Potential);
        HigherOrderStep higher = HigherOrderStep.From(solution, threads, cancellation);
        BeamExtraction better = BeamExtraction.Create(higher.Problem.Space, higher.Lift.Up(chi));
        BeamField corrected = better.FieldOf(place.Aperture, higher.Potential);
        return new BeamEstimate
        {
            Solution = solution,
            Extraction = extraction,
            Field = field,
            Measures = BeamMeasures.Of(field, place.Samples),
            CorrectedMeasures = BeamMeasures.Of(corrected, place.Samples),
            Higher = higher,
            Better = better,
            Corrected = corrected,
        };
    }

    /// <summary>The answer with its error bars.</summary>
    /// <param name="place">Aperture and the places to look at.</param>
    /// <param name="accuracyAsked">Relative accuracy that was asked for.</param>
    public BeamReport Report(BeamPlace place, double accuracyAsked)
    {
        double scale = Math.Min(place.Clearance, place.Aperture.Outline.Bounds.Diagonal);
        double check = Extraction.SelfCheck(place.Aperture, [place.Aperture.Centre, .. place.Shape.EdgePoints(1)], scale);
        double floor = Math.Max(check, QuadratureTolerance);
        return new BeamReport
        {
            Beam = Measures.Centre,
            FieldError = Math.Max(
                Bar(Measures.Centre.Field, CorrectedMeasures.Centre.Field, floor),
                ElsewhereFactor * Measures.FieldDifference(CorrectedMeasures) * Measures.Field.Largest),
            GradientError = Math.Max(
                Bar(Measures.Centre.Gradient, CorrectedMeasures.Centre.Gradient, floor),
                ElsewhereFactor * Measures.GradientDifference(CorrectedMeasures) * Measures.GradientScale),
            ApertureArea = place.Aperture.Outline.Area,
            Clearance = place.Clearance,
            Field = Measures.Field,
            Gradient = Measures.Gradient,
            GradientMeanError = Bar(Measures.Gradient.Mean, CorrectedMeasures.Gradient.Mean, floor),
            FieldTimesGradient = Measures.FieldTimesGradient,
            ProfileY = Measures.ProfileY,
            ProfileZ = Measures.ProfileZ,
            Parts = PartReports.Of(Solution),
            Circuit = Circuit.Of(Solution, place.Aperture.Centre),
            Findings = check <= accuracyAsked ? [] : [CheckFinding(check)],
        };
    }

    private static Finding CheckFinding(double check) => new(
        Severity.Warning,
        "extraction-check",
        FormattableString.Invariant($"The extraction's self-check is off by {check:g2}, more than the asked accuracy."),
        "Give the aperture more clearance, or ask for a finer accuracy so that the mesh there is refined.");

    private static double Bar(double value, double corrected, double floor) =>
        (ErrorBarFactor * Math.Abs(value - corrected)) + (floor * Math.Abs(value));
}

/// <summary>An aperture in its magnet, and the places at which it is looked at.</summary>
/// <param name="Aperture">The aperture.</param>
/// <param name="Shape">Its outline as a polygon.</param>
/// <param name="Samples">The places.</param>
/// <param name="Clearance">Distance to anything that is not air, metres.</param>
internal sealed record BeamPlace(Aperture Aperture, ApertureShape Shape, ApertureSamples Samples, double Clearance)
{
    /// <summary>Finds the aperture's place in a magnet.</summary>
    /// <exception cref="InputException">The aperture touches something that is not air, or lies inside it.</exception>
    public static BeamPlace In(Magnet magnet, Aperture aperture)
    {
        double clearance = Beam.Clearance.Of(magnet, aperture);
        Point centre = aperture.Centre;
        int region = SectionPoint.RegionAt(magnet.Section, centre);
        bool inside = Beam.Clearance.IsSolid(magnet, region);
        bool outside = region == CrossSection.Outside;
        if (clearance > 0.0 && !inside && !outside)
        {
            var shape = new ApertureShape(aperture);
            return new BeamPlace(aperture, shape, ApertureSamples.Of(aperture, shape), clearance);
        }

        string? layer = inside ? magnet.Section.Parts[magnet.Section.Regions[region].Part] : null;
        string problem = outside ? "lies outside the model's rim"
            : layer is null ? "touches or crosses a part of iron, a magnet or a conductor"
            : $"lies inside the part on layer {layer}";
        throw new InputException([new Finding(
            Severity.Fault,
            "beam-in-part",
            FormattableString.Invariant(
                $"The beam's aperture around ({1e3 * centre.Y:g6}, {1e3 * centre.Z:g6}) mm {problem}."),
            "Move or shrink the aperture so that it lies in air.") { At = centre, Layer = layer }]);
    }
}
