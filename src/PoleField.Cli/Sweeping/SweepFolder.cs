using System.Text.Json;
using PoleField.Cli.Files;
using PoleField.Output.Results;

namespace PoleField.Cli.Sweeping;

/// <summary>
/// The folder of a sweep: its plan, one file per finished point, one claim per point being solved. Files appear whole or not
/// at all, so whoever comes later, after whatever end, finds what is finished and goes on with the rest.
/// </summary>
internal sealed class SweepFolder(string path)
{
    private const string PlanName = "sweep.json";

    private string PointsFolder => System.IO.Path.Combine(path, "points");

    public string Path => path;

    /// <summary>The plan in the folder; null when there is none.</summary>
    /// <exception cref="InputException">There is a file of that name that is no plan.</exception>
    public SweepPlanFile? ReadPlan()
    {
        string file = System.IO.Path.Combine(path, PlanName);
        if (!File.Exists(file))
        {
            return null;
        }

        try
        {
            SweepPlanFile plan = SweepTable.ReadJson<SweepPlanFile>(File.ReadAllBytes(file));
            return plan.Format == SweepPlanFile.Name ? plan : throw new JsonException($"The format is {plan.Format}.");
        }
        catch (Exception e) when (e is JsonException or IOException or UnauthorizedAccessException)
        {
            throw new InputException([new Finding(Severity.Fault, "plan-unreadable", $"{file} cannot be read as {SweepPlanFile.Name}: {e.Message}", "Give the folder of a sweep.")]);
        }
    }

    /// <summary>Makes the folder this plan's: takes up what is there of it, or starts.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="startOver">What is there of another plan may be thrown away.</param>
    /// <exception cref="InputException">The folder is another plan's, or cannot be written.</exception>
    public void TakeUp(SweepPlan plan, bool startOver)
    {
        if (ReadPlan() is { } present)
        {
            if (SweepPlan.HashOf(present) == plan.Sha256)
            {
                return;
            }

            if (!startOver)
            {
                throw new InputException(
                [
                    new Finding(
                        Severity.Fault,
                        "other-sweep",
                        $"{path} holds another sweep: {Difference(present, plan.File)}.",
                        "Use another folder with -o, or --force to throw the old points away."),
                ]);
            }

            foreach (string old in Directory.Exists(PointsFolder) ? Directory.GetFiles(PointsFolder, "*.json") : [])
            {
                File.Delete(old);
            }
        }

        Write(System.IO.Path.Combine(path, PlanName), stream => SweepTable.WriteJson(plan.File, stream));
    }

    /// <summary>A finished point of the plan; null when it is not finished, or its file is damaged.</summary>
    public SweepPointFile? ReadPoint(string planSha256, int point)
    {
        try
        {
            SweepPointFile read = SweepTable.ReadJson<SweepPointFile>(File.ReadAllBytes(NameOf(point, ".json")));
            return read.Format == SweepPointFile.Name && read.PlanSha256 == planSha256 && read.Point == point ? read : null;
        }
        catch (Exception e) when (e is JsonException or FileNotFoundException or DirectoryNotFoundException)
        {
            return null;
        }
    }

    public void WritePoint(SweepPointFile point) => Write(NameOf(point.Point, ".json"), stream => SweepTable.WriteJson(point, stream));

    /// <summary>
    /// Claims a point for as long as the returned stream is open; null while another run has it. The system lets go of the
    /// claim when its process ends in whatever way.
    /// </summary>
    public FileStream? Claim(int point)
    {
        Directory.CreateDirectory(PointsFolder);
        try
        {
            return new FileStream(NameOf(point, ".claim"), FileMode.OpenOrCreate, FileAccess.Write, FileShare.None, 1, FileOptions.DeleteOnClose);
        }
        catch (IOException) when (File.Exists(NameOf(point, ".claim")))
        {
            return null;
        }
    }

    /// <summary>Writes a file of the folder, replacing what is there.</summary>
    public static void Write(string target, Action<Stream> content)
    {
        using OutputFiles files = OutputFiles.Plan([target], force: true);
        files.Write(target, content);
        files.Commit(CancellationToken.None);
    }

    private string NameOf(int point, string ending) =>
        System.IO.Path.Combine(PointsFolder, FormattableString.Invariant($"{point:D6}{ending}"));

    private static string Difference(SweepPlanFile there, SweepPlanFile here) => (there, here) switch
    {
        _ when there.Case != here.Case => $"its case is {there.Case}",
        _ when there.ProgramVersion != here.ProgramVersion => $"version {there.ProgramVersion} made it, this is {here.ProgramVersion}",
        _ when !there.Inputs.SequenceEqual(here.Inputs) => "the case, the sketch or a curve has changed since",
        _ when there.Accuracy != here.Accuracy => "it was asked for another accuracy",
        _ => "it varies other values",
    };
}
