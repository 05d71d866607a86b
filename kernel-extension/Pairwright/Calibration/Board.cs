using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>A flat checkerboard of known squares: what the cameras look at while they are calibrated.</summary>
/// <remarks>
/// The board's frame has its origin at inner corner 0, X along the rows of corners ("across"), Y down the columns, Z = 0 on the board
/// and pointing away from a camera that sees its front. Corner <c>i</c> stands in column <c>i mod across</c> of row <c>i / across</c>.
/// </remarks>
public sealed record Board
{
    private Board(int innerCornersAcross, int innerCornersDown, double squareMm)
    {
        (InnerCornersAcross, InnerCornersDown, SquareMm) = (innerCornersAcross, innerCornersDown, squareMm);
        Corners = [.. Enumerable.Range(0, CornerCount).Select(i => new Vector3D(i % innerCornersAcross * squareMm, i / innerCornersAcross * squareMm, 0))];
        Sides =
        [
            .. from i in Enumerable.Range(0, CornerCount) where i % innerCornersAcross < innerCornersAcross - 1 select (i, i + 1),
            .. from i in Enumerable.Range(0, CornerCount - innerCornersAcross) select (i, i + innerCornersAcross),
        ];
    }

    /// <summary>Inner corners in a row: one less than the squares in a row.</summary>
    public int InnerCornersAcross { get; }

    /// <summary>Inner corners in a column: one less than the squares in a column.</summary>
    public int InnerCornersDown { get; }

    /// <summary>The side of a square, in millimetres.</summary>
    public double SquareMm { get; }

    /// <summary>The number of inner corners.</summary>
    public int CornerCount => InnerCornersAcross * InnerCornersDown;

    /// <summary>The inner corners in the board's frame, in millimetres, row after row.</summary>
    public ImmutableArray<Vector3D> Corners { get; }

    /// <summary>The pairs of neighbouring corners, first along the rows, then down the columns; each pair is one square side apart.</summary>
    public ImmutableArray<(int First, int Second)> Sides { get; }

    /// <summary>
    /// Whether the colours of the squares tell the board from itself turned by 180°: they do when one of the two corner counts is odd and the other even.
    /// </summary>
    public bool ColoursTellHalfTurn => (InnerCornersAcross + InnerCornersDown) % 2 == 1;

    /// <summary>A checkerboard.</summary>
    /// <param name="innerCornersAcross">Inner corners in a row, 3 to 200: one less than the squares in a row.</param>
    /// <param name="innerCornersDown">Inner corners in a column, 3 to 200: one less than the squares in a column.</param>
    /// <param name="squareMm">The side of a square as measured on the board, in millimetres, above zero.</param>
    /// <exception cref="UserErrorException">A count or the square is out of range.</exception>
    public static Board Checker(int innerCornersAcross, int innerCornersDown, double squareMm)
    {
        if (innerCornersAcross is < 3 or > 200 || innerCornersDown is < 3 or > 200)
        {
            throw new UserErrorException(
                $"A checkerboard of {innerCornersAcross} × {innerCornersDown} inner corners is not supported: count the points where four squares meet, 3 to 200 each way.");
        }

        if (!(squareMm > 0) || !double.IsFinite(squareMm))
        {
            throw new UserErrorException($"A square of {squareMm} mm is not a length above zero: measure the board's squares with a caliper and state the side in millimetres.");
        }

        return new(innerCornersAcross, innerCornersDown, squareMm);
    }

    /// <summary>Whether two boards have equal counts and squares.</summary>
    public bool Equals(Board? other) =>
        other is not null && (InnerCornersAcross, InnerCornersDown, SquareMm).Equals((other.InnerCornersAcross, other.InnerCornersDown, other.SquareMm));

    /// <summary>Hashes the counts and the square.</summary>
    public override int GetHashCode() => HashCode.Combine(InnerCornersAcross, InnerCornersDown, SquareMm);

    /// <summary>The board in words.</summary>
    public override string ToString() => FormattableString.Invariant($"checkerboard, {InnerCornersAcross} × {InnerCornersDown} inner corners, squares of {SquareMm:0.###} mm");
}
