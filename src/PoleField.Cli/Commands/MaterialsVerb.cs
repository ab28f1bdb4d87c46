using System.CommandLine;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Materials;
using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield materials [NAME|FILE]</c>: lists, shows and checks magnetisation curves.</summary>
internal sealed class MaterialsVerb
{
    private readonly Tool _tool;
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<string?> _check = new("--check") { Description = "Check a curve's table and say what is wrong with it.", HelpName = "FILE" };
    private readonly Option<string?> _figures = new("--figures") { Description = "Also plot each curve shown as SVG and PNG into this folder.", HelpName = "DIR" };
    private readonly Option<bool> _force = CommonOptions.Force();
    private readonly Argument<string?> _which = new("NAME|FILE")
    {
        Description = "A built-in name, or a CSV table of H in A/m and B in T. Without: lists all.",
        Arity = ArgumentArity.ZeroOrOne,
    };

    private MaterialsVerb(Tool tool) => _tool = tool;

    public static VerbCommand Create(Tool tool)
    {
        var verb = new MaterialsVerb(tool);
        var command = new VerbCommand("materials", "Lists, shows and checks magnetisation curves, built in or from a file.")
        {
            Examples =
            [
                ("polefield materials", "the built-in materials"),
                ("polefield materials my-steel.csv", "a curve as PoleField reads it"),
                ("polefield materials --check my-steel.csv", "is the table sound?"),
                ("polefield materials pure-iron --figures pictures/", "the curve as a picture"),
            ],
        };
        command.Arguments.Add(verb._which);
        command.Options.Add(verb._check);
        command.Options.Add(verb._json);
        command.Options.Add(verb._figures);
        command.Options.Add(verb._force);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        bool json = arguments.GetValue(_json);
        if (arguments.GetValue(_check) is { } file)
        {
            return Check(arguments, file, json);
        }

        MaterialShelf shelf = _tool.Pipeline.Materials;
        string? which = arguments.GetValue(_which);
        Material[] shown = which is null ? [.. shelf.Names.Select(shelf.Get)] : [Find(which, shelf)];
        WritePictures(arguments, shown, cancellation);
        Print(arguments, shown, single: which is not null, json);
        return ExitStatus.Done;
    }

    private void Print(ParseResult arguments, Material[] shown, bool single, bool json)
    {
        if (single)
        {
            Show(arguments, shown[0], json);
        }
        else if (json)
        {
            _tool.Terminal.Print(s => JsonText.Write(new MaterialsFile(shown, withCurves: false), s));
        }
        else
        {
            MaterialTables.WriteList(_tool.Terminal.Out, shown, _tool.OutInk(arguments));
        }
    }

    // Air and the like have nothing to plot.
    private void WritePictures(ParseResult arguments, IEnumerable<Material> shown, CancellationToken cancellation)
    {
        var pictures = new PictureFiles(arguments.GetValue(_figures), _tool.Terminal.Error);
        if (!pictures.Wanted)
        {
            return;
        }

        Figure[] figures = [.. shown.Where(m => m.IsMagnetic).Select(Plot)];
        using OutputFiles files = OutputFiles.Plan(pictures.Targets(figures.Select(f => f.Name)), arguments.GetValue(_force));
        pictures.Write(files, figures, cancellation);
        files.Commit(cancellation);
    }

    private static Figure Plot(Material material)
    {
        IReadOnlyList<BhRow> rows = material.Law is BhCurve curve ? curve.Nodes : [];
        return MaterialFigure.Draw(material, [.. rows.Select(r => (r.FieldStrength, r.FluxDensity))]) with
        {
            Name = "material-" + Path.GetFileNameWithoutExtension(material.Name),
        };
    }

    private int Check(ParseResult arguments, string file, bool json)
    {
        Material material;
        try
        {
            material = ReadFile(file);
        }
        catch (InputException e) when (json)
        {
            _tool.Terminal.Print(s => JsonText.Write(new MaterialCheckFile(e.Findings), s));
            return ExitStatus.WrongInput;
        }

        if (json)
        {
            _tool.Terminal.Print(s => JsonText.Write(new MaterialCheckFile(material.Findings), s));
        }
        else if (!arguments.GetValue(_tool.Quiet))
        {
            MaterialTables.WriteOne(_tool.Terminal.Out, material, _tool.OutInk(arguments));
            _tool.Terminal.Out.WriteLine("Sound.");
        }

        return ExitStatus.Done;
    }

    private void Show(ParseResult arguments, Material material, bool json)
    {
        if (json)
        {
            _tool.Terminal.Print(s => JsonText.Write(new MaterialsFile([material], withCurves: true), s));
        }
        else
        {
            MaterialTables.WriteOne(_tool.Terminal.Out, material, _tool.OutInk(arguments));
        }
    }

    private Material Find(string which, MaterialShelf shelf)
    {
        if (shelf.Names.Contains(which))
        {
            return shelf.Get(which);
        }

        return File.Exists(which)
            ? ReadFile(which)
            : throw new InputException(
            [
                new Finding(
                    Severity.Fault,
                    "unknown-material",
                    $"\"{which}\" is no built-in material and no file.",
                    NearestName.Advice(which, shelf.Names)),
            ]);
    }

    private Material ReadFile(string path)
    {
        byte[] bytes = CaseLoader.ReadFile(path, "magnetisation curve");
        return _tool.Pipeline.ReadMaterial(new MemoryStream(bytes), Path.GetFileName(path));
    }
}
