using System.Diagnostics;
using System.Security.Cryptography;
using System.Text;
using PoleField.Cli.Case;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;

namespace PoleField.Cli;

/// <summary>Loads a case with its curves and sketch, and goes as far as it can so that all faults come out at once.</summary>
internal sealed class CaseLoader(Pipeline pipeline)
{
    private static readonly UTF8Encoding StrictUtf8 = new(false, throwOnInvalidBytes: true);

    private readonly List<InputFile> _inputs = [];

    /// <summary>Loads the case at <paramref name="path"/>; faults are in the findings, not thrown.</summary>
    /// <param name="path">Case file.</param>
    /// <param name="changes">Values that take the place of the file's own.</param>
    /// <param name="cut">False to leave out reading and cutting the sketch: its bytes are only hashed.</param>
    public LoadedCase Load(string path, IReadOnlyList<CaseChange>? changes = null, bool cut = true)
    {
        var clock = Stopwatch.StartNew();
        _inputs.Clear();
        LoadedCase loaded = LoadAll(path, changes ?? [], cut);
        return loaded with { Seconds = clock.Elapsed.TotalSeconds, Inputs = [.. _inputs.Distinct()] };
    }

    private LoadedCase LoadAll(string path, IReadOnlyList<CaseChange> changes, bool cut)
    {
        var findings = new List<Finding>();
        if (Catch(findings, () => ReadFile(path, "case file")) is not { } bytes || Catch(findings, () => Decode(bytes, path)) is not { } text)
        {
            return new LoadedCase { Path = path, Findings = findings };
        }

        string folder = Path.GetDirectoryName(Path.GetFullPath(path))!;
        MaterialShelf builtIn = pipeline.Materials;
        var around = new CaseSurroundings(Path.GetFileName(path), builtIn.Names, file => File.Exists(Path.Combine(folder, file)))
        {
            IsMagnetic = name => builtIn.Get(name).IsMagnetic,
        };
        CaseReading reading = CaseReader.Read(text, around, changes);
        findings.AddRange(reading.Findings);
        var loaded = new LoadedCase { Path = path, Findings = findings, CaseSha256 = Known(Path.GetFileName(path), bytes) };
        // A case with faults still says which curves and drawing to look at: their faults come out in the same run.
        IEnumerable<PartSection> parts = reading.Question.Parts.Where(p => reading.Case is not null || Exists(p.Substance, around));
        var roles = parts.Select(p => Catch(findings, () => RoleOf(p, folder, builtIn))).ToList();
        if (reading.Case is { } file)
        {
            loaded = loaded with { Case = file, Roles = [.. roles.OfType<PartRole>()] };
        }

        string sketch = reading.Question.Sketch.File;
        return reading.Case is not null || around.FileExists(sketch)
            ? WithSketch(loaded, reading.Question, Path.Combine(folder, sketch), findings, cut)
            : loaded;
    }

    private static bool Exists(Substance substance, CaseSurroundings around) =>
        substance is CurveFileSubstance curve && around.FileExists(curve.File);

    private LoadedCase WithSketch(LoadedCase loaded, SketchQuestion question, string path, List<Finding> findings, bool cut)
    {
        SketchSection asked = question.Sketch;
        if (Catch(findings, () => ReadFile(path, "sketch")) is not { } bytes)
        {
            return loaded;
        }

        loaded = loaded with { SketchSha256 = Known(asked.File, bytes) };
        if (!cut || Catch(findings, () => pipeline.ReadSketch(new MemoryStream(bytes), asked.File, asked.Unit)) is not { } sketch)
        {
            return loaded;
        }

        findings.AddRange(sketch.Findings);
        SectionReading? reading = question.Request is { } request ? Catch(findings, () => pipeline.Cut(sketch, request)) : null;
        findings.AddRange(reading?.Findings ?? []);
        return loaded with { Sketch = sketch, Reading = reading };
    }

    private PartRole RoleOf(PartSection part, string folder, MaterialShelf builtIn)
    {
        Point remanence = default;
        Material material;
        switch (part.Substance)
        {
            case NamedSubstance named:
                material = builtIn.Names.Contains(named.Name)
                    ? builtIn.Get(named.Name)
                    : new Material(named.Name, LinearLaw.Vacuum, "Copper", "definition", "permeability taken as 1");
                break;
            case CurveFileSubstance curve:
                material = pipeline.ReadMaterial(new MemoryStream(ReadCurve(folder, curve.File)), curve.File);
                break;
            case LinearSubstance linear:
                material = Linear("linear", linear.RelativePermeability, "constant permeability");
                break;
            case MagnetSubstance magnet:
                material = Linear("permanent magnet", magnet.RecoilPermeability, "straight demagnetisation line");
                remanence = Point.Polar(magnet.Remanence, magnet.Direction);
                break;
            default:
                throw new InvalidOperationException($"Unknown substance {part.Substance}.");
        }

        return new PartRole(part.Layer, material) { AmpereTurns = part.AmpereTurns ?? 0, Fill = part.Fill, Remanence = remanence };
    }

    private byte[] ReadCurve(string folder, string file)
    {
        byte[] bytes = ReadFile(Path.Combine(folder, file), "magnetisation curve");
        Known(file, bytes);
        return bytes;
    }

    private string Known(string file, byte[] bytes)
    {
        string sha256 = Convert.ToHexStringLower(SHA256.HashData(bytes));
        _inputs.Add(new InputFile(file, sha256));
        return sha256;
    }

    private static Material Linear(string name, double permeability, string description) =>
        new(FormattableString.Invariant($"{name}, mu_r {permeability}"), new LinearLaw(permeability), description, "case file", "as stated");

    /// <summary>All single values of a case file that reads without faults.</summary>
    public static IReadOnlyList<(IReadOnlyList<string> Keys, TomlNode Node)> ValuesOf(string path)
    {
        string name = Path.GetFileName(path);
        return [.. CaseValues.Of(TomlDocument.Parse(Decode(ReadFile(path, "case file"), path), name, new Faults(name)))];
    }

    /// <summary>A file's bytes.</summary>
    /// <exception cref="InputException">It is not there or cannot be read.</exception>
    public static byte[] ReadFile(string path, string role)
    {
        try
        {
            return File.ReadAllBytes(path);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or NotSupportedException)
        {
            string why = e is FileNotFoundException or DirectoryNotFoundException
                ? "is not there"
                : Directory.Exists(path) ? "is a folder" : $"cannot be read ({e.Message.TrimEnd('.')})";
            throw new InputException(
            [
                new Finding(Severity.Fault, "missing-file", $"The {role} {path} {why}.", "Check the name and the folder."),
            ]);
        }
    }

    private static string Decode(byte[] bytes, string path)
    {
        try
        {
            return StrictUtf8.GetString(bytes).TrimStart('\ufeff');
        }
        catch (DecoderFallbackException e)
        {
            int line = bytes.AsSpan(0, Math.Max(0, e.Index)).Count((byte)'\n') + 1;
            throw new InputException(
            [
                new Finding(Severity.Fault, "not-utf8", "The case file is not UTF-8 text.", "Save it as UTF-8.")
                {
                    File = Path.GetFileName(path),
                    Line = line,
                },
            ]);
        }
    }

    private static T? Catch<T>(List<Finding> findings, Func<T> step)
        where T : class
    {
        try
        {
            return step();
        }
        catch (InputException e)
        {
            findings.AddRange(e.Findings);
            return null;
        }
    }
}
