using BenchmarkDotNet.Running;
using PoleField.Benchmarks;

if (args.Contains("--whole"))
{
    WholeRuns.Print(Console.Out);
    return 0;
}

BenchmarkSwitcher.FromAssembly(typeof(WholeRuns).Assembly).Run(args);
return 0;
