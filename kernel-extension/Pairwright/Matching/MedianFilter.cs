using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Pairwright.Matching;

/// <summary>The median of a 3 × 3 neighbourhood; see <see cref="Filter.Median"/>.</summary>
/// <remarks>
/// Eight pixels at a time. What is not measured, or lies outside, counts as infinite and so comes last when the nine are sorted; the median of
/// the n that are measured is the one at place (n − 1) / 2.
/// </remarks>
internal sealed class MedianFilter : Filter
{
    // Before the first and behind the last column stands one that is not measured; steps of eight may read on.
    private const int Side = 8;

    public override string Name => "median";

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var (width, height) = (map.Size.Width, map.Size.Height);
        var stride = width + 2 * Side;
        var source = GC.AllocateUninitializedArray<float>(stride * (height + 2));
        var threads = new ParallelOptions { CancellationToken = stop, MaxDegreeOfParallelism = map.Threads };
        Parallel.For(0, height + 2, threads, row => Copy(map, row - 1, source.AsSpan(row * stride, stride)));
        Parallel.For(0, height, threads, v => Row(source.AsSpan(v * stride, 3 * stride), stride, map.DisparityArray.AsSpan(v * width, width)));
    }

    // A row with infinity wherever there is no measured disparity.
    private static void Copy(WorkingMap map, int v, Span<float> to)
    {
        if (v < 0 || v >= map.Size.Height)
        {
            to.Fill(float.PositiveInfinity);
            return;
        }

        var width = map.Size.Width;
        var disparity = map.DisparityArray.AsSpan(v * width, width);
        var labels = map.LabelArray.AsSpan(v * width, width);
        to[..Side].Fill(float.PositiveInfinity);
        to[(Side + width)..].Fill(float.PositiveInfinity);
        to = to[Side..];
        var u = 0;
        for (; u <= width - LabelVectors.Step; u += LabelVectors.Step)
        {
            var measured = LabelVectors.Are(LabelVectors.Load(labels, u), DisparityLabel.Measured);
            Vector256.ConditionalSelect(measured.AsSingle(), Vector256.Create<float>(disparity[u..]), Vector256.Create(float.PositiveInfinity)).CopyTo(to[u..]);
        }

        for (; u < width; u++)
        {
            to[u] = labels[u] == DisparityLabel.Measured ? disparity[u] : float.PositiveInfinity;
        }
    }

    private static void Row(ReadOnlySpan<float> rows, int stride, Span<float> disparity)
    {
        var above = rows[(Side - 1)..];
        var here = above[stride..];
        var below = here[stride..];
        var u = 0;
        for (; u <= disparity.Length - 8; u += 8)
        {
            Of(above[u..], here[u..], below[u..], Vector256.Create<float>(disparity[u..])).CopyTo(disparity[u..]);
        }

        if (u < disparity.Length)
        {
            Span<float> rest = stackalloc float[8];
            disparity[u..].CopyTo(rest);
            Of(above[u..], here[u..], below[u..], Vector256.Create<float>(rest)).CopyTo(rest);
            rest[..(disparity.Length - u)].CopyTo(disparity[u..]);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<float> Of(ReadOnlySpan<float> above, ReadOnlySpan<float> here, ReadOnlySpan<float> below, Vector256<float> before)
    {
        var (a, b, c) = (Vector256.Create(above), Vector256.Create(above[1..]), Vector256.Create(above[2..]));
        var (d, e, f) = (Vector256.Create(here), Vector256.Create(here[1..]), Vector256.Create(here[2..]));
        var (g, h, i) = (Vector256.Create(below), Vector256.Create(below[1..]), Vector256.Create(below[2..]));
        var infinite = Vector256.Create(float.PositiveInfinity);
        var isMeasured = Vector256.LessThan(e, infinite);

        // A comparison's ones are minus one as a whole number.
        var missing = -(Are(a, infinite) + Are(b, infinite) + Are(c, infinite) + Are(d, infinite) + Are(e, infinite)
            + Are(f, infinite) + Are(g, infinite) + Are(h, infinite) + Are(i, infinite));
        var place = (Vector256.Create(8) - missing) >> 1;

        // Batches of comparisons that sort nine (a network of 25, Knuth, The Art of Computer Programming 3, section 5.3.4, from memory), without the
        // three that only order the upper four.
        Sort(ref a, ref d);
        Sort(ref b, ref h);
        Sort(ref c, ref f);
        Sort(ref e, ref i);
        Sort(ref a, ref h);
        Sort(ref c, ref e);
        Sort(ref d, ref i);
        Sort(ref f, ref g);
        Sort(ref a, ref c);
        Sort(ref b, ref d);
        Sort(ref e, ref f);
        Sort(ref h, ref i);
        Sort(ref b, ref e);
        Sort(ref d, ref g);
        Sort(ref f, ref h);
        Sort(ref a, ref b);
        Sort(ref c, ref e);
        Sort(ref d, ref f);
        Sort(ref c, ref d);
        Sort(ref e, ref f);
        Sort(ref b, ref c);
        Sort(ref d, ref e);

        var median = a;
        median = At(1, place, b, median);
        median = At(2, place, c, median);
        median = At(3, place, d, median);
        median = At(4, place, e, median);
        return Vector256.ConditionalSelect(isMeasured, median, before);
    }

    private static Vector256<int> Are(Vector256<float> values, Vector256<float> value) => Vector256.Equals(values, value).AsInt32();

    private static Vector256<float> At(int place, Vector256<int> places, Vector256<float> value, Vector256<float> other) =>
        Vector256.ConditionalSelect(Vector256.Equals(places, Vector256.Create(place)).AsSingle(), value, other);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Sort(ref Vector256<float> lower, ref Vector256<float> upper) =>
        (lower, upper) = (Vector256.MinNative(lower, upper), Vector256.MaxNative(lower, upper));
}
