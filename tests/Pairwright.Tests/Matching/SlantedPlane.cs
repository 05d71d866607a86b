using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Simulation;

namespace Pairwright.Tests.Matching;

/// <summary>Captures of one slanted plane and their errors against its truth, away from the borders.</summary>
internal sealed class SlantedPlane
{
    private const int Border = 20;

    private SlantedPlane(Texture texture, double yawDegrees, double pitchDegrees, ShootingConditions conditions, int captures)
    {
        var rig = SimulatedRig.SideBySide(new(280, 200), 520, 90, vergenceDegrees: 3, new(-0.1, 0.05, 0.0005, -0.0004));
        var scene = Scene.SlantedPlane(1000, yawDegrees, pitchDegrees, texture);
        var rectification = Rectification.Of(rig);
        Truth = scene.Truth(rectification);
        Pairs = [.. scene.ShootRepeats(rig, [.. Enumerable.Range(1, captures)], conditions).Select(capture => capture.Pair.Rectify(rectification))];
        Recipe = Recipe.For(rectification.Geometry, 800, 1400);
    }

    public static ShootingConditions Conditions { get; } = new()
    {
        LeftExposure = 0.6, RightExposure = 0.55, BlurSigmaPx = 0.7, RaysAcrossPixel = 3, Sensor = new(bits: 8, fullWellElectrons: 10_000, darkNoiseElectrons: 10),
    };

    public SceneTruth Truth { get; }

    public IReadOnlyList<RectifiedPair> Pairs { get; }

    public Recipe Recipe { get; }

    public static SlantedPlane Of(Texture texture, double yawDegrees = 20, double pitchDegrees = 10, ShootingConditions? conditions = null, int captures = 1) =>
        new(texture, yawDegrees, pitchDegrees, conditions ?? Conditions, captures);

    /// <summary>The true disparity pulled towards whole pixels by up to 0.15 px, much as a parabola through census costs leaves it; NaN where one camera does not see the plane.</summary>
    public float Pulled(int u, int v) =>
        Truth.VisibleInBoth[u, v] ? Truth.Disparity[u, v] - 0.15f * MathF.Sin(2 * MathF.PI * Truth.Disparity[u, v]) : float.NaN;

    /// <summary>The measured pixels: index, error in pixels, and σ, NaN where none is stated.</summary>
    public IEnumerable<(int Index, double Error, double Sigma)> Errors(DisparityMap map) =>
        from v in Enumerable.Range(Border, map.Size.Height - 2 * Border)
        from u in Enumerable.Range(Border, map.Size.Width - 2 * Border)
        where Truth.VisibleInBoth[u, v] && !float.IsNaN(map.Disparity[u, v])
        select (v * map.Size.Width + u, (double)map.Disparity[u, v] - Truth.Disparity[u, v], (double)(map.Sigma?[u, v] ?? float.NaN));

    /// <summary>The mean error at true disparities in each tenth between whole pixels.</summary>
    public IReadOnlyList<double> Pull(DisparityMap map) =>
    [
        .. Errors(map).GroupBy(pixel => (int)(10 * (Truth.Disparity.Values[pixel.Index] - Math.Floor(Truth.Disparity.Values[pixel.Index]))))
            .OrderBy(tenth => tenth.Key).Select(tenth => tenth.Average(pixel => pixel.Error)),
    ];
}
