using Pairwright.Calibration;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Tests.Calibration;

/// <summary>Calibrations that several tests look at, each made once.</summary>
internal static class BoardData
{
    /// <summary>The board of the real captures.</summary>
    public static Board RealBoard { get; } = Board.Checker(innerCornersAcross: 9, innerCornersDown: 6, squareMm: 25);

    /// <summary>The board of the demo.</summary>
    public static Board DemoBoard { get; } = Board.Checker(innerCornersAcross: 9, innerCornersDown: 6, squareMm: 40);

    /// <summary>The committed demo captures.</summary>
    public static string DemoFolder { get; } = DemoPath();

    private static readonly Lazy<RigCalibration> real = new(() => RigCalibration.FromBoards(OpenData.Boards, RealBoard));
    private static readonly Lazy<RigCalibration> demo = new(() => RigCalibration.FromBoards(Path.Combine(DemoFolder, "boards"), DemoBoard));

    /// <summary>The thirteen real captures, five distortion terms a camera.</summary>
    public static RigCalibration Real
    {
        get
        {
            _ = OpenData.Boards;
            return real.Value;
        }
    }

    /// <summary>The demo's boards.</summary>
    public static RigCalibration Demo => demo.Value;

    /// <summary>Boards before a rig in the poses of a working calibration, and the exact pixels of their corners.</summary>
    public static BoardCorners[] Views(Rig rig, Board board, int count, int seed) => ViewsAndPoses(rig, board, count, seed).Views;

    /// <summary>The same with the boards' poses in the left camera's frame.</summary>
    public static (BoardCorners[] Views, Pose[] LeftFromBoard) ViewsAndPoses(Rig rig, Board board, int count, int seed)
    {
        var (views, poses) = (new List<BoardCorners>(), new List<Pose>());
        var random = new Random(seed);
        var centre = 0.5 * (board.Corners[0] + board.Corners[^1]);
        while (views.Count < count)
        {
            var turn = new Vector3D(0.9 * (random.NextDouble() - 0.5), 0.9 * (random.NextDouble() - 0.5), 0.6 * (random.NextDouble() - 0.5));
            var place = new Vector3D(500 * (random.NextDouble() - 0.5), 360 * (random.NextDouble() - 0.5), 800 + 500 * random.NextDouble());
            var rotation = Rotation.FromVector(turn);
            var pose = new Pose(rotation, place - rotation * centre);
            var left = board.Corners.Select(corner => rig.Left.Project(pose.Transform(corner))).ToArray();
            var right = board.Corners.Select(corner => rig.Right.Project(rig.RightFromLeft.Transform(pose.Transform(corner)))).ToArray();
            if (left.All(pixel => rig.Left.Size.Contains(pixel.U, pixel.V)) && right.All(pixel => rig.Right.Size.Contains(pixel.U, pixel.V)))
            {
                views.Add(new($"{views.Count + 1:00}", left, right));
                poses.Add(pose);
            }
        }

        return ([.. views], [.. poses]);
    }

    /// <summary>The same corners with Gaussian noise on every coordinate.</summary>
    public static BoardCorners[] Noisy(IEnumerable<BoardCorners> views, double sigmaPx, Random random)
    {
        double Noise() => sigmaPx * Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
        RawPixel[] Moved(IReadOnlyList<RawPixel> pixels) => [.. pixels.Select(pixel => new RawPixel(pixel.U + Noise(), pixel.V + Noise()))];
        return [.. views.Select(view => new BoardCorners(view.Name, Moved(view.Left), Moved(view.Right)))];
    }

    private static string DemoPath([System.Runtime.CompilerServices.CallerFilePath] string path = "") =>
        Path.GetFullPath(Path.Combine(Path.GetDirectoryName(path)!, "..", "..", "..", "data-demo"));
}
