using System.Globalization;
using BenchmarkDotNet.Running;
using PoleField.Benchmarks;

switch (args)
{
    case ["--whole"]:
        WholeRuns.Print(Console.Out, 2e5);
        return 0;
    case ["--whole", string unknowns]:
        WholeRuns.Print(Console.Out, double.Parse(unknowns, CultureInfo.InvariantCulture));
        return 0;
    case ["--drawings"]:
        DrawingRuns.Print(Console.Out);
        return 0;
    case ["--export", string folder]:
        SystemExport.Write(folder);
        return 0;
    default:
        BenchmarkSwitcher.FromAssembly(typeof(WholeRuns).Assembly).Run(args);
        return 0;
}
