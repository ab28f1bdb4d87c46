// Truth: a run that may not refine cannot reach an accuracy that its first mesh misses; it must say so, with the bars it has.
using PoleField.Beam;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Beam;

public class AccuracyLimitTests
{
    [Fact]
    public void WithoutRefinementTheAccuracyIsMissedAndSaid() =>
        AssertMissed(new SolveOptions { Accuracy = 1e-7, MostAdaptiveSteps = 0 });

    [Fact]
    public void WithFewUnknownsTheAccuracyIsMissedAndSaid() =>
        AssertMissed(new SolveOptions { Accuracy = 1e-7, MostUnknowns = 100_000 });

    private static void AssertMissed(SolveOptions options)
    {
        SolvedMagnet solved = ModelProblemTests.Solve(options);

        Assert.False(solved.Record.AccuracyMet);
        Assert.Equal(0, solved.Record.AdaptiveSteps);
        Assert.Equal(solved.Record.AccuracyReached, solved.Record.Rounds[^1].Accuracy);
        Assert.InRange(Math.Abs(solved.Report.Beam.Bz - ModelProblemTests.Field), 0, solved.Report.FieldError);
        Assert.InRange(Math.Abs(solved.Report.Beam.DBzDz - ModelProblemTests.Gradient), 0, solved.Report.GradientError);
    }
}
