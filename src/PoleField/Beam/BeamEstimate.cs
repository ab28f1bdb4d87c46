using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>The beam's numbers of one solution, and the same numbers after one step in the next order: their difference is the error.</summary>
internal sealed record BeamEstimate
{
    /// <summary>Error bar over what the step in the next order changes.</summary>
    public const double ErrorBarFactor = 2.0;

    /// <summary>
    /// Added to the bar, times the share of the iron's corners. The next order removes only 1 − (p/(p + 1))^(8/3), about half, of a
    /// corner's error (field like r^(−1/3): Babuška and Suri 1987, recalled from memory), and shares of several corners may cancel
    /// in the difference and not in the error.
    /// </summary>
    public const double CornerFactor = 2.0;

    // Fits leave out the same high powers in both orders; on exact cases the factor before it covered all errors already.
    private const double LocalFitsFactor = 1.5;

    // At one point contributions may cancel in the estimate and not in the error: on the model problem the centre's field was
    // seen off by 4.5 times its estimate, and by at most 1.9 times the largest one over the aperture.
    private const double ElsewhereFactor = 2.0;
    private const double QuadratureTolerance = 1e-9;

    public required FieldSolution Solution { get; init; }

    public required IBeamExtraction Extraction { get; init; }

    public required BeamField Field { get; init; }

    public required BeamMeasures Measures { get; init; }

    public required BeamMeasures CorrectedMeasures { get; init; }

    public required HigherOrderStep Higher { get; init; }

    /// <summary>Shares of the elements in the goals of <see cref="BeamGoals"/>.</summary>
    public required ErrorShares Shares { get; init; }

    /// <summary>Elements at each corner of the iron.</summary>
    public required int[][] CornerElements { get; init; }

    /// <summary>Sum over the corners of the sizes of their shares in goal g at [g].</summary>
    public required double[] CornerShares { get; init; }

    /// <summary>Largest relative error bar of field and gradient over the aperture.</summary>
    public double Accuracy => Math.Max(
        Bar(Measures.FieldDifference(CorrectedMeasures), FieldCorners),
        Bar(Measures.GradientDifference(CorrectedMeasures), GradientCorners));

    /// <summary>Factor by which the bars are longer than with a harmonic band.</summary>
    public double Caution => Field.Method == BeamFieldMethod.LocalFits ? LocalFitsFactor : 1.0;

    private double FieldCorners => CornerShares[BeamGoals.CentreField];

    private double GradientCorners => CornerShares.Skip(BeamGoals.CentreGradient).Max();

    /// <summary>Takes the step in the next order and evaluates both.</summary>
    /// <param name="solution">The solution.</param>
    /// <param name="chi">Cut-off of the extraction, by node of the solution's space; null where no band fits.</param>
    /// <param name="place">Aperture and the places to look at.</param>
    /// <param name="threads">Threads.</param>
    /// <param name="cancellation">Checked between the parts.</param>
    public static BeamEstimate Of(
        FieldSolution solution, double[]? chi, BeamPlace place, int threads, CancellationToken cancellation)
    {
        IBeamExtraction extraction = ExtractionOf(solution.Problem, chi);
        BeamField field = extraction.FieldOf(place.Aperture, solution.Potential);
        HigherOrderStep higher = HigherOrderStep.From(solution, threads, cancellation);
        IBeamExtraction better = ExtractionOf(higher.Problem, chi is null ? null : higher.Lift.Up(chi));
        BeamField corrected = better.FieldOf(place.Aperture, higher.Potential);
        ErrorShares shares = higher.SharesOf(BeamGoals.Derivatives(better, corrected, place.Shape));
        int[][] corners = Beam.CornerElements.Of(solution.Mesh, solution.Magnet);
        return new BeamEstimate
        {
            Solution = solution,
            Extraction = extraction,
            Field = field,
            Measures = BeamMeasures.Of(field, place.Samples),
            CorrectedMeasures = BeamMeasures.Of(corrected, place.Samples),
            Higher = higher,
            Shares = shares,
            CornerElements = corners,
            CornerShares = SizesAt(corners, shares),
        };
    }

    /// <summary>The answer with its error bars.</summary>
    /// <param name="place">Aperture and the places to look at.</param>
    /// <param name="accuracyAsked">Relative accuracy that was asked for.</param>
    public BeamReport Report(BeamPlace place, double accuracyAsked)
    {
        double scale = Math.Min(place.Clearance, place.Aperture.Outline.Bounds.Diagonal);
        double check = ExtractionCheck.Worst(Extraction, place.Aperture, [place.Aperture.Centre, .. place.Shape.EdgePoints(1)], scale);
        double floor = Math.Max(check, QuadratureTolerance);
        double anywhere = ElsewhereFactor * Caution;
        return new BeamReport
        {
            Beam = Measures.Centre,
            Method = Field.Method,
            FieldError = Math.Max(
                Bar(Measures.Centre.Field, CorrectedMeasures.Centre.Field, FieldCorners * Measures.Centre.Field, floor),
                anywhere * Measures.FieldDifference(CorrectedMeasures) * Measures.Field.Largest),
            GradientError = Math.Max(
                Bar(Measures.Centre.Gradient, CorrectedMeasures.Centre.Gradient, GradientCorners * Measures.GradientScale, floor),
                anywhere * Measures.GradientDifference(CorrectedMeasures) * Measures.GradientScale),
            ApertureArea = place.Aperture.Outline.Area,
            Clearance = place.Clearance,
            Field = Measures.Field,
            Gradient = Measures.Gradient,
            GradientMeanError = Bar(
                Measures.Gradient.Mean, CorrectedMeasures.Gradient.Mean, GradientCorners * Measures.GradientScale, floor),
            FieldTimesGradient = Measures.FieldTimesGradient,
            ProfileY = Measures.ProfileY,
            ProfileZ = Measures.ProfileZ,
            Parts = PartReports.Of(Solution),
            Circuit = Circuit.Of(Solution, place.Aperture.Centre),
            Findings = [.. Doubts(place, check, accuracyAsked)],
        };
    }

    private static IBeamExtraction ExtractionOf(FieldProblem problem, double[]? chi) =>
        chi is null ? new LocalFits(problem) : BeamExtraction.Create(problem.Space, chi);

    private static double[] SizesAt(int[][] corners, ErrorShares shares)
    {
        double[][] ofElements = shares.Of([.. corners.SelectMany(c => c)]);
        return [.. ofElements.Select(goal =>
        {
            int next = 0;
            return corners.Sum(c => Math.Abs(c.Sum(_ => goal[next++])));
        })];
    }

    private IEnumerable<Finding> Doubts(BeamPlace place, double check, double accuracyAsked)
    {
        if (Field.Method == BeamFieldMethod.LocalFits)
        {
            yield return new Finding(
                Severity.Warning,
                "beam-at-part",
                FormattableString.Invariant(
                    $"The aperture comes within {1e3 * place.Clearance:g3} mm of a part: no band of air fits between them, so field and gradient were fitted place by place, with longer error bars."),
                "Give the aperture some clearance from the parts if the error bars are too long.")
            {
                At = place.Aperture.Centre,
            };
        }

        if (!(check <= accuracyAsked))
        {
            yield return new Finding(
                Severity.Warning,
                "extraction-check",
                FormattableString.Invariant($"The extraction's self-check is off by {check:g2}, more than the asked accuracy."),
                "Give the aperture more clearance, or ask for a finer accuracy so that the mesh there is refined.");
        }
    }

    private double Bar(double difference, double corners) => Caution * ((ErrorBarFactor * difference) + (CornerFactor * corners));

    private double Bar(double value, double corrected, double corners, double floor) =>
        Bar(Math.Abs(value - corrected), corners) + (floor * Math.Abs(value));
}
