using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>The fundamental matrix F of two views: x_rightᵀ · F · x_left = 0 for homogeneous ideal pixels of one scene point.</summary>
/// <remarks>
/// Immutable. Frobenius norm one, the entry of largest magnitude positive, rank two. See Luong and Faugeras (1996) and Hartley and Zisserman
/// (2003, chapter 9). From a rig: <see cref="Rig.FundamentalMatrix"/>; from point matches of pictures whose cameras are not known:
/// <see cref="FromMatches"/>.
/// </remarks>
public sealed class FundamentalMatrix
{
    private FundamentalMatrix(Matrix3x3 matrix, Epipole left, Epipole right, double rankTwoDeviation, FundamentalEstimation? estimation)
    {
        (Matrix, EpipoleInLeft, EpipoleInRight, RankTwoDeviation, Estimation) = (Normalised(matrix), left, right, rankTwoDeviation, estimation);
        SingularValues = [.. Matrix.ToMatrix().Svd(computeVectors: false).S];
    }

    /// <summary>The matrix: Frobenius norm one, entry of largest magnitude positive.</summary>
    public Matrix3x3 Matrix { get; }

    /// <summary>Where the left view sees the right camera's centre: F · e = 0.</summary>
    public Epipole EpipoleInLeft { get; }

    /// <summary>Where the right view sees the left camera's centre: Fᵀ · e = 0.</summary>
    public Epipole EpipoleInRight { get; }

    /// <summary>The three singular values, falling; the last is zero to rounding.</summary>
    public ImmutableArray<double> SingularValues { get; }

    /// <summary>The rank: singular values above 10⁻¹² of the largest.</summary>
    public int Rank => SingularValues.Count(value => value > 1e-12 * SingularValues[0]);

    /// <summary>
    /// The smallest over the second singular value before rank two was enforced: zero for a rig's own matrix; for a matrix that was given,
    /// how far it was from a fundamental matrix.
    /// </summary>
    public double RankTwoDeviation { get; }

    /// <summary>The matches and residuals it was estimated from; nothing where it came from a rig or was given.</summary>
    public FundamentalEstimation? Estimation { get; }

    /// <summary>The size of the left picture, where it is known, as for a rig's own matrix; lines in that view carry it.</summary>
    public PictureSize? LeftSize { get; private init; }

    /// <summary>The size of the right picture, where it is known.</summary>
    public PictureSize? RightSize { get; private init; }

    /// <summary>The fundamental matrix of a given matrix of any scale: the nearest one of rank two in the Frobenius norm, normalised.</summary>
    /// <param name="matrix">Nine finite numbers, of rank two or three.</param>
    /// <exception cref="UserErrorException">An entry is not finite, or the rank is below two.</exception>
    public static FundamentalMatrix From(Matrix3x3 matrix)
    {
        var norm = matrix.FrobeniusNorm;
        if (!double.IsFinite(norm) || norm == 0)
        {
            throw new UserErrorException("A fundamental matrix has nine finite entries that are not all zero; correct the matrix.");
        }

        var svd = ((1 / norm) * matrix).ToMatrix().Svd();
        var (first, second, third) = (svd.S[0], svd.S[1], svd.S[2]);
        if (second <= 1e-14 * first)
        {
            throw new UserErrorException(
                $"A fundamental matrix has rank two, but the given one has rank one (singular values {first:G3}, {second:G3}, {third:G3}); correct the matrix.");
        }

        // A matrix that is singular to rounding stays as it is: another decomposition would only blur its smallest entries.
        var singular = (1 / norm) * matrix;
        if (third > 1e-12 * second)
        {
            var (u, v) = (svd.U.Column(2), svd.VT.Row(2));
            singular = Matrix3x3.From(singular.ToMatrix() - third * u.OuterProduct(v));
        }

        return new(singular, new(NullVector(singular), View.Left), new(NullVector(singular.Transpose), View.Right), third / second, null);
    }

    /// <summary>Estimates the fundamental matrix from point matches with outliers.</summary>
    /// <remarks>
    /// Samples by random sample consensus (Fischler and Bolles 1981) scored by truncated squares (Torr and Zisserman 2000); each sample and
    /// the consensus by the normalised eight-point method (Hartley 1997); then the Sampson error (Sampson 1982) of the consensus is
    /// minimised over matrices of rank two (parameters of Bartoli and Sturm 2004). Same matches, settings and seed give the same result.
    /// </remarks>
    /// <param name="matches">At least eight; for uncalibrated pictures raw positions stand in for ideal ones.</param>
    /// <param name="tolerancePx">A match counts as consistent when its Sampson distance is at most this, in pixels.</param>
    /// <param name="seed">The seed of the random samples.</param>
    /// <param name="confidence">The probability with which one sample shall be free of outliers, above 0 and below 1.</param>
    /// <exception cref="UserErrorException">Fewer than eight matches or consistent matches, or all on one line or in one point.</exception>
    public static FundamentalMatrix FromMatches(
        IReadOnlyList<IdealMatch> matches, double tolerancePx = 1, int seed = 1, double confidence = 0.999) =>
        FundamentalEstimator.Robust(matches, tolerancePx, seed, confidence);

    /// <summary>The least-squares fundamental matrix of all matches by the normalised eight-point method (Hartley 1997).</summary>
    /// <param name="matches">At least eight, without outliers.</param>
    /// <exception cref="UserErrorException">Fewer than eight matches, or all on one line or in one point.</exception>
    public static FundamentalMatrix FromEightPoints(IReadOnlyList<IdealMatch> matches) => FundamentalEstimator.EightPoints(matches);

    /// <summary>The line in the right view on which the match of a left pixel lies: F · x_left.</summary>
    /// <exception cref="UserErrorException">The pixel is the epipole.</exception>
    public EpipolarLine LineInRight(IdealPixel left) => Line(Matrix, left, View.Right, RightSize);

    /// <summary>The line in the left view on which the match of a right pixel lies: Fᵀ · x_right.</summary>
    /// <exception cref="UserErrorException">The pixel is the epipole.</exception>
    public EpipolarLine LineInLeft(IdealPixel right) => Line(Matrix.Transpose, right, View.Left, LeftSize);

    /// <summary>The line in the other view on which the match of a view's pixel lies.</summary>
    /// <exception cref="UserErrorException">The pixel is the epipole.</exception>
    public EpipolarLine LineOf(View view, IdealPixel pixel) => view == View.Left ? LineInRight(pixel) : LineInLeft(pixel);

    /// <summary>The epipole of a view.</summary>
    public Epipole EpipoleIn(View view) => view == View.Left ? EpipoleInLeft : EpipoleInRight;

    /// <summary>x_rightᵀ · F · x_left, of no unit; zero for an exact match.</summary>
    public double AlgebraicResidual(IdealPixel left, IdealPixel right) => Homogeneous(right).Dot(Matrix * Homogeneous(left));

    /// <summary>The signed distance, in pixels, of one view's pixel from the epipolar line of the other's.</summary>
    /// <param name="left">The left pixel.</param>
    /// <param name="right">The right pixel.</param>
    /// <param name="measuredIn">The view in which the distance is taken.</param>
    public double EpipolarDistance(IdealPixel left, IdealPixel right, View measuredIn = View.Right)
    {
        var line = measuredIn == View.Right ? Matrix * Homogeneous(left) : Matrix.Transpose * Homogeneous(right);
        return AlgebraicResidual(left, right) / Math.Sqrt(line.X * line.X + line.Y * line.Y);
    }

    /// <summary>The root mean square of the two epipolar distances, in pixels.</summary>
    public double SymmetricDistance(IdealPixel left, IdealPixel right)
    {
        var (inLeft, inRight) = (EpipolarDistance(left, right, View.Left), EpipolarDistance(left, right, View.Right));
        return Math.Sqrt((inLeft * inLeft + inRight * inRight) / 2);
    }

    /// <summary>
    /// The signed first-order distance, in pixels, by which the four coordinates together must move to fulfil the epipolar equation
    /// (Sampson 1982).
    /// </summary>
    public double SampsonDistance(IdealPixel left, IdealPixel right)
    {
        var inRight = Matrix * Homogeneous(left);
        var inLeft = Matrix.Transpose * Homogeneous(right);
        return Homogeneous(right).Dot(inRight)
            / Math.Sqrt(inRight.X * inRight.X + inRight.Y * inRight.Y + inLeft.X * inLeft.X + inLeft.Y * inLeft.Y);
    }

    /// <summary>The essential matrix of two calibrated cameras: K_rightᵀ · F · K_left, made to have two equal singular values.</summary>
    public EssentialMatrix ToEssential(CameraMatrix left, CameraMatrix right) =>
        EssentialMatrix.From(right.Matrix.Transpose * Matrix * left.Matrix);

    /// <summary>The matrix and its epipoles.</summary>
    public override string ToString() => $"F = {Matrix}, epipoles {EpipoleInLeft} and {EpipoleInRight}";

    // The matrix is of rank two by construction and the epipoles are known better than a decomposition could tell.
    internal static FundamentalMatrix Of(Rig rig)
    {
        var (rotation, translation) = (rig.RightFromLeft.Rotation, rig.RightFromLeft.Translation.Normalized);
        var matrix = rig.Right.Matrix.Inverse.Transpose * Matrix3x3.Skew(translation) * rotation * rig.Left.Matrix.Inverse;
        return new(
            matrix,
            new(rig.Left.Matrix.Matrix * -(rotation.Transpose * translation), View.Left),
            new(rig.Right.Matrix.Matrix * translation, View.Right),
            0,
            null)
        {
            LeftSize = rig.Left.Size,
            RightSize = rig.Right.Size,
        };
    }

    internal static FundamentalMatrix Estimated(Matrix3x3 rankTwo, double rankTwoDeviation, FundamentalEstimation? estimation) =>
        new(rankTwo, new(NullVector(rankTwo), View.Left), new(NullVector(rankTwo.Transpose), View.Right), rankTwoDeviation, estimation);

    internal static Vector3D Homogeneous(IdealPixel pixel) => new(pixel.U, pixel.V, 1);

    // At the epipole rounding leaves a line of some direction: sums that cancel to their last digits are zero.
    private static EpipolarLine Line(Matrix3x3 matrix, IdealPixel pixel, View view, PictureSize? size)
    {
        var line = matrix * Homogeneous(pixel);
        var terms = (matrix.Row1.Norm + matrix.Row2.Norm) * Homogeneous(pixel).Norm;
        return Math.Abs(line.X) + Math.Abs(line.Y) > 1e-15 * terms
            ? new(line.X, line.Y, line.Z, view, size)
            : throw new UserErrorException(
                $"Pixel ({pixel.U:0.###}, {pixel.V:0.###}) is the epipole of the {view.Other().Name()} view, whose match may lie anywhere in the {view.Name()} one; choose another pixel.");
    }

    private static Matrix3x3 Normalised(Matrix3x3 matrix)
    {
        double[] entries =
        [
            matrix.M11, matrix.M12, matrix.M13, matrix.M21, matrix.M22, matrix.M23, matrix.M31, matrix.M32, matrix.M33,
        ];
        return (Math.Sign(entries.MaxBy(Math.Abs)) / matrix.FrobeniusNorm) * matrix;
    }

    // The rows of a matrix of rank two span a plane; the null vector is its normal, best told by the two rows that differ most.
    private static Vector3D NullVector(Matrix3x3 matrix)
    {
        var (first, second, third) = (Unit(matrix.Row1), Unit(matrix.Row2), Unit(matrix.Row3));
        return new[] { first.Cross(second), second.Cross(third), third.Cross(first) }.MaxBy(normal => normal.Norm);

        static Vector3D Unit(Vector3D row) => row.Norm > 0 ? row.Normalized : row;
    }
}
