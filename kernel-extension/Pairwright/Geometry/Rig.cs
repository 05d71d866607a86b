using MathNet.Numerics.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra.Factorization;

namespace Pairwright.Geometry;

/// <summary>Two calibrated cameras and the pose between them, with the covariance of all their parameters where it is known.</summary>
/// <remarks>Immutable. Points are in the left camera's frame, in millimetres.</remarks>
public sealed class Rig
{
    private readonly Matrix<double>? covariance;
    private readonly Lazy<FundamentalMatrix> fundamentalMatrix;

    /// <summary>Makes a rig.</summary>
    /// <param name="left">The reference camera.</param>
    /// <param name="right">The other camera.</param>
    /// <param name="rightFromLeft">X_right = R·X_left + t, t in millimetres.</param>
    /// <param name="covariance">
    /// The covariance of the parameters in the order of <see cref="RigParameters"/>, 30 × 30, symmetric, zero for what was held fixed;
    /// nothing where it is not known.
    /// </param>
    /// <param name="provenance">Where the rig came from.</param>
    /// <exception cref="UserErrorException">The rotation is not one, the cameras share a centre, or the covariance is not one.</exception>
    public Rig(Camera left, Camera right, Pose rightFromLeft, Matrix<double>? covariance = null, Provenance? provenance = null)
    {
        ArgumentNullException.ThrowIfNull(left);
        ArgumentNullException.ThrowIfNull(right);
        if (!Rotation.IsRotation(rightFromLeft.Rotation))
        {
            throw new UserErrorException("The rig's rotation is not a rotation (its transpose is not its inverse, or it mirrors); correct the rig file or calibrate again.");
        }

        if (!(rightFromLeft.Translation.Norm > 0) || !double.IsFinite(rightFromLeft.Translation.Norm))
        {
            throw new UserErrorException("The rig's translation must be finite and not zero: two cameras at one place see no depth; correct the rig file.");
        }

        // A rotation written with few digits would leave rows apart and lines off by as much; one exact to rounding is kept bit for bit.
        var rotation = Rotation.Deviation(rightFromLeft.Rotation) < 1e-14 ? rightFromLeft.Rotation : Rotation.Nearest(rightFromLeft.Rotation);
        (Left, Right, RightFromLeft, Provenance) = (left, right, rightFromLeft with { Rotation = rotation }, provenance ?? Provenance.None);
        if (covariance is not null)
        {
            this.covariance = Checked(covariance);
        }

        fundamentalMatrix = new(() => FundamentalMatrix.Of(this));
    }

    /// <summary>The reference camera.</summary>
    public Camera Left { get; }

    /// <summary>The other camera.</summary>
    public Camera Right { get; }

    /// <summary>X_right = R·X_left + t.</summary>
    public Pose RightFromLeft { get; }

    /// <summary>The covariance of the parameters in the order of <see cref="RigParameters"/> (a copy), or nothing where it is not known.</summary>
    public Matrix<double>? Covariance => covariance?.Clone();

    /// <summary>Where the rig came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>The distance between the camera centres, in millimetres.</summary>
    public double BaselineMm => RightFromLeft.Translation.Norm;

    /// <summary>The right camera's centre in the left camera's frame, in millimetres: −Rᵀ·t.</summary>
    public Vector3D RightCentreInLeft => RightFromLeft.Inverse.Translation;

    /// <summary>F = K_right⁻ᵀ·[t]×·R·K_left⁻¹, normalised: x_rightᵀ · F · x_left = 0 for ideal pixels of one scene point.</summary>
    public FundamentalMatrix FundamentalMatrix => fundamentalMatrix.Value;

    /// <summary>E = [t]×·R with a translation of length one.</summary>
    public EssentialMatrix EssentialMatrix => EssentialMatrix.Of(this);

    /// <summary>
    /// The least depth, in millimetres in the left camera's frame, at which the two views overlap: everything nearer is blind to depth.
    /// Nothing where they overlap nowhere up to 10,000 baselines.
    /// </summary>
    public double? BlindZoneMm => SharedViews.NearestDepth(this);

    /// <summary>The camera of a view.</summary>
    public Camera this[View view] => view == View.Left ? Left : Right;

    /// <summary>The ray of a view's ideal pixel, in the left camera's frame.</summary>
    public Ray Ray(View view, IdealPixel pixel) => view == View.Left
        ? new(default, Left.Ray(pixel))
        : new(RightCentreInLeft, RightFromLeft.Rotation.Transpose * Right.Ray(pixel));

    /// <summary>The ray of a view's raw pixel, in the left camera's frame.</summary>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field.</exception>
    public Ray Ray(View view, RawPixel pixel) => Ray(view, this[view].Undistort(pixel));

    /// <summary>The ideal pixels of a match in raw ones.</summary>
    /// <exception cref="UserErrorException">A pixel lies outside its lens model's valid field.</exception>
    public IdealMatch Undistort(RawMatch match) => new(Left.Undistort(match.Left), Right.Undistort(match.Right));

    /// <summary>An epipolar line as the lens forms it in the raw picture of the line's view.</summary>
    /// <param name="line">The line.</param>
    /// <param name="stepPx">The distance between neighbouring points of the chain, in pixels, above zero.</param>
    public RawCurve RawCurveOf(EpipolarLine line, double stepPx = 1) => RawCurves.OfLine(this, line, stepPx);

    /// <summary>
    /// Where in the other view's raw picture the match of a raw pixel may lie: the curve of its ray, from far to near, each point with its
    /// inverse depth.
    /// </summary>
    /// <param name="pixel">The pixel.</param>
    /// <param name="nearestMm">The least depth Z in the frame of the pixel's camera, in millimetres; down to the camera when left out.</param>
    /// <param name="farthestMm">The greatest depth, in millimetres; infinity when left out.</param>
    /// <param name="stepPx">The distance between neighbouring points of the chain, in pixels, above zero.</param>
    /// <param name="of">The view of the pixel.</param>
    /// <exception cref="UserErrorException">The pixel lies outside the lens model's valid field, or the depths are not in order.</exception>
    public RawCurve RawCurveOf(
        RawPixel pixel, double? nearestMm = null, double? farthestMm = null, double stepPx = 1, View of = View.Left) =>
        RawCurves.OfPixel(this, pixel, nearestMm ?? 0, farthestMm ?? double.PositiveInfinity, stepPx, of);

    /// <summary>What both cameras see of the plane at one depth.</summary>
    /// <param name="depthMm">The depth Z in the left camera's frame, in millimetres, above zero.</param>
    public SharedView SharedViewAt(double depthMm) => SharedViews.At(this, depthMm);

    /// <summary>Tells by cheirality and epipolar distance whether the pictures of a pair are swapped against this rig.</summary>
    /// <param name="matches">At least one match; the more, the surer.</param>
    /// <param name="tolerancePx">The Sampson distance up to which a match counts as near its epipolar lines, in pixels.</param>
    /// <exception cref="UserErrorException">No match is given.</exception>
    public PairOrderCheck OrderOf(IReadOnlyList<RawMatch> matches, double tolerancePx = 3) => PairOrderCheck.Of(this, matches, tolerancePx);

    /// <summary>The standard uncertainty of a parameter by its place in <see cref="RigParameters"/>; NaN where no covariance is known.</summary>
    public double StandardUncertainty(int parameter) => covariance is null ? double.NaN : Math.Sqrt(covariance[parameter, parameter]);

    /// <summary>Both cameras and the pose between them.</summary>
    public override string ToString() => FormattableString.Invariant($"left: {Left}; right: {Right}; right from left: {RightFromLeft}; baseline {BaselineMm:0.###} mm");

    /// <summary>The rig that results when a small change is added to the parameters, without covariance.</summary>
    /// <param name="change">Thirty numbers in the order and units of <see cref="RigParameters"/>.</param>
    public Rig Changed(IReadOnlyList<double> change)
    {
        ArgumentNullException.ThrowIfNull(change);
        ArgumentOutOfRangeException.ThrowIfNotEqual(change.Count, RigParameters.Count);
        var turn = Rotation.FromVector(new(change[24], change[25], change[26]));
        var shift = new Vector3D(change[27], change[28], change[29]);
        return new(
            Changed(Left, change, 0),
            Changed(Right, change, RigParameters.RightCamera),
            new(turn * RightFromLeft.Rotation, RightFromLeft.Translation + shift),
            provenance: Provenance);
    }

    /// <summary>
    /// Changes whose outer products add up to the covariance: for a quantity y(rig), u(y)² = Σ (y(Changed(+c)) − y(Changed(−c)))² / 4.
    /// Empty where no covariance is known.
    /// </summary>
    /// <remarks>The law of propagation (JCGM 100:2008, 5.2) along the principal axes of the covariance, by central differences.</remarks>
    public IReadOnlyList<IReadOnlyList<double>> PrincipalChanges()
    {
        if (covariance is null)
        {
            return [];
        }

        // Axes of the correlation matrix: the parameters' scales differ by ten powers of ten, which would drown the small ones.
        var sigma = covariance.Diagonal().Map(Math.Sqrt);
        var free = Enumerable.Range(0, RigParameters.Count).Where(i => sigma[i] > 0).ToArray();
        if (free.Length == 0)
        {
            return [];
        }

        var correlation = Matrix<double>.Build.Dense(free.Length, free.Length, (i, j) => covariance[free[i], free[j]] / (sigma[free[i]] * sigma[free[j]]));
        Evd<double> axes = correlation.Evd(Symmetricity.Symmetric);
        var changes = new List<IReadOnlyList<double>>();
        for (var axis = 0; axis < free.Length; axis++)
        {
            var length = Math.Sqrt(Math.Max(axes.EigenValues[axis].Real, 0));
            if (length == 0)
            {
                continue;
            }

            var change = new double[RigParameters.Count];
            for (var i = 0; i < free.Length; i++)
            {
                change[free[i]] = length * axes.EigenVectors[i, axis] * sigma[free[i]];
            }

            changes.Add(change);
        }

        return changes;
    }

    private static Camera Changed(Camera camera, IReadOnlyList<double> change, int start)
    {
        var (k, d) = (camera.Matrix, camera.Distortion);
        return new(
            new(k.FocalU + change[start], k.FocalV + change[start + 1], k.CentreU + change[start + 2], k.CentreV + change[start + 3]),
            camera.Size,
            new(
                d.K1 + change[start + 4],
                d.K2 + change[start + 5],
                d.P1 + change[start + 6],
                d.P2 + change[start + 7],
                d.K3 + change[start + 8],
                d.K4 + change[start + 9],
                d.K5 + change[start + 10],
                d.K6 + change[start + 11]));
    }

    private static Matrix<double> Checked(Matrix<double> covariance)
    {
        if (covariance.RowCount != RigParameters.Count || covariance.ColumnCount != RigParameters.Count)
        {
            throw new UserErrorException(
                $"The rig's covariance is {covariance.RowCount} × {covariance.ColumnCount}, but a rig has {RigParameters.Count} parameters; correct the rig file.");
        }

        for (var i = 0; i < RigParameters.Count; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var bound = 1.000001 * Math.Sqrt(covariance[i, i] * covariance[j, j]);
                if (!(covariance[i, i] >= 0) || !(Math.Abs(covariance[i, j]) <= bound) || Math.Abs(covariance[i, j] - covariance[j, i]) > 1e-9 * bound)
                {
                    throw new UserErrorException(
                        $"The rig's covariance is not one at '{RigParameters.Names[i]}' and '{RigParameters.Names[j]}' (NaN, a negative variance, not symmetric, or correlated by more than one); correct the rig file.");
                }
            }
        }

        var sigma = covariance.Diagonal().Map(Math.Sqrt);
        var correlation = Matrix<double>.Build.Dense(
            RigParameters.Count,
            RigParameters.Count,
            (i, j) => sigma[i] > 0 && sigma[j] > 0 ? (covariance[i, j] + covariance[j, i]) / (2 * sigma[i] * sigma[j]) : 0);
        if (correlation.Evd(Symmetricity.Symmetric).EigenValues.Min(value => value.Real) < -1e-6)
        {
            throw new UserErrorException(
                "The rig's covariance is not one: some combination of parameters would have a negative variance; correct the rig file or write more digits.");
        }

        return covariance.Clone();
    }
}
