using System.CommandLine;
using PoleField.Cli.Case;
using PoleField.Drawing;

namespace PoleField.Cli.Sketching;

/// <summary>The options of one family's command, and reading them with all their faults at once.</summary>
internal sealed class SketchRequest
{
    private readonly FamilyWords _words;
    private readonly Dictionary<FamilyOption, Option<string?>> _dimensions;
    private readonly Option<string?> _field;
    private readonly Option<string?> _length = new("--length") { Description = "Length of the magnet along the beam.", HelpName = "LENGTH" };
    private readonly Option<string?> _name;
    private readonly Option<string?> _material = new("--material") { Description = "Built-in material of ridge and groove.", HelpName = "NAME" };
    private readonly Option<string?> _yokeMaterial = new("--yoke-material") { Description = "Built-in material of the yoke.", HelpName = "NAME" };

    public SketchRequest(FamilyWords words)
    {
        _words = words;
        _dimensions = words.Options.ToDictionary(
            o => o,
            o => new Option<string?>(o.Name) { Description = $"{o.Meaning} Default: {o.Written(words.Usual)}.", HelpName = Placeholder(o) });
        _field = new("--field")
        {
            Description = $"Field at the beam; sets the ampere-turns by the closed form. Default: {Text.Numbers.InUnit(words.UsualField, Dimension.Field)}.",
            HelpName = "FIELD",
        };
        _name = new("--name") { Description = $"Name of the files. Default: {words.Usual.Name}.", HelpName = "NAME" };
    }

    public void AddTo(Command command)
    {
        foreach (FamilyOption option in _words.Options)
        {
            command.Options.Add(_dimensions[option]);
        }

        command.Options.Add(_field);
        if (_words.HasIron)
        {
            command.Options.Add(_material);
            command.Options.Add(_yokeMaterial);
        }

        command.Options.Add(_length);
        command.Options.Add(_name);
    }

    /// <summary>The starting case asked for.</summary>
    /// <exception cref="InputException">Something about it is wrong; carries all faults.</exception>
    public StartingCase Read(ParseResult arguments, MaterialShelf materials)
    {
        var faults = new List<Finding>();
        var given = new Dictionary<FamilyOption, double>();
        foreach ((FamilyOption option, Option<string?> typed) in _dimensions)
        {
            if (Value(arguments, typed, option.Kind, faults) is { } value)
            {
                given[option] = option.FromSi(value);
            }
        }

        double field = Positive(arguments, _field, Dimension.Field, faults) ?? _words.UsualField;
        double? length = Positive(arguments, _length, Dimension.Length, faults);
        string? material = Known(arguments, _material, materials, faults);
        string? yoke = Known(arguments, _yokeMaterial, materials, faults);
        string name = FileName(arguments, faults);
        PoleFamily family = _words.With(given);
        StartingSketch? sketch = null;
        try
        {
            sketch = family.Draw();
        }
        catch (InputException e)
        {
            faults.AddRange(e.Findings);
        }

        return faults.Count > 0 || sketch is null
            ? throw new InputException(faults)
            : new StartingCase
            {
                Words = _words,
                Family = family,
                Sketch = sketch,
                Name = name,
                AmpereTurns = StartingCase.Rounded(sketch.AmpereTurnsFor(field)),
                Length = length,
                Material = material,
                YokeMaterial = yoke,
            };
    }

    private static double? Value(ParseResult arguments, Option<string?> option, Dimension kind, List<Finding> faults)
    {
        if (arguments.GetValue(option) is not { } text)
        {
            return null;
        }

        if (Quantity.Read(text, kind, out double value) is not { } mistake)
        {
            return value;
        }

        faults.Add(new Finding(Severity.Fault, mistake.What, $"{option.Name}: {mistake.Text}", mistake.Fix));
        return null;
    }

    private static double? Positive(ParseResult arguments, Option<string?> option, Dimension kind, List<Finding> faults)
    {
        double? value = Value(arguments, option, kind, faults);
        if (value is <= 0)
        {
            faults.Add(new Finding(Severity.Fault, "out-of-range", $"{option.Name} is {arguments.GetValue(option)}; it must be above zero.", Quantity.Write(kind)));
        }

        return value;
    }

    private static string? Known(ParseResult arguments, Option<string?> option, MaterialShelf materials, List<Finding> faults)
    {
        if (arguments.GetResult(option) is null || arguments.GetValue(option) is not { } name)
        {
            return null;
        }

        if (!materials.Names.Contains(name))
        {
            faults.Add(new Finding(
                Severity.Fault, "unknown-material", $"{option.Name}: there is no built-in material \"{name}\".", NearestName.Advice(name, materials.Names)));
        }
        else if (!materials.Get(name).IsMagnetic)
        {
            faults.Add(new Finding(Severity.Fault, "non-magnetic", $"{option.Name}: {name} carries no flux.", "Choose an iron or steel; see: polefield materials."));
        }

        return name;
    }

    private string FileName(ParseResult arguments, List<Finding> faults)
    {
        string name = arguments.GetValue(_name) ?? _words.Usual.Name;
        bool plain = name.Length > 0 && !name.StartsWith('.') && name.IndexOfAny(['/', '\\', ':', '"', '*', '?', '<', '>', '|']) < 0 && !name.Any(char.IsControl);
        if (!plain)
        {
            faults.Add(new Finding(Severity.Fault, "file-name", $"--name is \"{name}\"; it must be a plain file name.", "Name the folder with -o."));
        }

        return name;
    }

    private static string Placeholder(FamilyOption option) =>
        option.Kind == Dimension.Length ? "LENGTH" : option.Kind == Dimension.Direction ? "ANGLE" : "NUMBER";
}
