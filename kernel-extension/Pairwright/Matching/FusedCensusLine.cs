using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Census costs as bytes, worked out anew for each pixel: that is cheaper than reading them from a stored volume.</summary>
/// <remarks>
/// A left pixel has one value of four bits per plane, so the distance to any four bits of the right picture is an entry of a table of sixteen. One
/// look-up and one addition per plane and vector give the Hamming distance.
/// </remarks>
internal sealed unsafe class FusedCensusLine<TLanes, TBytes, TWords, TTable> : FusedCostLine<TLanes, TBytes, TWords, TTable>
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private readonly CensusNibbles leftBits;
    private readonly CensusNibbles rightBits;
    private readonly AlignedMemory left;
    private readonly AlignedMemory right;
    private readonly int planes;
    private readonly int leftBytes;

    public FusedCensusLine(RectifiedPair pair, FusedLayout layout, byte standIn, PictureSize window, bool centreSymmetric)
        : base(pair, layout, standIn)
    {
        (leftBits, rightBits) = (new(pair.Left, window, centreSymmetric, mirrored: false), new(pair.Right, window, centreSymmetric, mirrored: true));
        planes = leftBits.Planes;
        leftBytes = layout.Width + 64;
        left = AlignedMemory.Filled((long)leftBytes * planes, 0);
        right = AlignedMemory.Filled((long)layout.LineBytes * planes, 0);
    }

    public override void Dispose()
    {
        base.Dispose();
        leftBits.Dispose();
        rightBits.Dispose();
        left.Dispose();
        right.Dispose();
    }

    protected override void Prepare(int v)
    {
        leftBits.Fill(v, left.Start, leftBytes);
        rightBits.Fill(v, right.Start + Layout.Margin, Layout.LineBytes);
    }

    protected override void Compare(int u, byte* costs)
    {
        var here = left.Start + u;
        var there = right.Start + Layout.First(u);
        nint lanes = Layout.Lanes;
        nint i = 0;
        for (; i <= lanes - 8 * TLanes.Bytes; i += 8 * TLanes.Bytes)
        {
            CompareEight(here, there + i, costs + i);
        }

        for (; i <= lanes - 2 * TLanes.Bytes; i += 2 * TLanes.Bytes)
        {
            CompareTwo(here, there + i, costs + i);
        }

        for (; i < lanes; i += TLanes.Bytes)
        {
            CompareOne(here, there + i, costs + i);
        }
    }

    private void CompareEight(byte* here, byte* there, byte* costs)
    {
        var (a, b, c, d) = (TLanes.All(0), TLanes.All(0), TLanes.All(0), TLanes.All(0));
        var (e, f, g, h) = (a, a, a, a);
        nint step = TLanes.Bytes;
        for (var plane = 0; plane < planes; plane++)
        {
            var table = TLanes.Table(HammingTables.Of(*here));
            a = TLanes.Add(a, TLanes.LookUp(table, TLanes.Load(there)));
            b = TLanes.Add(b, TLanes.LookUp(table, TLanes.Load(there + step)));
            c = TLanes.Add(c, TLanes.LookUp(table, TLanes.Load(there + 2 * step)));
            d = TLanes.Add(d, TLanes.LookUp(table, TLanes.Load(there + 3 * step)));
            e = TLanes.Add(e, TLanes.LookUp(table, TLanes.Load(there + 4 * step)));
            f = TLanes.Add(f, TLanes.LookUp(table, TLanes.Load(there + 5 * step)));
            g = TLanes.Add(g, TLanes.LookUp(table, TLanes.Load(there + 6 * step)));
            h = TLanes.Add(h, TLanes.LookUp(table, TLanes.Load(there + 7 * step)));
            here += leftBytes;
            there += Layout.LineBytes;
        }

        TLanes.Store(costs, a);
        TLanes.Store(costs + step, b);
        TLanes.Store(costs + 2 * step, c);
        TLanes.Store(costs + 3 * step, d);
        TLanes.Store(costs + 4 * step, e);
        TLanes.Store(costs + 5 * step, f);
        TLanes.Store(costs + 6 * step, g);
        TLanes.Store(costs + 7 * step, h);
    }

    private void CompareTwo(byte* here, byte* there, byte* costs)
    {
        var (a, b) = (TLanes.All(0), TLanes.All(0));
        nint step = TLanes.Bytes;
        for (var plane = 0; plane < planes; plane++)
        {
            var table = TLanes.Table(HammingTables.Of(*here));
            a = TLanes.Add(a, TLanes.LookUp(table, TLanes.Load(there)));
            b = TLanes.Add(b, TLanes.LookUp(table, TLanes.Load(there + step)));
            here += leftBytes;
            there += Layout.LineBytes;
        }

        TLanes.Store(costs, a);
        TLanes.Store(costs + step, b);
    }

    private void CompareOne(byte* here, byte* there, byte* costs)
    {
        var sum = TLanes.All(0);
        for (var plane = 0; plane < planes; plane++)
        {
            sum = TLanes.Add(sum, TLanes.LookUp(TLanes.Table(HammingTables.Of(*here)), TLanes.Load(there)));
            here += leftBytes;
            there += Layout.LineBytes;
        }

        TLanes.Store(costs, sum);
    }
}
