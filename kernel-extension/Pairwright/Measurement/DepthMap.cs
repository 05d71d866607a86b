using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Measurement;

/// <summary>Depth at every pixel of a rectified left picture.</summary>
/// <remarks>
/// <para>Z is along the rectified left axis, so that Z = f·b / (d + offset) holds to the letter. Measured points and clouds made from it are in the left camera's own frame.</para>
/// <para>
/// The random part of Z at one pixel is Z² / (f·b) times the standard uncertainty of its disparity: its σ and the matcher's pull. The common part comes from meeting the
/// same two raw pixels' rays again with the rig changed along every axis of its covariance.
/// </para>
/// </remarks>
public sealed class DepthMap
{
    private readonly Lazy<ScalarMap> z;
    private readonly Lazy<ScalarMap?> sigma;

    /// <summary>Makes a depth map from disparities.</summary>
    /// <param name="disparity">d = u_left − u_right in pixels; NaN where there is none.</param>
    /// <param name="geometry">The rectified geometry.</param>
    /// <param name="rectification">How the pair was made from raw pictures; nothing where it came rectified, so that the common part is not known.</param>
    /// <param name="disparitySigma">The standard uncertainty of each disparity from picture noise and matching, in pixels; nothing where it is not known.</param>
    /// <param name="correlationLengthPx">How far the errors of neighbouring disparities are correlated, in pixels, above zero.</param>
    /// <param name="picture">The rectified left picture, for colours.</param>
    /// <param name="provenance">Where it came from.</param>
    /// <param name="pullSigmaPx">The standard uncertainty of the disparities' pull towards or away from whole pixels, in pixels, zero or above.</param>
    /// <exception cref="UserErrorException">The sizes differ.</exception>
    public DepthMap(
        ScalarMap disparity,
        RectifiedGeometry geometry,
        Rectification? rectification = null,
        ScalarMap? disparitySigma = null,
        double correlationLengthPx = 11,
        Picture? picture = null,
        Provenance? provenance = null,
        double pullSigmaPx = 0)
    {
        ArgumentNullException.ThrowIfNull(disparity);
        ArgumentNullException.ThrowIfNull(geometry);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(correlationLengthPx);
        ArgumentOutOfRangeException.ThrowIfNegative(pullSigmaPx);
        if ((disparitySigma?.Size ?? disparity.Size) != disparity.Size || (picture?.Size ?? disparity.Size) != disparity.Size)
        {
            throw new UserErrorException($"A disparity map of {disparity.Size} px does not go with a σ map or picture of another size; give maps of one size.");
        }

        (Disparity, Geometry, Rectification, DisparitySigma, CorrelationLengthPx, PullSigmaPx, Picture) =
            (disparity, geometry, rectification, disparitySigma, correlationLengthPx, pullSigmaPx, picture);
        Provenance = provenance ?? Provenance.None;
        z = new(() => disparity.Select(d => (float)geometry.DepthMm(d)));
        sigma = new(() => disparitySigma is null ? null : ScalarMap.From(Size, (u, v) => (float)RandomSigma(u, v)));
    }

    /// <summary>The size, in pixels.</summary>
    public PictureSize Size => Disparity.Size;

    /// <summary>Depth along the rectified left axis, in millimetres; NaN where there is none.</summary>
    public ScalarMap Z => z.Value;

    /// <summary>The random part of the standard uncertainty of <see cref="Z"/>, in millimetres; nothing where the matching states no σ.</summary>
    public ScalarMap? Sigma => sigma.Value;

    /// <summary>The disparities, in pixels.</summary>
    public ScalarMap Disparity { get; }

    /// <summary>The standard uncertainty of the disparities, in pixels, where it is known.</summary>
    public ScalarMap? DisparitySigma { get; }

    /// <summary>The rectified geometry.</summary>
    public RectifiedGeometry Geometry { get; }

    /// <summary>How the pair was made from raw pictures, where it was.</summary>
    public Rectification? Rectification { get; }

    /// <summary>The rig, where it is known.</summary>
    public Rig? Rig => Rectification?.Rig;

    /// <summary>How far the errors of neighbouring disparities are correlated, in pixels.</summary>
    public double CorrelationLengthPx { get; }

    /// <summary>
    /// The standard uncertainty of the disparities' pull towards or away from whole pixels, in pixels: part of the random part, but shared by all
    /// pixels of a surface at one depth.
    /// </summary>
    public double PullSigmaPx { get; }

    /// <summary>The rectified left picture, where it is known.</summary>
    public Picture? Picture { get; }

    /// <summary>Where the map came from.</summary>
    public Provenance Provenance { get; }

    /// <summary>The depth at a pixel of the rectified left picture, along the rectified left axis, with both parts of its uncertainty.</summary>
    /// <param name="u">Column.</param>
    /// <param name="v">Row.</param>
    public MeasuredValue this[int u, int v]
    {
        get
        {
            var axis = Geometry.LeftFromRectified * new Vector3D(0, 0, 1);
            var along = PointAt(u, v).Variants.ToMeasured(axis.Dot, RandomSigma(u, v), "mm");
            return new(Geometry.DepthMm(Disparity[u, v]), along.RandomSigma, "mm", along.CommonParts);
        }
    }

    /// <summary>The measured point at a pixel of the rectified left picture, in the left camera's own frame.</summary>
    /// <param name="u">Column.</param>
    /// <param name="v">Row.</param>
    /// <exception cref="UserErrorException">The pixel is not in the picture or has no depth.</exception>
    public MeasuredPoint PointAt(int u, int v)
    {
        if (u < 0 || v < 0 || u >= Size.Width || v >= Size.Height)
        {
            throw new UserErrorException($"Pixel ({u}, {v}) does not lie in a depth map of {Size} px; choose one inside it.");
        }

        var points = new MeasuredPoints(new DepthPointSource(this), [v * Size.Width + u]);
        return points.Count == 1 ? points[0] : throw new UserErrorException($"Pixel ({u}, {v}) has no depth; choose one with a match.");
    }

    /// <summary>The measured points inside a mask of the rectified left picture.</summary>
    /// <exception cref="UserErrorException">The mask has another size, or no pixel inside it has a depth.</exception>
    public MeasuredPoints Within(Mask mask)
    {
        ArgumentNullException.ThrowIfNull(mask);
        if (mask.Size != Size)
        {
            throw new UserErrorException($"A mask of {mask.Size} px does not fit a depth map of {Size} px; give a mask of the rectified left picture.");
        }

        return Select(index => mask.Usable[index], "the mask");
    }

    /// <summary>The measured points inside a rectangle of the rectified left picture.</summary>
    /// <exception cref="UserErrorException">The rectangle does not lie in the picture, or no pixel inside it has a depth.</exception>
    public MeasuredPoints Within(PixelRegion region)
    {
        region.Require(Size);
        return Select(index => region.Contains(index % Size.Width, index / Size.Width), region.ToString());
    }

    /// <summary>All measured points as a cloud.</summary>
    public PointCloud ToCloud() => PointCloud.From(this);

    /// <summary>The size, the share of pixels with a depth, and the range.</summary>
    public override string ToString()
    {
        var known = Z.Values.ToArray().Where(float.IsFinite).DefaultIfEmpty(float.NaN).ToArray();
        return $"depth map {Size} px, {100 * Z.ValidShare:0.#} % with depth, {MeasuredText.Plain(known.Min())} to {MeasuredText.Plain(known.Max())} mm along the rectified left axis";
    }

    internal double RandomSigma(int u, int v) =>
        Math.Abs(Geometry.DepthPerDisparity(Geometry.DepthMm(Disparity[u, v]))) * RandomSigmaPx(v * Size.Width + u);

    internal double RandomSigmaPx(int index) =>
        DisparitySigma is { } stated ? Math.Sqrt(stated.Values[index] * stated.Values[index] + PullSigmaPx * PullSigmaPx) : double.NaN;

    private MeasuredPoints Select(Func<int, bool> isInside, string where)
    {
        var points = new MeasuredPoints(new DepthPointSource(this), Enumerable.Range(0, (int)Size.Area).Where(isInside));
        return points.Count > 0
            ? points
            : throw new UserErrorException($"No pixel inside {where} has a depth; choose a region with matches.");
    }
}
