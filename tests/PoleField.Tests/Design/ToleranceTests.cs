// Truth: closed forms of Gaussian statistics (a form error fully correlated along a face is a rigid growth; an uncorrelated one
// adds squares), and Monte-Carlo of full re-solves of magnets with random errors.
using PoleField.Beam;
using PoleField.Design;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Design;

public class ToleranceTests
{
    private static readonly Aperture Beam = Drawn.Beam(0, 15, 3, 1);

    [Fact]
    public void AFormErrorOfOnePieceIsAGrownCylinder()
    {
        Magnet magnet = Cylinder();
        Sensitivity s = Sensitivity.Of(FixedMeshSolve.Of(magnet, new FixedMeshOptions(Beam, 1) { Order = 4 }));
        var budget = ToleranceBudget.Of(s, new Tolerances { FormSize = 1e-5, FormLength = 10 });

        // k = 999/1001 in a background of 1 T: dB/dR = 2 k R/z².
        double expected = 1e-5 * 2 * (999.0 / 1001) * 0.01 / (0.015 * 0.015);
        Assert.Single(budget.Contributions);
        Assert.Equal(1.0, budget.Total[0] / expected, 1e-3);
    }

    [Fact]
    public void FormErrorsWithoutCorrelationAddTheirSquares()
    {
        Face face = Assert.Single(Face.Of(Cylinder()));
        (double At, double Weight)[] points = [.. Enumerable.Range(0, 50).Select(k => ((k + 0.5) * face.Length / 50, k - 20.0))];

        Assert.Equal(points.Sum(p => p.Weight * p.Weight), FormError.Variance(face, points, 1e-5), 1e-6);
        Assert.Equal(Math.Pow(points.Sum(p => p.Weight), 2), FormError.Variance(face, points, 1e3), 1e-2);
    }

    [Fact]
    public void DrawnFormErrorsHaveTheStatedSizeAndCorrelation()
    {
        Face face = Assert.Single(Face.Of(Cylinder()));
        const double length = 2e-3;
        var random = new Random(7);
        double square = 0, product = 0;
        const int draws = 4000;
        for (int k = 0; k < draws; k++)
        {
            Func<double, double> form = FormError.Draw(face, length, random);
            square += form(0.01) * form(0.01) / draws;
            product += form(0.01) * form(0.01 + length) / draws;
        }

        Assert.Equal(1.0, square, 0.1); // four sigma of 4000 draws
        Assert.Equal(Math.Exp(-1), product, 0.08);
    }

    [Fact]
    public void TheAllowanceSpendsExactlyWhatIsAllowed()
    {
        Sensitivity s = Sensitivity.Of(FixedMeshSolve.Of(Cylinder(), new FixedMeshOptions(Beam, 1)));
        var budget = ToleranceBudget.Of(s, new Tolerances { FormSize = 1e-5, FormLength = 1e-3 });
        double allowed = 0.005 * Math.Abs(budget.Derivatives[1].Value);
        IReadOnlyList<FormAllowance> stretches = budget.Allowances(1, allowed, 1.0);

        double spent = stretches.Sum(x => x.OneSigma * x.OneSigma
            * FormError.Variance(budget.Faces[0], budget.Weighted(0, 1, x.From, x.To), 1e-3));
        Assert.InRange(Math.Sqrt(spent) / allowed, 0.9, 1.0 + 1e-9);
        Assert.True(stretches.MinBy(x => x.OneSigma)!.OneSigma < 1e-2 * stretches.MaxBy(x => x.OneSigma)!.OneSigma);
    }

    [Fact]
    public void TheLinearBudgetAgreesWithReSolvedMagnets()
    {
        Magnet magnet = Cylinder(MaterialLibrary.Get("mild-steel"));
        Sensitivity s = Sensitivity.Of(FixedMeshSolve.Of(magnet, new FixedMeshOptions(Beam, 1)));
        var budget = ToleranceBudget.Of(s, new Tolerances
        {
            FormSize = 20e-6,
            FormLength = 6e-3,
            PlaceY = 20e-6,
            PlaceZ = 20e-6,
            Turn = 1e-3,
            Saturation = 0.005,
            BeamY = 20e-6,
            BeamZ = 20e-6,
        });

        ToleranceTrial trial = ToleranceTrial.Run(budget, Beam, new TrialOptions(12, 1));

        // The spread of a symmetric magnet has a kink there: it grows with a shift of either sign.
        foreach (int q in new[] { 0, 1, 3 })
        {
            Assert.InRange(trial.Residual[q] / trial.Found[q], 0, 0.05);
            Assert.InRange(trial.Found[q] / trial.Predicted[q], 1 - (3 * trial.SamplingError), 1 + (3 * trial.SamplingError));
            Assert.False(trial.IsBeyondLinear(q) || trial.Disagrees(q));
        }
    }

    private static Magnet Cylinder(Material? material = null) => new Drawn()
        .Circle("ROOM", 0, 0, 30).Circle("IRON", 0, 0, 10)
        .Part("IRON", material ?? new Material("linear", new LinearLaw(1000), "", "", "")).Part("ROOM", Material.Air)
        .Magnet(new Point(0, 1));
}
