using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>Every JSON format the tool writes.</summary>
internal static class PublishedFormats
{
    public static IReadOnlyList<FileFormat> All { get; } = [.. FileFormat.All, CheckFile.Form, MaterialsFile.Form, MaterialCheckFile.Form, SketchFile.Form];
}
