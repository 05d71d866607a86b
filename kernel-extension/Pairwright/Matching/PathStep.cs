using System.Numerics;
using System.Runtime.InteropServices;

namespace Pairwright.Matching;

/// <summary>One pixel of one path: the recursion of semi-global matching.</summary>
internal static class PathStep
{
    /// <summary>
    /// L(p, d) = C(p, d) + min(L(q, d), L(q, d±1) + P1, min L(q) + P2) − min L(q), with q the pixel before (Hirschmüller 2008, equation 13).
    /// </summary>
    /// <param name="cost">The pixel's costs.</param>
    /// <param name="before">The path costs of the pixel before, with an infinite one at either end.</param>
    /// <param name="least">The least of these.</param>
    /// <param name="small">P1.</param>
    /// <param name="large">P2.</param>
    /// <param name="path">Filled with the pixel's path costs; its two ends are left alone.</param>
    /// <returns>The least of them.</returns>
    public static float From(ReadOnlySpan<float> cost, ReadOnlySpan<float> before, float least, float small, float large, Span<float> path)
    {
        ref var c = ref MemoryMarshal.GetReference(cost);
        ref var b = ref MemoryMarshal.GetReference(before);
        ref var p = ref MemoryMarshal.GetReference(path);
        var (leasts, smalls, jump) = (new Vector<float>(least), new Vector<float>(small), new Vector<float>(least + large));
        var lowests = new Vector<float>(float.PositiveInfinity);
        nuint i = 0;
        for (; i + (nuint)Vector<float>.Count <= (nuint)cost.Length; i += (nuint)Vector<float>.Count)
        {
            var near = Vector.Min(Vector.LoadUnsafe(ref b, i), Vector.LoadUnsafe(ref b, i + 2)) + smalls;
            var best = Vector.Min(Vector.Min(Vector.LoadUnsafe(ref b, i + 1), jump), near);
            var now = Vector.LoadUnsafe(ref c, i) + best - leasts;
            now.StoreUnsafe(ref p, i + 1);
            lowests = Vector.Min(lowests, now);
        }

        var lowest = Lowest(lowests);
        for (var k = (int)i; k < cost.Length; k++)
        {
            var near = Math.Min(before[k], before[k + 2]) + small;
            var best = Math.Min(Math.Min(before[k + 1], least + large), near);
            path[k + 1] = cost[k] + best - least;
            lowest = Math.Min(lowest, path[k + 1]);
        }

        return lowest;
    }

    /// <summary>The same from two pixels before, each counting half (Facciolo, de Franchis and Meinhardt 2015, equation 4).</summary>
    public static float FromTwo(
        ReadOnlySpan<float> cost,
        ReadOnlySpan<float> first,
        float firstLeast,
        float firstLarge,
        ReadOnlySpan<float> second,
        float secondLeast,
        float secondLarge,
        float small,
        Span<float> path)
    {
        ref var c = ref MemoryMarshal.GetReference(cost);
        ref var a = ref MemoryMarshal.GetReference(first);
        ref var b = ref MemoryMarshal.GetReference(second);
        ref var p = ref MemoryMarshal.GetReference(path);
        var (firstLeasts, secondLeasts) = (new Vector<float>(firstLeast), new Vector<float>(secondLeast));
        var (firstJump, secondJump) = (new Vector<float>(firstLeast + firstLarge), new Vector<float>(secondLeast + secondLarge));
        var (smalls, half) = (new Vector<float>(small), new Vector<float>(0.5f));
        var lowests = new Vector<float>(float.PositiveInfinity);
        nuint i = 0;
        for (; i + (nuint)Vector<float>.Count <= (nuint)cost.Length; i += (nuint)Vector<float>.Count)
        {
            var nearA = Vector.Min(Vector.LoadUnsafe(ref a, i), Vector.LoadUnsafe(ref a, i + 2)) + smalls;
            var bestA = Vector.Min(Vector.Min(Vector.LoadUnsafe(ref a, i + 1), firstJump), nearA) - firstLeasts;
            var nearB = Vector.Min(Vector.LoadUnsafe(ref b, i), Vector.LoadUnsafe(ref b, i + 2)) + smalls;
            var bestB = Vector.Min(Vector.Min(Vector.LoadUnsafe(ref b, i + 1), secondJump), nearB) - secondLeasts;
            var now = Vector.LoadUnsafe(ref c, i) + half * (bestA + bestB);
            now.StoreUnsafe(ref p, i + 1);
            lowests = Vector.Min(lowests, now);
        }

        var lowest = Lowest(lowests);
        for (var k = (int)i; k < cost.Length; k++)
        {
            var bestA = Math.Min(Math.Min(first[k + 1], firstLeast + firstLarge), Math.Min(first[k], first[k + 2]) + small) - firstLeast;
            var bestB = Math.Min(Math.Min(second[k + 1], secondLeast + secondLarge), Math.Min(second[k], second[k + 2]) + small) - secondLeast;
            path[k + 1] = cost[k] + 0.5f * (bestA + bestB);
            lowest = Math.Min(lowest, path[k + 1]);
        }

        return lowest;
    }

    /// <summary>A path that begins: its costs are the pixel's own.</summary>
    public static float Begin(ReadOnlySpan<float> cost, Span<float> path)
    {
        cost.CopyTo(path[1..]);
        return Lowest(cost);
    }

    /// <summary>Adds path costs to totals.</summary>
    public static void Add(ReadOnlySpan<float> path, Span<float> totals)
    {
        ref var p = ref MemoryMarshal.GetReference(path);
        ref var t = ref MemoryMarshal.GetReference(totals);
        nuint i = 0;
        for (; i + (nuint)Vector<float>.Count <= (nuint)totals.Length; i += (nuint)Vector<float>.Count)
        {
            (Vector.LoadUnsafe(ref t, i) + Vector.LoadUnsafe(ref p, i + 1)).StoreUnsafe(ref t, i);
        }

        for (var k = (int)i; k < totals.Length; k++)
        {
            totals[k] += path[k + 1];
        }
    }

    /// <summary>The least of some numbers; infinite for none.</summary>
    public static float Lowest(ReadOnlySpan<float> values)
    {
        ref var first = ref MemoryMarshal.GetReference(values);
        var lowests = new Vector<float>(float.PositiveInfinity);
        nuint i = 0;
        for (; i + (nuint)Vector<float>.Count <= (nuint)values.Length; i += (nuint)Vector<float>.Count)
        {
            lowests = Vector.Min(lowests, Vector.LoadUnsafe(ref first, i));
        }

        var lowest = Lowest(lowests);
        for (var k = (int)i; k < values.Length; k++)
        {
            lowest = Math.Min(lowest, values[k]);
        }

        return lowest;
    }

    private static float Lowest(Vector<float> values)
    {
        var lowest = values[0];
        for (var i = 1; i < Vector<float>.Count; i++)
        {
            lowest = Math.Min(lowest, values[i]);
        }

        return lowest;
    }
}
