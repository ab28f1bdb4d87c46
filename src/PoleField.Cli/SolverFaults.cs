using PoleField.Cli.Text;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Cli;

/// <summary>What to tell when the solver gives up on an input.</summary>
internal static class SolverFaults
{
    /// <summary>A section that cannot be meshed is a fault of the sketch.</summary>
    public static Finding Of(MeshingException fault) => new(
        Severity.Fault,
        "cannot-mesh",
        fault.Message,
        "Look at the sketch there: outlines that almost touch, slivers, or a beam almost at a pole. Move them apart or join them.")
    {
        At = fault.At,
    };

    /// <summary>Says that the field did not converge, how far it came, and what to look at.</summary>
    public static void Write(TextWriter error, FieldNotConvergedException fault)
    {
        string steps = string.Join(", ", fault.History.TakeLast(3).Select(s => Numbers.Accuracy(s.Decrement)));
        error.WriteLine($"Not met: {fault.Message}");
        if (steps.Length > 0)
        {
            error.WriteLine($"  Last decrements: {steps}. Nothing was written.");
        }

        error.WriteLine("  Check the ampere-turns and the magnetisation curves (polefield materials --check FILE), or ask for less accuracy.");
    }
}
