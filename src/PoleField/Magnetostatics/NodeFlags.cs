namespace PoleField.Magnetostatics;

/// <summary>Questions about lists of nodes.</summary>
internal static class NodeFlags
{
    /// <summary>True when one of the nodes is flagged.</summary>
    public static bool ContainsAnyWhere(this ReadOnlySpan<int> nodes, bool[] flags)
    {
        foreach (int node in nodes)
        {
            if (flags[node])
            {
                return true;
            }
        }

        return false;
    }
}
