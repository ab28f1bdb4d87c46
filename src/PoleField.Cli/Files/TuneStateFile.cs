using System.Text.Json;
using System.Text.Json.Serialization;
using PoleField.Design;

namespace PoleField.Cli.Files;

/// <summary>The file from which <c>tune --resume</c> goes on, <c>polefield-tune-state/1</c>.</summary>
internal static class TuneStateFile
{
    private const string Format = "polefield-tune-state/1";
    private static readonly JsonSerializerOptions Options = new() { WriteIndented = true, NewLine = "\n" };

    /// <summary>Writes a state with the drawing it belongs to.</summary>
    public static void Write(TuneState state, string sketchSha256, Stream stream)
    {
        var file = new StateFile(
            Format,
            sketchSha256,
            [.. state.Names.Zip(state.Values, (n, v) => new FreedomEntry(n, v))],
            state.Damping,
            state.Solves,
            [.. state.Steps.Select(s => new StepEntry(s.Rms, s.Gradient, s.Clearance, s.Accepted))]);
        JsonSerializer.Serialize(stream, file, Options);
        stream.Write("\n"u8);
    }

    /// <summary>Writes a state over an older one, so that at any moment one of them is whole.</summary>
    public static void Save(TuneState state, string sketchSha256, string path)
    {
        string whole = Path.GetFullPath(path);
        Directory.CreateDirectory(Path.GetDirectoryName(whole)!);
        string temporary = whole + ".part";
        using (FileStream stream = File.Create(temporary))
        {
            Write(state, sketchSha256, stream);
        }

        File.Move(temporary, whole, overwrite: true);
    }

    /// <summary>Reads the state of an earlier run of the same drawing.</summary>
    /// <exception cref="InputException">There is none, it is no such file, or it belongs to another drawing.</exception>
    public static TuneState Read(string path, string sketchSha256)
    {
        StateFile? file;
        try
        {
            file = JsonSerializer.Deserialize<StateFile>(CaseLoader.ReadFile(path, "state of an earlier tune"), Options);
        }
        catch (JsonException e)
        {
            throw Fault(path, $"is not the state of a tune ({e.Message.Split('\n')[0].TrimEnd('.')})", "Start without --resume.");
        }

        if (file is not { Format: Format, Freedoms: not null, Steps: not null })
        {
            throw Fault(path, "is not the state of a tune", "Start without --resume.");
        }

        if (file.SketchSha256 != sketchSha256)
        {
            throw Fault(path, "belongs to another drawing", "Start without --resume, or go back to the drawing of that run.");
        }

        return new TuneState(
            [.. file.Freedoms.Select(f => f.Name)],
            [.. file.Freedoms.Select(f => f.Value)],
            file.Damping,
            [.. file.Steps.Select((s, k) => new TuneStep(k, s.Rms, s.Gradient, s.Clearance, s.Accepted))],
            file.Solves);
    }

    private static InputException Fault(string path, string what, string remedy) =>
        new([new Finding(Severity.Fault, "no-state", $"{path} {what}.", remedy)]);

    private sealed record StateFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("freedoms")] IReadOnlyList<FreedomEntry> Freedoms,
        [property: JsonPropertyName("damping")] double Damping,
        [property: JsonPropertyName("solves")] int Solves,
        [property: JsonPropertyName("steps")] IReadOnlyList<StepEntry> Steps);

    private sealed record FreedomEntry([property: JsonPropertyName("name")] string Name, [property: JsonPropertyName("value")] double Value);

    private sealed record StepEntry(
        [property: JsonPropertyName("rms")] double Rms,
        [property: JsonPropertyName("gradient_T_per_m")] double Gradient,
        [property: JsonPropertyName("clearance_m")] double Clearance,
        [property: JsonPropertyName("accepted")] bool Accepted);
}
