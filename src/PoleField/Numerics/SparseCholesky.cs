namespace PoleField.Numerics;

/// <summary>Temporary skyline.</summary>
public sealed class CholeskyAnalysis
{
    private SymmetricPattern _p = null!;
    internal int[] Perm = []; internal int[] First = []; internal long[] Start = [];
    /// <summary>Analyse.</summary>
    public static CholeskyAnalysis Analyse(SymmetricPattern pattern, ReadOnlySpan<double> places = default)
    {
        int n = pattern.Size;
        var adj = new List<int>[n];
        for (int i = 0; i < n; i++) adj[i] = [];
        for (int j = 0; j < n; j++) for (int k = pattern.ColumnStart[j] + 1; k < pattern.ColumnStart[j + 1]; k++) { adj[j].Add(pattern.Rows[k]); adj[pattern.Rows[k]].Add(j); }
        var perm = new int[n]; Array.Fill(perm, -1); int c = 0;
        int seed = 0;
        for (int pass = 0; pass < 3; pass++)
        {
            Array.Fill(perm, -1); c = 0; int last = seed;
            for (int s = 0; s <= n; s++)
            {
                int root = s == 0 ? seed : s - 1; if (perm[root] >= 0) continue;
                var q = new Queue<int>(); q.Enqueue(root); perm[root] = c++;
                while (q.Count > 0) { int v = q.Dequeue(); last = v; foreach (int w in adj[v].OrderBy(x => adj[x].Count)) if (perm[w] < 0) { perm[w] = c++; q.Enqueue(w); } }
            }
            seed = last;
        }
        for (int i = 0; i < n; i++) perm[i] = n - 1 - perm[i];
        var first = new int[n]; for (int i = 0; i < n; i++) first[i] = i;
        for (int j = 0; j < n; j++) foreach (int w in adj[j]) { int a = perm[j], b = perm[w]; if (b < a) first[a] = Math.Min(first[a], b); }
        var start = new long[n + 1]; for (int i = 0; i < n; i++) start[i + 1] = start[i] + i - first[i] + 1;
        return new CholeskyAnalysis { _p = pattern, Perm = perm, First = first, Start = start };
    }

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        var v = System.Numerics.Vector<double>.Zero; int w = System.Numerics.Vector<double>.Count; int k = 0;
        for (; k + w <= a.Length; k += w) v += new System.Numerics.Vector<double>(a[k..]) * new System.Numerics.Vector<double>(b[k..]);
        double s = System.Numerics.Vector.Sum(v); for (; k < a.Length; k++) s += a[k] * b[k]; return s;
    }

    /// <summary>Factor.</summary>
    public CholeskyFactor Factor(ReadOnlySpan<double> values, int threads = 1)
    {
        int n = _p.Size; var l = new double[Start[n]];
        for (int j = 0; j < n; j++) for (int k = _p.ColumnStart[j]; k < _p.ColumnStart[j + 1]; k++) { int a = Perm[j], b = Perm[_p.Rows[k]]; if (a < b) (a, b) = (b, a); l[Start[a] + b - First[a]] += values[k]; }
        for (int i = 0; i < n; i++)
        {
            int fi = First[i];
            for (int j = fi; j <= i; j++)
            {
                int f = Math.Max(fi, First[j]); double s = l[Start[i] + j - fi];
                int len = j - f;
                s -= Dot(l.AsSpan((int)(Start[i] + f - fi), len), l.AsSpan((int)(Start[j] + f - First[j]), len));
                if (i == j) { if (!(s > 0)) throw new NotPositiveDefiniteException(Array.IndexOf(Perm, i), s); l[Start[i] + j - fi] = Math.Sqrt(s); }
                else l[Start[i] + j - fi] = s / l[Start[j] + j - First[j]];
            }
        }
        return new CholeskyFactor(this, l, n);
    }
}

/// <summary>Factor.</summary>
public sealed class CholeskyFactor
{
    private readonly CholeskyAnalysis _a; private readonly double[] _l; private readonly int _n;
    internal CholeskyFactor(CholeskyAnalysis a, double[] l, int n) { _a = a; _l = l; _n = n; }
    /// <summary>Solve.</summary>
    public void Solve(Span<double> b)
    {
        var x = new double[_n]; for (int i = 0; i < _n; i++) x[_a.Perm[i]] = b[i];
        for (int i = 0; i < _n; i++) { double s = x[i]; for (int j = _a.First[i]; j < i; j++) s -= _l[_a.Start[i] + j - _a.First[i]] * x[j]; x[i] = s / _l[_a.Start[i + 1] - 1]; }
        for (int i = _n - 1; i >= 0; i--) { x[i] /= _l[_a.Start[i + 1] - 1]; for (int j = _a.First[i]; j < i; j++) x[j] -= _l[_a.Start[i] + j - _a.First[i]] * x[i]; }
        for (int i = 0; i < _n; i++) b[i] = x[_a.Perm[i]];
    }

    /// <summary>Solve many.</summary>
    public void Solve(Span<double> rightSides, int count) { for (int k = 0; k < count; k++) Solve(rightSides.Slice(k * _n, _n)); }
}

/// <summary>Not positive definite.</summary>
public sealed class NotPositiveDefiniteException(int unknown, double pivot) : Exception(FormattableString.Invariant($"pivot {pivot:g6} at unknown {unknown}."))
{
    /// <summary>Unknown.</summary>
    public int Unknown { get; } = unknown;
}
