using System.Globalization;

namespace PoleField.Tests.House;

/// <summary>How many random inputs a test draws: few in every run, as many as an environment variable says in a long one.</summary>
internal static class RandomRuns
{
    public static int Count(string variable, int usual) =>
        Environment.GetEnvironmentVariable(variable) is { Length: > 0 } text ? int.Parse(text, CultureInfo.InvariantCulture) : usual;
}
