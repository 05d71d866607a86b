using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>A plane fitted to measured points, in the left camera's own frame.</summary>
/// <remarks>
/// Orthogonal distances (total least squares), reweighted so that wrong matches have no say (Huber's weights first, then Tukey's biweight).
/// The random part of everything derived from it comes from the scatter over blocks of pixels wider than the correlation of the matcher's
/// errors (Liang and Zeger 1986); where a region holds too few such blocks, from the stated σ of the disparities with each block wholly
/// correlated; what the matcher's pull towards whole pixels may do to the fit is added. The common part comes from fitting again with the rig changed along every axis of its covariance.
/// </remarks>
public sealed class PlaneFit
{
    private readonly RigVariants<Plane> variants;
    private readonly Vector3D axisX;
    private readonly Vector3D axisY;
    private readonly Matrix<double> covariance;

    private PlaneFit(MeasuredPoints points, RigVariants<Plane> variants, Vector3D axisX, Vector3D axisY, RobustFit fit)
    {
        (Points, this.variants, this.axisX, this.axisY, covariance, Weights) = (points, variants, axisX, axisY, fit.Covariance, fit.Weights);
        RandomPartBasis = fit.Basis;
        var kept = Weights.Count(weight => weight > 0);
        OutlierShare = 1 - kept / (double)points.Count;
        var squares = 0.0;
        for (var i = 0; i < points.Count; i++)
        {
            squares += Weights[i] > 0 ? Math.Pow(Plane.Height(points.Positions[i]), 2) : 0;
        }

        RmsMm = Math.Sqrt(squares / kept);
    }

    /// <summary>The points that the plane was fitted to.</summary>
    public MeasuredPoints Points { get; }

    /// <summary>The weighted mean of the points, on the plane, in millimetres.</summary>
    public Vector3D Centroid => Plane.Point;

    /// <summary>The direction upright on the plane, of length one, towards the camera.</summary>
    public Vector3D Normal => Plane.Normal;

    /// <summary>The root mean square of the orthogonal distances of the points that have a say, in millimetres; their noise included.</summary>
    public double RmsMm { get; }

    /// <summary>The share of points, 0 to 1, that lie so far off that they have no say.</summary>
    public double OutlierShare { get; }

    /// <summary>What the random part of the uncertainty rests on, as a phrase.</summary>
    public string RandomPartBasis { get; }

    /// <summary>The distance of the left camera's centre from the plane.</summary>
    public MeasuredValue DistanceFromCamera =>
        variants.ToMeasured(plane => -plane.Normal.Dot(plane.Point), HeightSigma(default), "mm");

    /// <summary>The depth of the plane where the viewing ray through its centroid meets it, along the left camera's optical axis.</summary>
    public MeasuredValue CentroidDepth
    {
        get
        {
            var ray = Plane.Point / Plane.Point.Z;
            return variants.ToMeasured(
                plane => plane.Normal.Dot(plane.Point) / plane.Normal.Dot(ray),
                HeightSigma(Plane.Point) / Math.Abs(Plane.Normal.Dot(ray)),
                "mm");
        }
    }

    /// <summary>The angle between the plane's normal and the left camera's optical axis, in degrees.</summary>
    public MeasuredValue Tilt => AngleOf(variants.Select(plane => (plane.Normal, new Vector3D(0, 0, -1))), TiltCovariance);

    /// <summary>The signed height of a point over the plane, above zero towards the camera; what both share through the rig cancels.</summary>
    /// <exception cref="UserErrorException">The two were measured with different rigs.</exception>
    public MeasuredValue HeightOf(MeasuredPoint point)
    {
        ArgumentNullException.ThrowIfNull(point);
        return variants
            .With(point.Variants, (plane, position) => plane.Height(position))
            .ToMeasured(height => height, Quadrature(HeightSigma(point.Position), point.RandomSigma(Normal)), "mm");
    }

    /// <summary>
    /// The step from another plane up to this one: the height of this plane's centroid over the other plane, above zero towards the camera;
    /// what both share through the rig cancels.
    /// </summary>
    /// <param name="reference">The other plane. Its points must not be points of this one, for their random parts are taken as independent.</param>
    /// <exception cref="UserErrorException">The two were measured with different rigs.</exception>
    public MeasuredValue StepHeightOver(PlaneFit reference)
    {
        ArgumentNullException.ThrowIfNull(reference);
        return reference.variants
            .With(variants, (below, above) => below.Height(above.Point))
            .ToMeasured(height => height, Quadrature(HeightSigma(Centroid), reference.HeightSigma(Centroid)), "mm");
    }

    /// <summary>The angle between this plane and another, in degrees; what both share through the rig cancels.</summary>
    /// <exception cref="UserErrorException">The two were measured with different rigs.</exception>
    public MeasuredValue AngleTo(PlaneFit other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return AngleOf(variants.With(other.variants, (a, b) => (a.Normal, b.Normal)), TiltCovariance + other.TiltCovariance);
    }

    /// <summary>Where the plane is and how it fits.</summary>
    public override string ToString() =>
        $"plane {DistanceFromCamera} from the left camera, tilted {Tilt}; {Points.Count} points, RMS {RmsMm:0.###} mm, {100 * OutlierShare:0.#} % without a say";

    /// <summary>The weight of each point, zero for one without a say.</summary>
    internal double[] Weights { get; }

    internal Plane Plane => variants.Nominal;

    internal static PlaneFit To(MeasuredPoints points)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 3)
        {
            throw new UserErrorException($"A plane takes at least three points, but there are {points.Count}; select a region with more matches.");
        }

        // Wrong matches lie along the viewing rays, often farther than the region is wide: the first plane is taken as heights towards the
        // camera over a plane that faces it, where they cannot turn it on edge; orthogonal distances follow once they have no say.
        Plane.RequireSpread(points.Positions);
        var centroid = points.Centroid;
        var plane = new Plane(centroid, -centroid.Normalized);
        var sigmas = Sigmas(points, plane.Normal);
        var blocks = points.Blocks();
        var (axisX, axisY, fit) = Robust(points, plane, sigmas, blocks, null);

        // The robust fit moves the plane, the moved plane changes the orthogonal distances: a few turns settle it.
        for (var turn = 0; turn < 10; turn++)
        {
            var weights = fit.Weights;
            plane = Plane.To(points.Positions, i => weights[i]);
            (axisX, axisY, fit) = Robust(points, plane, sigmas, blocks, turn == 0 ? null : fit.Scale);
            if (fit.IsSettled)
            {
                break;
            }
        }

        var sample = points.Sample;
        var variants = points.Varied.Select(plane, positions => Plane.To(positions, i => fit.Weights[sample[i]]));
        return new(points, variants, axisX, axisY, fit);
    }

    /// <summary>The relative σ of points along a direction: stated σ, held to within a factor of √2 of each other, so that no point rules; 1 where none is stated.</summary>
    internal static (double[] Relative, double[]? Stated) Sigmas(MeasuredPoints points, Vector3D direction)
    {
        var stated = new double[points.Count];
        for (var i = 0; i < stated.Length; i++)
        {
            stated[i] = Math.Sqrt(direction.Dot(points.Covariance(i) * direction));
        }

        if (!stated.All(sigma => sigma > 0 && double.IsFinite(sigma)))
        {
            return ([.. Enumerable.Repeat(1.0, points.Count)], stated.Any(double.IsNaN) ? null : stated);
        }

        var middle = stated.Order().ElementAt(stated.Length / 2);
        return (Array.ConvertAll(stated, sigma => Math.Sqrt(middle * middle + sigma * sigma)), stated);
    }

    // The random standard uncertainty of the plane's height below or above a point.
    private double HeightSigma(Vector3D point) =>
        Math.Sqrt(Math.Max(0, Quadratic(covariance, [1, axisX.Dot(point - Centroid), axisY.Dot(point - Centroid)])));

    private static (Vector3D X, Vector3D Y, RobustFit Fit) Robust(
        MeasuredPoints points, Plane plane, (double[] Relative, double[]? Stated) sigmas, PointBlocks blocks, double? knownScale)
    {
        var x = plane.InPlane(new(1, 0, 0)) ?? plane.InPlane(new(0, 1, 0))!.Value;
        var y = plane.Normal.Cross(x);
        var rows = new double[3 * points.Count];
        var heights = new double[points.Count];
        for (var i = 0; i < heights.Length; i++)
        {
            var offset = points.Positions[i] - plane.Point;
            (rows[3 * i], rows[3 * i + 1], rows[3 * i + 2]) = (1, x.Dot(offset), y.Dot(offset));
            heights[i] = plane.Normal.Dot(offset);
        }

        return (x, y, RobustFit.Of(rows, 3, heights, sigmas.Relative, sigmas.Stated, blocks, points.PullAlong(plane.Normal), knownScale));
    }

    // The covariance of the normal's random part, in the left camera's frame, radians squared.
    private Matrix<double> TiltCovariance
    {
        get
        {
            var axes = Matrix<double>.Build.DenseOfColumnMajor(3, 2, [axisX.X, axisX.Y, axisX.Z, axisY.X, axisY.Y, axisY.Z]);
            return axes * covariance.SubMatrix(1, 2, 1, 2) * axes.Transpose();
        }
    }

    private static MeasuredValue AngleOf(RigVariants<(Vector3D A, Vector3D B)> normals, Matrix<double> tiltCovariance)
    {
        const double degrees = 180 / Math.PI;
        var (a, b) = normals.Nominal;
        var apart = b - b.Dot(a) * a;

        // Parallel planes part in no particular direction: the most uncertain one counts.
        var variance = double.IsNaN(tiltCovariance.Trace()) ? double.NaN
            : apart.Norm < 1e-9 ? tiltCovariance.Evd(Symmetricity.Symmetric).EigenValues.Max(value => value.Real)
            : Quadratic(tiltCovariance, [apart.X / apart.Norm, apart.Y / apart.Norm, apart.Z / apart.Norm]);
        return normals.ToMeasured(
            pair => degrees * Math.Atan2(pair.A.Cross(pair.B).Norm, pair.A.Dot(pair.B)), degrees * Math.Sqrt(Math.Max(0, variance)), "°");
    }

    private static double Quadratic(Matrix<double> matrix, double[] along)
    {
        var vector = Vector<double>.Build.Dense(along);
        return vector * matrix * vector;
    }

    private static double Quadrature(double a, double b) => Math.Sqrt(a * a + b * b);
}
