namespace PoleField.Cli.Case;

/// <summary>Finds what a mistyped name was probably meant to be.</summary>
internal static class NearestName
{
    /// <summary>The known name closest to <paramref name="name"/>, or null when none is close.</summary>
    public static string? Of(string name, IEnumerable<string> known)
    {
        string? best = null;
        int bestDistance = Math.Max(1, name.Length / 3) + 1;
        foreach (string candidate in known)
        {
            int distance = Distance(Plain(name), Plain(candidate));
            if (distance < bestDistance)
            {
                (best, bestDistance) = (candidate, distance);
            }
        }

        return best;
    }

    /// <summary>"Did you mean ...?" with the names that are known, or only those.</summary>
    public static string Advice(string name, IReadOnlyCollection<string> known)
    {
        string list = known.Count == 0 ? string.Empty : "Known here: " + string.Join(", ", known) + ".";
        return Of(name, known) is { } near ? $"Did you mean \"{near}\"? {list}" : list;
    }

    private static string Plain(string name) => name.ToUpperInvariant().Replace('_', '-').Replace(' ', '-');

    // Edit distance with exchanges of neighbours (Damerau 1964, optimal string alignment).
    private static int Distance(string a, string b)
    {
        int[,] d = new int[a.Length + 1, b.Length + 1];
        for (int i = 0; i <= a.Length; i++)
        {
            for (int j = 0; j <= b.Length; j++)
            {
                if (i == 0 || j == 0)
                {
                    d[i, j] = i + j;
                    continue;
                }

                int cost = a[i - 1] == b[j - 1] ? 0 : 1;
                d[i, j] = Math.Min(Math.Min(d[i - 1, j] + 1, d[i, j - 1] + 1), d[i - 1, j - 1] + cost);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
                {
                    d[i, j] = Math.Min(d[i, j], d[i - 2, j - 2] + 1);
                }
            }
        }

        return d[a.Length, b.Length];
    }
}
