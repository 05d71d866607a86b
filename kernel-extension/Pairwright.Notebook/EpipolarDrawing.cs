using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Notebook;

/// <summary>A pair with points and the lines on which their matches must lie; draws itself over both raw pictures.</summary>
public sealed class EpipolarDrawing
{
    internal EpipolarDrawing(StereoPair pair, ImmutableArray<RawPixel> left, ImmutableArray<RawPixel> right, FundamentalMatrix? fundamentalMatrix)
    {
        if (right.Length > 0 && right.Length != left.Length)
        {
            throw new UserErrorException($"There are {left.Length} left points and {right.Length} right ones; give the match of each left point, in the same order.");
        }

        if (pair.Rig is null && fundamentalMatrix is null)
        {
            throw new UserErrorException("The pair has no rig and no fundamental matrix is given, so there are no epipolar lines to draw; read the pair with its rig.");
        }

        (Pair, Left, Right, FundamentalMatrix) = (pair, left, right, fundamentalMatrix);
    }

    /// <summary>The pair.</summary>
    public StereoPair Pair { get; }

    /// <summary>The points of the left picture, raw.</summary>
    public ImmutableArray<RawPixel> Left { get; }

    /// <summary>Their matches in the right picture, raw; empty where they are not known.</summary>
    public ImmutableArray<RawPixel> Right { get; }

    /// <summary>The geometry that was given for a pair without a rig; nothing where the rig's is used.</summary>
    public FundamentalMatrix? FundamentalMatrix { get; }

    /// <summary>The signed distances of the right points from the lines of the left ones, in ideal pixels (in raw ones without a rig); empty without right points.</summary>
    public ImmutableArray<double> DistancesPx =>
        [.. Left.Zip(Right, (l, r) => Geometry.EpipolarDistance(Ideal(View.Left, l), Ideal(View.Right, r)))];

    /// <summary>The root mean square of <see cref="DistancesPx"/>; NaN without right points.</summary>
    public double RmsPx => Right.IsEmpty ? double.NaN : Math.Sqrt(DistancesPx.Average(distance => distance * distance));

    /// <summary>The chain of raw pixels along which the other view may show a point.</summary>
    internal IEnumerable<(double U, double V)> CurveOf(View of, RawPixel point)
    {
        var other = of == View.Left ? View.Right : View.Left;
        if (FundamentalMatrix is null)
        {
            return Pair.Rig!.RawCurveOf(point, stepPx: 4, of: of).Points.Select(p => (p.Raw.U, p.Raw.V));
        }

        var ends = FundamentalMatrix.LineOf(of, new(point.U, point.V)).ClippedTo(Pair[other].Size);
        return ends is var (from, to) ? [(from.U, from.V), (to.U, to.V)] : [];
    }

    private FundamentalMatrix Geometry => FundamentalMatrix ?? Pair.Rig!.FundamentalMatrix;

    private IdealPixel Ideal(View view, RawPixel point) => FundamentalMatrix is null ? Pair.Rig![view].Undistort(point) : new(point.U, point.V);
}
