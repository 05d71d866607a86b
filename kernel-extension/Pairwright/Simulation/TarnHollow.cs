using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>The invented site of the demo: the outfeed of a sawmill, where a rig 1.1 m over the belt measures cup and twist of planks.</summary>
/// <remarks>
/// The rig's two cameras are turned towards each other by 4° and differ a little, as real ones do. Things are placed on a site frame: origin
/// in the middle between the cameras, X along the belt's width, Y along its run, Z down towards the belt.
/// </remarks>
public static class TarnHollow
{
    /// <summary>How far the belt lies below the cameras, in millimetres.</summary>
    public const double BeltMm = 1100;

    /// <summary>The board's inner corners across.</summary>
    public const int BoardCornersAcross = 9;

    /// <summary>The board's inner corners down.</summary>
    public const int BoardCornersDown = 6;

    /// <summary>The side of the board's squares, in millimetres.</summary>
    public const double BoardSquareMm = 40;

    private const double Degree = Math.PI / 180;
    private const double BaselineMm = 220;

    // The plank frame stands on the belt with z up, which is towards the cameras.
    private static readonly Matrix3x3 Upright = new(1, 0, 0, 0, -1, 0, 0, 0, -1);

    private static readonly Pose LeftFromSite = FromSite(new(0.004, -2 * Degree, 0.003), new(-BaselineMm / 2, 0, 0));
    private static readonly Pose RightFromSite = FromSite(new(-0.003, 2 * Degree, -0.004), new(BaselineMm / 2, 1.2, -0.8));

    private static readonly ImmutableArray<Light> Lamps = [new(new(0.5, -0.4, -1), 0.42), new(new(-0.6, 0.3, -1), 0.28)];

    // Middle of the board on the site frame in millimetres, then turns about X, Y and Z in degrees. Every pose stands wholly over the belt, with all
    // corners in both pictures; together they tilt every way and reach as far into the pictures' corners as the shared view does.
    private static readonly ImmutableArray<(Vector3D Place, double X, double Y, double Z)> BoardPoses =
    [
        (new(0, 0, 1060), 3, -2, 1),
        (new(80, 30, 790), 31, 8, 90),
        (new(-20, -70, 780), 18, -19, 0),
        (new(-140, 130, 930), -12, 16, -6),
        (new(210, -60, 920), -31, -13, 86),
        (new(-140, -130, 960), 22, 13, 4),
        (new(-50, 80, 820), 17, -13, 178),
        (new(210, 90, 970), -28, 8, 86),
        (new(-30, 100, 800), -17, -24, 12),
        (new(30, -80, 780), 18, 31, 12),
        (new(-20, 10, 780), 10, -8, -38),
        (new(-10, -70, 780), -18, 10, 30),
        (new(-190, -90, 1000), -16, -11, 90),
        (new(50, -90, 860), 13, 9, 4),
    ];

    /// <summary>The true rig.</summary>
    public static Rig Rig { get; } = new(
        new Camera(new(1182.4, 1181.9, 484.7, 357.2), new(960, 720), new(-0.112, 0.094, 0.0004, -0.0006, -0.021)),
        new Camera(new(1176.8, 1177.5, 475.6, 362.9), new(960, 720), new(-0.108, 0.089, -0.0003, 0.0005, -0.018)),
        LeftFromSite.Inverse.Then(RightFromSite),
        provenance: Provenance.None.Then("simulate", "Tarn Hollow, the true rig"));

    /// <summary>The rig after a knock that pitched the right camera by 0.08° against the left one.</summary>
    public static Rig KnockedInPitch { get; } = Knocked(new(0.08 * Degree, 0, 0));

    /// <summary>The rig after a knock that yawed the right camera by 0.05° against the left one.</summary>
    public static Rig KnockedInYaw { get; } = Knocked(new(0, 0.05 * Degree, 0));

    /// <summary>The stated heights of the step block over the belt, in millimetres.</summary>
    public static ImmutableArray<double> StepHeightsMm { get; } = [10, 20, 40];

    /// <summary>The scenes of planks, by the names of their folders.</summary>
    public static ImmutableArray<(string Name, ImmutableArray<Plank> Planks)> PlankScenes { get; } =
    [
        ("planks-1", [Sawn(1, -0.6, -0.5), Sawn(2, 0.9, -0.8), Sawn(3, -0.3, 1.0)]),
        ("planks-2", [Sawn(4, -1.2, -0.4), Sawn(5, 0.0, 0.0), Sawn(6, 0.5, -1.1)]),
        ("planks-3", [Sawn(7, -2.6, -0.7), Sawn(8, -0.8, -3.4), Sawn(9, 0.4, 0.6)]),
    ];

    /// <summary>All captures of the demo, in the order in which they are written.</summary>
    public static IEnumerable<DemoCapture> Captures()
    {
        for (var i = 0; i < BoardPoses.Length; i++)
        {
            yield return Board("boards", $"{i + 1:00}", i, Rig);
        }

        var steps = StepBlock();
        yield return Shot("step-block", "1", steps, Rig, 201);
        foreach (var (name, planks) in PlankScenes)
        {
            yield return Shot(name, "1", Planks(planks), Rig, 300 + planks[0].Seed);
        }

        // The light of repeats is worked out once.
        int[] seeds = [401, 402, 403, 404, 405];
        var repeats = new Lazy<IReadOnlyList<SimulatedCapture>>(() => Planks(PlankScenes[0].Planks).ShootRepeats(Rig, seeds, Conditions));
        for (var i = 0; i < seeds.Length; i++)
        {
            var index = i;
            yield return new("repeats", $"{index + 1}", _ => repeats.Value[index].Pair);
        }

        foreach (var (folder, rig) in new[] { ("knock-pitch", KnockedInPitch), ("knock-yaw", KnockedInYaw) })
        {
            yield return Board(folder, "board", 0, rig);
            yield return Shot(folder, "planks", Planks(PlankScenes[1].Planks), rig, 500);
        }
    }

    /// <summary>The scene with the step block: a row of steps on the belt.</summary>
    public static Scene StepBlock() => new(
        [
            Belt(),
            .. StepHeightsMm.Select((height, i) => new SceneObject(
                StepName(i),
                new Box(StepWidthMm, StepLengthMm, height),
                Texture.Speckle(5, 20 + i, 0.15, 0.75),
                new Pose(Matrix3x3.Identity, StepPlace(i) + new Vector3D(0, 0, BeltMm - height / 2)).Then(LeftFromSite))),
        ],
        Lamps,
        castsShadows: true);

    /// <summary>A scene of planks side by side on the belt.</summary>
    public static Scene Planks(IReadOnlyList<Plank> planks)
    {
        ArgumentNullException.ThrowIfNull(planks);
        return new([Belt(), .. planks.Select((plank, i) => plank.At(PlaceOf(i, planks.Count)))], Lamps, castsShadows: true);
    }

    /// <summary>What is known of the step block: outlines and heights over the belt.</summary>
    public static SceneSheet StepSheet() => new(
    [
        .. StepHeightsMm.Select((height, i) => Region(
            StepName(i), Rectangle(StepPlace(i), StepWidthMm, StepLengthMm, BeltMm - height), LeftFromSite, ("height", height))),
        Region("belt before the steps", Rectangle(new(0, -255, 0), 620, 110, BeltMm), LeftFromSite),
        Region("belt behind the steps", Rectangle(new(0, 255, 0), 620, 110, BeltMm), LeftFromSite),
    ]);

    /// <summary>What is known of a scene of planks: outlines, sizes, cup and twist.</summary>
    public static SceneSheet PlankSheet(IReadOnlyList<Plank> planks)
    {
        ArgumentNullException.ThrowIfNull(planks);
        return new(
        [
            .. planks.Select((plank, i) => Region(
                plank.Name,
                plank.Outline(),
                PlaceOf(i, planks.Count),
                ("cup", plank.CupMm),
                ("twist", plank.TwistMm),
                ("length", plank.LengthMm),
                ("width", plank.WidthMm),
                ("thickness", plank.ThicknessMm))),
        ]);
    }

    private const double StepWidthMm = 150;
    private const double StepLengthMm = 300;

    private static string StepName(int i) => $"step {i + 1}";

    private static Vector3D StepPlace(int i) => new((i - 1) * 190, 0, 0);

    private static Plank Sawn(int number, double cupMm, double twistMm) => new($"plank {number}", 600, 150, 28, cupMm, twistMm, number);

    private static SceneObject Belt() => new(
        "belt", new Plate(3000, 3000), Texture.Rubber(7), new Pose(Matrix3x3.Identity, new(0, 0, BeltMm)).Then(LeftFromSite));

    // Planks lie along X, a little askew, as they come off the saw.
    private static Pose PlaceOf(int i, int count)
    {
        double[] askew = [1.5, -1, 2.2];
        var turn = Rotation.FromVector(new(0, 0, askew[i % askew.Length] * Degree));
        return new Pose(turn * Upright, new(6 * i - 6, (i - (count - 1) / 2.0) * 190, BeltMm)).Then(LeftFromSite);
    }

    private static DemoCapture Board(string folder, string name, int pose, Rig rig) => new(folder, name, stop =>
    {
        var (place, x, y, z) = BoardPoses[pose];
        var turn = Rotation.FromVector(new(0, 0, z * Degree)) * Rotation.FromVector(new(0, y * Degree, 0)) * Rotation.FromVector(new(x * Degree, 0, 0));
        var board = new SceneObject(
            "board",
            new Plate((BoardCornersAcross + 2.2) * BoardSquareMm, (BoardCornersDown + 2.2) * BoardSquareMm),
            Texture.Checker(BoardCornersAcross, BoardCornersDown, BoardSquareMm),
            new Pose(turn, place).Then(LeftFromSite));
        return new Scene([Belt(), board], Lamps).Shoot(rig, 100 + pose, Conditions, stop).Pair;
    });

    private static DemoCapture Shot(string folder, string name, Scene scene, Rig rig, int seed) =>
        new(folder, name, stop => scene.Shoot(rig, seed, Conditions, stop).Pair);

    // The right camera is a little darker, as two cameras of one type are.
    private static ShootingConditions Conditions { get; } = new()
    {
        RaysAcrossPixel = 2,
        BlurSigmaPx = 0.55,
        LeftExposure = 1.0,
        RightExposure = 0.93,
        Sensor = new(bits: 8, fullWellElectrons: 15_000, darkNoiseElectrons: 8),
    };

    private static Pose FromSite(Vector3D rotationVector, Vector3D place)
    {
        var rotation = Rotation.FromVector(rotationVector);
        return new(rotation, -(rotation * place));
    }

    private static Rig Knocked(Vector3D turn)
    {
        var knock = new Pose(Rotation.FromVector(turn), default);
        return new(Rig.Left, Rig.Right, Rig.RightFromLeft.Then(knock), provenance: Rig.Provenance.Then("knock", $"right camera turned by {turn} rad"));
    }

    private static ImmutableArray<Vector3D> Rectangle(Vector3D middle, double width, double length, double depth) =>
    [
        .. from corner in new[] { (-1, -1), (1, -1), (1, 1), (-1, 1) }
           select new Vector3D(middle.X + corner.Item1 * width / 2, middle.Y + corner.Item2 * length / 2, depth),
    ];

    private static SceneRegion Region(string name, ImmutableArray<Vector3D> outline, Pose leftFromOutline, params (string Name, double Mm)[] values) => new(
        name,
        [.. outline.Select(point => Rig.Left.Project(leftFromOutline.Transform(point)))],
        values.ToImmutableSortedDictionary(value => value.Name, value => value.Mm));
}
