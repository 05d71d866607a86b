using MathNet.Numerics.LinearAlgebra;
using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;
using Pairwright.Notebook.Renderers;

namespace Pairwright.Notebook.Tests.Renderers;

/// <summary>One small object of every kind that draws itself, made from a textured plane 1 m before an invented rig.</summary>
internal static class Samples
{
    public const string HostileName = "\"><script>alert('plank')</script>&.png";

    private static readonly Lazy<IReadOnlyList<Sample>> Made = new(() => [.. Make()]);

    public static IReadOnlyList<Sample> All => Made.Value;

    public static Rig Rig(bool withCovariance = true)
    {
        var camera = new Camera(new(160, 160, 79.5, 59.5), new(160, 120), new Distortion(k1: -0.1));
        var covariance = Matrix<double>.Build.DiagonalOfDiagonalArray([.. Enumerable.Repeat(new[] { 0.1, 0.1, 0.1, 0.1, 1e-6, 0, 0, 0, 0, 0, 0, 0 }, 2).SelectMany(c => c), 1e-9, 1e-9, 1e-9, 1e-3, 1e-3, 1e-3]);
        return new(camera, camera, Pose.FromVectors(new(0.002, -0.01, 0.001), new(-100, 0.3, 1)), withCovariance ? covariance : null, Provenance.None.Then("typed in a test", "σ < 1 & so on"));
    }

    public static StereoPair Pair(string name = HostileName)
    {
        var rig = Rig();
        return new(Look(rig, View.Left, name), Look(rig, View.Right, name), rig, name);
    }

    private static IEnumerable<Sample> Make()
    {
        var pair = Pair();
        var rig = pair.Rig!;
        yield return Sample.Of(new StereoPairRenderer(), pair, "px");
        yield return Sample.Of(new CameraRenderer(), rig.Left, "px");
        yield return Sample.Of(new RigRenderer(), rig, "mm");
        yield return Sample.Of(new FundamentalMatrixRenderer(), rig.FundamentalMatrix, "pixel");
        yield return Sample.Of(new EssentialMatrixRenderer(), rig.EssentialMatrix, "singular values");
        yield return Sample.Of(new EpipolarLineRenderer(), rig.FundamentalMatrix.LineInRight(new(70, 50)), "pixels");
        yield return Sample.Of(new EpipolarDrawingRenderer(), pair.WithEpipolarLines([new(50, 50)], [new(36, 50)]), "px");
        yield return Sample.Of(new CostCurveRenderer(), pair.Search(new(80, 60)), "mm");
        var rectified = pair.Rectify();
        yield return Sample.Of(new RectifiedPairRenderer(), rectified, "px");
        var map = rectified.Match(Recipe.For(rectified.Geometry!, 700, 1500));
        map = map.WithSigma(map.Disparity.Select(d => float.IsNaN(d) ? float.NaN : 0.1f));
        yield return Sample.Of(new DisparityMapRenderer(), map, "px");
        var depth = new DepthMap(map.Disparity, rectified.Geometry!, rectified.Rectification, map.Sigma, 18, rectified.Left, map.Provenance);
        yield return Sample.Of(new DepthMapRenderer(), depth, "mm");
        yield return Sample.Of(new PointCloudRenderer(), depth.ToCloud(), "mm");
        var points = depth.Within(new PixelRegion(30, 30, 60, 40));
        yield return Sample.Of(new MeasuredPointsRenderer(), points, "mm");
        yield return Sample.Of(new PlaneFitRenderer(), points.FitPlane(), "mm");
        yield return Sample.Of(new QuadraticFitRenderer(), points.FitQuadratic(new(1, 0, 0)), "mm");
        var value = new MeasuredValue(0.82, 0.05, 0.08, "mm");
        yield return Sample.Of(new MeasuredValueRenderer(), value, "mm");
        yield return Sample.Of<IEnumerable<MeasuredValue>>(new MeasuredValueListRenderer(), [value, -value], "mm");
        var verdicts = new[]
        {
            Requirement.AtMost($"cup of {HostileName}", 1.5.Millimetres()).Judge(value),
            Requirement.Equal("square side", 25.Millimetres(), 0.2.Millimetres()).Judge(new(25.6, 0.1, 0, "mm")),
            Requirement.Between("gap", 1.Millimetres(), 2.Millimetres()).Judge(new(1.95, 0.05, double.NaN, "mm")),
            Requirement.AtLeast("matched share", 80.Percent()).Judge(new(double.NaN, 1, 0, "%")),
        };
        yield return Sample.Of(new NumberSpreadRenderer(), new[] { 0.1, -0.2, double.NaN, 0.4 }.Spread("row error", "px"), "px");
        var board = Board.Checker(6, 5, 30);
        var views = BoardViews(rig, board);
        yield return Sample.Of(new RigCalibrationRenderer(), RigCalibration.FromCorners(views, board, rig.Left.Size, rig.Right.Size, CalibrationModel.TwoRadialTerms), "px");
        yield return Sample.Of(new RigCheckRenderer(), RigCheck.OfCorners(rig, views[0], board), "°");
        yield return Sample.Of(new ComparedValuesRenderer(), new[] { (HostileName, value, 0.9), ("twist", value, 3.0) }.BesideKnown("planks"), "mm");
        yield return Sample.Of(new VerdictRenderer(), verdicts[0], "mm");
        yield return Sample.Of<IEnumerable<Verdict>>(new VerdictListRenderer(), verdicts, "mm");
    }

    // A board in eight poses, each corner a little off.
    private static BoardCorners[] BoardViews(Rig rig, Board board)
    {
        var random = new Random(5);
        RawPixel[] Seen(Camera camera, Pose pose) =>
            [.. board.Corners.Select(corner => camera.Project(pose.Transform(corner))).Select(pixel => new RawPixel(pixel.U + 0.1 * random.NextDouble(), pixel.V + 0.1 * random.NextDouble()))];

        return
        [
            .. Enumerable.Range(0, 8).Select(i =>
            {
                var rotation = Rotation.FromVector(new(0.5 * Math.Sin(i), 0.5 * Math.Cos(2 * i), 0.2 * i));
                var centre = 0.5 * (board.Corners[0] + board.Corners[^1]);
                var pose = new Pose(rotation, new Vector3D(40 * Math.Cos(i), 25 * Math.Sin(3 * i), 480 + 30 * i) - rotation * centre);
                return new BoardCorners($"{HostileName} {i}", Seen(rig.Left, pose), Seen(rig.Right, pose.Then(rig.RightFromLeft)));
            }),
        ];
    }

    // A plane of soft blobs at Z = 1000 mm, looked up where each pixel's ray meets it.
    private static Picture Look(Rig rig, View view, string name)
    {
        var camera = rig[view];
        var grey = new ushort[camera.Size.Area];
        for (var i = 0; i < grey.Length; i++)
        {
            var ray = rig.Ray(view, new RawPixel(i % camera.Size.Width, i / camera.Size.Width));
            var at = ray.Origin + (1000 - ray.Origin.Z) / ray.Direction.Z * ray.Direction;
            grey[i] = (ushort)Math.Clamp(120 + 45 * Math.Sin(at.X / 9) * Math.Sin(at.Y / 11) + 40 * Math.Sin(at.X / 23 + at.Y / 17) + 30 * Math.Sin((at.X * at.Y) / 4000), 0, 255);
        }

        return new(camera.Size, grey, provenance: Provenance.None.Then("rendered in a test", name));
    }
}
