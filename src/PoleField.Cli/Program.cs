using PoleField.Cli;
using PoleField.Cli.Commands;

return await CommandLine.RunAsync(args, Terminal.OfProcess(), Pipeline.OfLibrary());
