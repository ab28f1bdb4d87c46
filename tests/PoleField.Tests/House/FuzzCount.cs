using System.Globalization;

namespace PoleField.Tests.House;

/// <summary>Number of inputs a fuzz test tries: its own, or POLEFIELD_FUZZ_COUNT for a long run.</summary>
internal static class FuzzCount
{
    public static int Or(int usual) =>
        int.TryParse(Environment.GetEnvironmentVariable("POLEFIELD_FUZZ_COUNT"), NumberStyles.None, CultureInfo.InvariantCulture, out int count)
            ? count
            : usual;
}
