using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>Measured points of one capture in the left camera's own frame, each with the pixel pair that it came from.</summary>
/// <remarks>
/// Because the pixel pairs are kept, every quantity that is derived from the points can be evaluated again as if the rig were another one:
/// the raw pixels stay, their rays and meeting points change. That is how the common part of an uncertainty is found, along every axis of
/// the rig's covariance. Sets of more than 600 points are re-evaluated on an even sample of about that many; the value itself and its
/// random part always rest on all points.
/// </remarks>
public sealed class MeasuredPoints
{
    private const int SampleSize = 600;

    private readonly PointSource source;
    private readonly int[] indices;
    private readonly Lazy<(int[] Sample, RigVariants<Vector3D[]> Variants)> sampled;

    internal MeasuredPoints(PointSource source, IEnumerable<int> indices)
    {
        this.source = source;
        var kept = new List<int>();
        var positions = ImmutableArray.CreateBuilder<Vector3D>();
        foreach (var index in indices)
        {
            var position = source.Position(index);
            if (double.IsFinite(position.X + position.Y + position.Z))
            {
                kept.Add(index);
                positions.Add(position);
            }
        }

        (this.indices, Positions) = ([.. kept], positions.ToImmutable());
        sampled = new(VarySample);
    }

    /// <summary>The positions in the left camera's own frame, in millimetres.</summary>
    public ImmutableArray<Vector3D> Positions { get; }

    /// <summary>The number of points.</summary>
    public int Count => Positions.Length;

    /// <summary>The rig that measured the points; nothing where the pair came rectified without one, so that the common part is not known.</summary>
    public Rig? Rig => source.Rig;

    /// <summary>How far the errors of neighbouring points are correlated, in pixels; 0 where every point is independent.</summary>
    public double CorrelationLengthPx => source.CorrelationLengthPx;

    /// <summary>The mean position, in millimetres; NaN where there are no points.</summary>
    public Vector3D Centroid => Positions.Aggregate(default(Vector3D), (sum, position) => sum + position) / Count;

    /// <summary>One point.</summary>
    /// <param name="index">From 0, in the order of <see cref="Positions"/>.</param>
    public MeasuredPoint this[int index]
    {
        get
        {
            var variants = source.Rig is { } rig && source.Pair(indices[index]) is var pair
                ? RigVariants<Vector3D>.Of(rig, Positions[index], changed => RayMeeting.Of(changed, pair.Left, pair.Right, source.OnLeftRay))
                : RigVariants<Vector3D>.Of(null, Positions[index], _ => default);
            return new(variants, source.Covariance(indices[index]));
        }
    }

    /// <summary>Points from features that were located in both raw pictures, such as board corners; each is the point halfway between its two rays.</summary>
    /// <param name="rig">The rig.</param>
    /// <param name="lefts">The raw pixels in the left picture.</param>
    /// <param name="rights">The raw pixels of the same features in the right picture, in the same order.</param>
    /// <param name="sigmaPx">The standard uncertainty of each pixel coordinate, independent of all others, in pixels.</param>
    /// <remarks>A feature outside a lens model's valid field is left out.</remarks>
    /// <exception cref="UserErrorException">The two lists differ in length.</exception>
    public static MeasuredPoints FromCorners(Rig rig, IReadOnlyList<RawPixel> lefts, IReadOnlyList<RawPixel> rights, double sigmaPx)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(lefts);
        ArgumentNullException.ThrowIfNull(rights);
        ArgumentOutOfRangeException.ThrowIfNegative(sigmaPx);
        if (lefts.Count != rights.Count)
        {
            throw new UserErrorException(
                $"{lefts.Count} corners in the left picture do not pair with {rights.Count} in the right one; give the same corners in the same order.");
        }

        return new(new CornerPointSource(rig, lefts, rights, sigmaPx), Enumerable.Range(0, lefts.Count));
    }

    /// <summary>The points that fulfil a condition on their position in the left camera's own frame.</summary>
    public MeasuredPoints Where(Func<Vector3D, bool> condition)
    {
        ArgumentNullException.ThrowIfNull(condition);
        return new(source, indices.Where((_, i) => condition(Positions[i])));
    }

    /// <summary>Fits a plane: orthogonal distances, wrong matches without a say.</summary>
    /// <exception cref="UserErrorException">There are fewer than three points, or they lie on a line.</exception>
    public PlaneFit FitPlane() => PlaneFit.To(this);

    /// <summary>Fits a surface of second order over the plane of the points.</summary>
    /// <param name="acrossGrain">A direction in the left camera's own frame, its length without meaning; the short side of the points when left out.</param>
    /// <exception cref="UserErrorException">There are too few points, they lie on a line, or no direction was given and the points have no short side.</exception>
    public QuadraticFit FitQuadratic(Vector3D? acrossGrain = null) => QuadraticFit.To(this, acrossGrain);

    /// <summary>The cup of a plank: the magnitude of <see cref="QuadraticFit.SagittaAcross"/>.</summary>
    /// <param name="acrossGrain">The direction across the grain in the left camera's own frame; the short side of the points when left out.</param>
    /// <param name="widthMm">The plank's width; the extent of the points when left out.</param>
    public MeasuredValue Cup(Vector3D? acrossGrain = null, double? widthMm = null) => FitQuadratic(acrossGrain).SagittaAcross(widthMm).Magnitude;

    /// <summary>The bow of a plank: the magnitude of <see cref="QuadraticFit.SagittaAlong"/>.</summary>
    /// <param name="acrossGrain">The direction across the grain in the left camera's own frame; the short side of the points when left out.</param>
    /// <param name="lengthMm">The plank's length; the extent of the points when left out.</param>
    public MeasuredValue Bow(Vector3D? acrossGrain = null, double? lengthMm = null) => FitQuadratic(acrossGrain).SagittaAlong(lengthMm).Magnitude;

    /// <summary>The twist of a plank: the magnitude of <see cref="QuadraticFit.FourthCorner"/>.</summary>
    /// <param name="acrossGrain">The direction across the grain in the left camera's own frame; the short side of the points when left out.</param>
    /// <param name="widthMm">The plank's width; the extent of the points when left out.</param>
    /// <param name="lengthMm">The plank's length; the extent of the points when left out.</param>
    public MeasuredValue Twist(Vector3D? acrossGrain = null, double? widthMm = null, double? lengthMm = null) =>
        FitQuadratic(acrossGrain).FourthCorner(widthMm, lengthMm).Magnitude;

    /// <summary>How flat the points themselves are about their own plane; for a few precise points such as board corners.</summary>
    /// <remarks>The noise of the points is part of the figure. For a dense surface ask <see cref="QuadraticFit.Flatness"/>, which averages the noise out.</remarks>
    public Flatness Flatness() => Measurement.Flatness.OfPoints(this);

    /// <summary>The positions that the same pixels would have had with another rig; NaN outside a lens model's field.</summary>
    /// <param name="rig">The other rig.</param>
    /// <exception cref="UserErrorException">The points came from a rectified pair without a rig, so that their raw pixels are not known.</exception>
    public ImmutableArray<Vector3D> PositionsUnder(Rig rig)
    {
        ArgumentNullException.ThrowIfNull(rig);
        if (source.Rig is null)
        {
            throw new UserErrorException("These points came from a pair that was rectified elsewhere, so their raw pixels are not known; rectify a raw pair with its rig.");
        }

        var positions = new Vector3D[Count];

        // The lens model finds its valid field on first use and remembers it: before several threads ask.
        _ = rig.Left.Distortion.ValidRadius + rig.Right.Distortion.ValidRadius;
        Parallel.For(0, Count, i =>
        {
            var pair = source.Pair(indices[i]);
            positions[i] = RayMeeting.Of(rig, pair.Left, pair.Right, source.OnLeftRay);
        });
        return [.. positions];
    }

    /// <summary>The number of points and where they are.</summary>
    public override string ToString() =>
        $"{Count} measured points about ({MeasuredText.Plain(Centroid.X)}, {MeasuredText.Plain(Centroid.Y)}, {MeasuredText.Plain(Centroid.Z)}) mm; left camera's frame";

    /// <summary>The points of <see cref="Varied"/>, as indices into <see cref="Positions"/>.</summary>
    internal int[] Sample => sampled.Value.Sample;

    /// <summary>The positions of the sample under every rig.</summary>
    internal RigVariants<Vector3D[]> Varied => sampled.Value.Variants;

    internal (double U, double V) Place(int index) => source.Place(indices[index]);

    internal Matrix3x3 Covariance(int index) => source.Covariance(indices[index]);

    /// <summary>
    /// The heights along a direction that the pull of the disparities may add: two patterns, in and out of phase with whole pixels, of one standard
    /// deviation each. Empty where there is no pull.
    /// </summary>
    internal IReadOnlyList<double[]> PullAlong(Vector3D direction)
    {
        if (source.PullSigmaPx == 0)
        {
            return [];
        }

        var (cosine, sine) = (new double[Count], new double[Count]);
        for (var i = 0; i < Count; i++)
        {
            var (disparity, step) = source.Lever(indices[i]);
            var phase = 2 * Math.PI * (disparity - Math.Floor(disparity));
            var height = source.PullSigmaPx * direction.Dot(step);
            (cosine[i], sine[i]) = (height * Math.Cos(phase), height * Math.Sin(phase));
        }

        return [cosine, sine];
    }

    internal double MeanPitchMm => Count == 0 ? 0 : indices.Average(source.PitchMm);

    internal PointBlocks Blocks() => PointBlocks.Group([.. indices.Select(source.Place)], CorrelationLengthPx);

    private (int[] Sample, RigVariants<Vector3D[]> Variants) VarySample()
    {
        // An even step through rows would sample columns unevenly where it divides the width; the golden ratio spreads over both.
        var sample = Count <= SampleSize
            ? Enumerable.Range(0, Count).ToArray()
            : [.. Enumerable.Range(0, SampleSize).Select(i => (int)((i + ((0.6180339887 * i) % 1)) * Count / (SampleSize + 1)))];
        var pairs = source.Rig is null ? [] : Array.ConvertAll(sample, i => source.Pair(indices[i]));
        var variants = RigVariants<Vector3D[]>.Of(
            source.Rig,
            Array.ConvertAll(sample, i => Positions[i]),
            rig => Array.ConvertAll(pairs, pair => RayMeeting.Of(rig, pair.Left, pair.Right, source.OnLeftRay)));

        // A point that leaves the lens model's field under one rig is left out under all, so that differences compare the same points.
        var usable = Enumerable.Range(0, sample.Length)
            .Where(i => variants.Changed.All(pair => double.IsFinite(pair.Plus[i].Z) && double.IsFinite(pair.Minus[i].Z)))
            .ToArray();
        return usable.Length == sample.Length
            ? (sample, variants)
            : (Array.ConvertAll(usable, i => sample[i]), variants.Select(positions => Array.ConvertAll(usable, i => positions[i])));
    }
}
