using System.Collections.Concurrent;
using System.Diagnostics;
using System.Runtime.ExceptionServices;
using PoleField.Beam;
using PoleField.Cli.Commands;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Output.Results;

namespace PoleField.Cli.Sweeping;

/// <summary>How far a sweep is.</summary>
/// <param name="Asked">Points of this part.</param>
/// <param name="Kept">Finished before this run.</param>
/// <param name="Solved">Finished by this run.</param>
/// <param name="Failed">Points whose status is not 0, of either.</param>
internal readonly record struct SweepProgress(int Asked, int Kept, int Solved, int Failed);

/// <summary>Solves the points of a sweep that are not finished yet, several at a time with one thread each.</summary>
/// <param name="pipeline">The steps of a solve.</param>
/// <param name="casePath">Case file.</param>
/// <param name="plan">What to solve.</param>
/// <param name="folder">Where finished points are.</param>
internal sealed class SweepRun(Pipeline pipeline, string casePath, SweepPlan plan, SweepFolder folder)
{
    private const string InputsChanged = "inputs-changed";

    private readonly Lock _gate = new();
    private int _kept;
    private int _solved;
    private int _failed;

    /// <summary>Runs a part of the plan to its end.</summary>
    /// <param name="points">The part's points.</param>
    /// <param name="options">How to run.</param>
    /// <param name="progress">Called after each point.</param>
    /// <param name="cancellation">Stops between the steps of a solve; finished points stay.</param>
    public SweepProgress Solve(
        IReadOnlyList<int> points, SweepOptions options, Action<SweepProgress> progress, CancellationToken cancellation)
    {
        var left = new List<int>();
        foreach (int point in points)
        {
            if (Finished(point, options.SolveFailedAgain) is { } present)
            {
                _kept++;
                _failed += present.ExitStatus == ExitStatus.Done ? 0 : 1;
            }
            else
            {
                left.Add(point);
            }
        }

        SweepProgress Now() => new(points.Count, _kept, _solved, _failed);
        progress(Now());
        var together = new ParallelOptions { MaxDegreeOfParallelism = options.AtATime, CancellationToken = cancellation };
        try
        {
            Parallel.ForEach(Partitioner.Create(left, EnumerablePartitionerOptions.NoBuffering), together, point =>
            {
                if (Take(point, options, cancellation) is not { } status)
                {
                    return;
                }

                lock (_gate)
                {
                    _solved++;
                    _failed += status == ExitStatus.Done ? 0 : 1;
                    progress(Now());
                }
            });
        }
        catch (AggregateException e) when (e.InnerExceptions.Count > 0)
        {
            ExceptionDispatchInfo.Throw(e.InnerExceptions[0]);
        }

        return Now();
    }

    private SweepPointFile? Finished(int point, bool failedCountNot) =>
        folder.ReadPoint(plan.Sha256, point) is { } present && !(failedCountNot && present.ExitStatus != ExitStatus.Done) ? present : null;

    // Null when another run in the same folder has the point or has finished it in the meantime.
    private int? Take(int point, SweepOptions options, CancellationToken cancellation)
    {
        using FileStream? claim = folder.Claim(point);
        if (claim is null || Finished(point, options.SolveFailedAgain) is not null)
        {
            return null;
        }

        var clock = Stopwatch.StartNew();
        SweepPointFile finished = SolvePoint(point, options, cancellation);
        folder.WritePoint(finished with { Seconds = Math.Round(clock.Elapsed.TotalSeconds, 3) });
        return finished.ExitStatus;
    }

    private SweepPointFile SolvePoint(int point, SweepOptions options, CancellationToken cancellation)
    {
        try
        {
            LoadedCase loaded = new CaseLoader(pipeline).Load(casePath, plan.ChangesAt(point));
            CheckInputs(loaded);
            if (loaded.HasFaults)
            {
                return Failed(point, ExitStatus.WrongInput, loaded.Findings.Where(f => f.Severity == Severity.Fault), loaded.DrawingUnit);
            }

            var solve = new SolveOptions
            {
                Accuracy = options.Accuracy ?? loaded.Case!.Accuracy,
                Threads = 1,
                MostUnknowns = CaseRun.MostUnknowns(options.AtATime),
            };
            SolvedCase solved = CaseRun.Solve(pipeline, loaded, new SolveSteps(solve, _ => { }, cancellation));
            return new SweepPointFile(
                SweepPointFile.Name,
                plan.Sha256,
                point,
                solved.AllMet ? ExitStatus.Done : ExitStatus.NotMet,
                string.Join("; ", CaseRun.NotMet(solved).Select(m => "not met: " + m)),
                0,
                ResultOutput.FileOf(solved));
        }
        catch (InputException e) when (e.Findings.All(f => f.What != InputsChanged))
        {
            return Failed(point, ExitStatus.WrongInput, e.Findings);
        }
        catch (MeshingException e)
        {
            return Failed(point, ExitStatus.WrongInput, [SolverFaults.Of(e)]);
        }
        catch (FieldNotConvergedException e)
        {
            return Failed(point, ExitStatus.NotMet, e.Message);
        }
#pragma warning disable CA1031 // One point's unforeseen end must not take the others with it; it is told in its row.
        catch (Exception e) when (e is not (OperationCanceledException or InputException))
#pragma warning restore CA1031
        {
            return Failed(point, ExitStatus.OwnFault, $"a fault in PoleField itself: {e.GetType().Name}: {e.Message.ReplaceLineEndings(" ")}");
        }
    }

    // A table of points from two states of a file would be worth nothing.
    private void CheckInputs(LoadedCase loaded)
    {
        if (loaded.Findings.FirstOrDefault(f => f.What == "missing-file") is { } gone)
        {
            throw Changed(gone.Text.TrimEnd('.'));
        }

        if (loaded.Inputs.Select(i => new SweepInput(i.Name, i.Sha256)).Except(plan.File.Inputs).FirstOrDefault() is { } other)
        {
            throw Changed($"{other.File} has changed since the sweep began");
        }
    }

    private static InputException Changed(string text) => new(
    [
        new Finding(Severity.Fault, InputsChanged, text + ". The sweep stops; finished points are kept.", "Put the file back, or sweep the new one into another folder."),
    ]);

    private SweepPointFile Failed(int point, int status, IEnumerable<Finding> findings, string unit = "")
    {
        using var words = new StringWriter { NewLine = " " };
        FindingText.Write(words, findings, Ink.None, unit);
        return Failed(point, status, words.ToString().Trim());
    }

    private SweepPointFile Failed(int point, int status, string reason) =>
        new(SweepPointFile.Name, plan.Sha256, point, status, reason, 0, null);
}

/// <summary>How to run a sweep.</summary>
/// <param name="Accuracy">From the command line; null for the case's.</param>
/// <param name="AtATime">Points solved at a time.</param>
/// <param name="SolveFailedAgain">Points that failed are not finished.</param>
internal sealed record SweepOptions(double? Accuracy, int AtATime, bool SolveFailedAgain);
