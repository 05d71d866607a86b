using MathNet.Numerics.LinearAlgebra;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>A surface of second order fitted to measured points, over their own plane.</summary>
/// <remarks>
/// With u across, v along and h upright towards the camera, all in millimetres from the points' centroid:
/// h = c₀ + c₁·u + c₂·v + c₃·u² + c₄·u·v + c₅·v². Weights, random part and common part as for <see cref="PlaneFit"/>. Where the direction
/// across is not given it is square to the points' two long edges, and its uncertainty is part of the random part: a cupped plank that is taken
/// askew seems twisted.
/// </remarks>
public sealed class QuadraticFit
{
    private const int Terms = 6;

    private readonly RigVariants<Surface> variants;
    private readonly Matrix<double> covariance;
    private readonly Extent across;
    private readonly Extent along;
    private readonly double turnSigma;

    private QuadraticFit(
        MeasuredPoints points, RigVariants<Surface> variants, RobustFit fit, Extent across, Extent along, Vector3D acrossDirection, double turnSigma)
    {
        (Points, this.variants, this.across, this.along, Across, this.turnSigma) = (points, variants, across, along, acrossDirection, turnSigma);
        (covariance, RandomPartBasis) = (Surface.Unscaled(fit.Covariance, variants.Nominal), fit.Basis);
        OutlierShare = fit.Weights.Count(weight => weight == 0) / (double)points.Count;
    }

    /// <summary>The points that the surface was fitted to.</summary>
    public MeasuredPoints Points { get; }

    /// <summary>Where u and v are zero, on the plane that heights are counted from, in the left camera's own frame, in millimetres.</summary>
    public Vector3D Origin => variants.Nominal.Plane.Point;

    /// <summary>The direction v along, in the left camera's own frame, of length one.</summary>
    public Vector3D Along => variants.Nominal.V;

    /// <summary>The direction u across, in the left camera's own frame, of length one.</summary>
    public Vector3D Across { get; }

    /// <summary>The direction upright on the surface's plane, of length one, towards the camera.</summary>
    public Vector3D Normal => variants.Nominal.Plane.Normal;

    /// <summary>The share of points, 0 to 1, that lie so far off that they have no say.</summary>
    public double OutlierShare { get; }

    /// <summary>What the random part of the uncertainty rests on, as a phrase.</summary>
    public string RandomPartBasis { get; }

    /// <summary>The extent of the points across: between the middle of their near ends and of their far ends along strips, one point's spacing included.</summary>
    public MeasuredValue Width => variants.ToMeasured(surface => surface.AcrossScale * across.Length, across.Sigma, "mm");

    /// <summary>The extent of the points along.</summary>
    public MeasuredValue Length => variants.ToMeasured(surface => surface.AlongScale * along.Length, along.Sigma, "mm");

    /// <summary>
    /// The signed sagitta across: how far the middle lies behind the chord between both edges, above zero where the edges stand nearer to the
    /// camera than the middle.
    /// </summary>
    /// <param name="widthMm">The width w, above zero; the extent of the points when left out.</param>
    /// <remarks>
    /// Along u the edges lie at u₀ ± w/2 and their chord, at the middle, at h(u₀) + c₃·w²/4, wherever u₀ is and whatever the slope: the
    /// sagitta is c₃·w²/4.
    /// </remarks>
    public MeasuredValue SagittaAcross(double? widthMm = null) =>
        Derive(widthMm, null, (surface, w, _) => surface.Coefficients[3] * w * w / 4);

    /// <summary>The signed sagitta along, as <see cref="SagittaAcross"/> with c₅ and the length.</summary>
    /// <param name="lengthMm">The length, above zero; the extent of the points when left out.</param>
    public MeasuredValue SagittaAlong(double? lengthMm = null) =>
        Derive(null, lengthMm, (surface, _, l) => surface.Coefficients[5] * l * l / 4);

    /// <summary>
    /// The twist: the signed distance of the corner at +u, +v of the fitted surface from the plane through its other three corners, above zero towards the camera.
    /// </summary>
    /// <param name="widthMm">The width w, above zero; the extent of the points when left out.</param>
    /// <param name="lengthMm">The length l, above zero; the extent of the points when left out.</param>
    /// <remarks>
    /// Upright, the fourth corner stands h(+,+) − h(+,−) − h(−,+) + h(−,−) = c₄·w·l over the plane of the others; square terms cancel. The
    /// distance is that over √(1 + slope²) of the plane. A direction across that is off by ε adds 8·c·ε·l/w for a cup c: where the
    /// direction is found from the points its uncertainty is part of the random part, where it is given it is taken as exact.
    /// </remarks>
    public MeasuredValue FourthCorner(double? widthMm = null, double? lengthMm = null)
    {
        var (middleU, middleV) = (across.Middle, along.Middle);
        return Derive(widthMm, lengthMm, (surface, w, l) =>
        {
            double Corner(int u, int v) => surface.Height(middleU + u * w / 2, middleV + v * l / 2);
            var (slopeU, slopeV) = ((Corner(1, -1) - Corner(-1, -1)) / w, (Corner(-1, 1) - Corner(-1, -1)) / l);
            return surface.Coefficients[4] * w * l / Math.Sqrt(1 + slopeU * slopeU + slopeV * slopeV);
        });
    }

    /// <summary>How far the fitted surface, free of the noise of single points, departs from a plane over the points' extent.</summary>
    public Flatness Flatness() => Measurement.Flatness.Of(Derive(null, null, FormRms), Derive(null, null, FormPeakToValley));

    /// <summary>The coefficients c₀ to c₅ for u, v and h in millimetres.</summary>
    public IReadOnlyList<double> Coefficients => [.. variants.Nominal.Coefficients];

    /// <summary>The sagittas and the twist.</summary>
    public override string ToString() => $"second-order surface over {Points.Count} points: sagitta across {SagittaAcross()}, along {SagittaAlong()}, fourth corner {FourthCorner()}";

    internal static QuadraticFit To(MeasuredPoints points, Vector3D? acrossGrain)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 2 * Terms)
        {
            throw new UserErrorException($"A surface of second order takes at least {2 * Terms} points, but there are {points.Count}; select a region with more matches.");
        }

        var planeFit = PlaneFit.To(points);
        var plane = planeFit.Plane;
        var (given, turnSigma) = acrossGrain is { } direction
            ? plane.InPlane(direction) is null
                ? throw new UserErrorException("The direction across the grain stands upright on the surface; give one that lies in it.")
                : (direction, 0)
            : ShortSide(points, planeFit);
        var surface = Surface.Frame(plane, given, points.Positions);
        var rows = surface.Rows(points.Positions);
        var (relative, stated) = PlaneFit.Sigmas(points, plane.Normal);
        var fit = RobustFit.Of(rows, Terms, [.. points.Positions.Select(plane.Height)], relative, stated, points.Blocks(), points.PullAlong(plane.Normal));
        surface = surface.With(fit.Coefficients);

        var sample = points.Sample;
        var (planeWeights, weights) = (planeFit.Weights, Array.ConvertAll(sample, i => fit.Weights[i]));
        var sampled = points.Varied.Nominal;
        var reference = Surface.Frame(plane, given, sampled).SpreadOf(sampled);
        var variants = points.Varied.Select(surface, positions =>
        {
            var frame = Surface.Frame(Plane.To(positions, i => planeWeights[sample[i]]), given, positions);
            var coefficients = RobustFit.Solve(frame.Rows(positions), Terms, [.. positions.Select(frame.Plane.Height)], weights);
            return frame.With(coefficients).RelativeTo(reference, positions);
        });

        var kept = Enumerable.Range(0, points.Count).Where(i => fit.Weights[i] > 0).Select(i => surface.Place(points.Positions[i])).ToArray();
        var pitch = points.MeanPitchMm;
        return new(points, variants, fit, Extent.Of(kept, pitch), Extent.Of([.. kept.Select(place => (place.V, place.U))], pitch), surface.U, turnSigma);
    }

    private static (Vector3D Side, double TurnSigma) ShortSide(MeasuredPoints points, PlaneFit fit)
    {
        var (axes, spread) = Plane.Scatter(points.Positions, i => fit.Weights[i], fit.Centroid, fit.Weights.Sum());

        // For a rectangle the variances go with the squares of the sides.
        if (spread[2] < 1.3 * 1.3 * spread[1])
        {
            throw new UserErrorException("The region is nearly as long as it is wide, so its short side is not clear; state the direction across the grain.");
        }

        // An axis has no sense of its own: to the right, so that the same plank gives the same signs.
        var side = new Vector3D(axes[0, 1], axes[1, 1], axes[2, 1]);
        side = side.X < 0 ? -side : side;
        var lengthwise = fit.Normal.Cross(side);
        var places = points.Positions.Where((_, i) => fit.Weights[i] > 0).Select(p => (lengthwise.Dot(p - fit.Centroid), side.Dot(p - fit.Centroid)));
        var edges = LongEdges.Of([.. places], points.MeanPitchMm);
        var (sine, cosine) = Math.SinCos(edges.Angle);
        return (cosine * side - sine * lengthwise, edges.Sigma);
    }

    private static double FormRms(Surface surface, double width, double length) => Math.Sqrt(Form(surface, width, length).Average(h => h * h));

    private static double FormPeakToValley(Surface surface, double width, double length) => Form(surface, width, length) is var form ? form.Max() - form.Min() : 0;

    // The surface on a grid over its extent, less its own plane: on a symmetric grid c₀, c₁ and c₂ and the means of the squares fall out.
    private static double[] Form(Surface surface, double width, double length)
    {
        const int half = 10;
        var c = surface.Coefficients;
        var heights = new List<double>();
        for (var i = -half; i <= half; i++)
        {
            for (var j = -half; j <= half; j++)
            {
                var (u, v) = (i * width / (2 * half), j * length / (2 * half));
                heights.Add(c[3] * u * u + c[4] * u * v + c[5] * v * v);
            }
        }

        var mean = heights.Average();
        return [.. heights.Select(height => height - mean)];
    }

    // Value under every rig; random part by the slopes of the quantity in the coefficients, in an extent and in a direction that were measured.
    private MeasuredValue Derive(double? widthMm, double? lengthMm, Func<Surface, double, double, double> quantity)
    {
        if (widthMm is <= 0 or double.NaN || lengthMm is <= 0 or double.NaN)
        {
            throw new UserErrorException($"A width or length of {widthMm ?? lengthMm} mm is not one; give a length above zero, or leave it out to take the points' extent.");
        }

        double Evaluate(Surface surface, double width, double length) =>
            quantity(surface, widthMm ?? width * surface.AcrossScale, lengthMm ?? length * surface.AlongScale);

        var nominal = variants.Nominal;
        var slopes = Vector<double>.Build.Dense(Terms, term =>
        {
            // Central differences at one standard deviation, where second-order quantities such as an RMS are not yet flat.
            var step = Math.Sqrt(covariance[term, term]);
            return step > 0
                ? (Evaluate(nominal.Moved(term, step), across.Length, along.Length) - Evaluate(nominal.Moved(term, -step), across.Length, along.Length)) / (2 * step)
                : double.IsNaN(step) ? double.NaN : 0;
        });
        var ofWidth = (Evaluate(nominal, across.Length + across.Sigma, along.Length) - Evaluate(nominal, across.Length - across.Sigma, along.Length)) / 2;
        var ofLength = (Evaluate(nominal, across.Length, along.Length + along.Sigma) - Evaluate(nominal, across.Length, along.Length - along.Sigma)) / 2;
        var ofTurn = (Evaluate(nominal.Turned(turnSigma), across.Length, along.Length) - Evaluate(nominal.Turned(-turnSigma), across.Length, along.Length)) / 2;
        var variance = Math.Max(0, slopes * covariance * slopes) + ofWidth * ofWidth + ofLength * ofLength + ofTurn * ofTurn;
        return variants.ToMeasured(surface => Evaluate(surface, across.Length, along.Length), Math.Sqrt(variance), "mm");
    }
}
