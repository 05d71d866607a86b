using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>Things under lights, for captures whose truth is known exactly.</summary>
/// <remarks>Immutable. The scene's frame is the left camera's: X right, Y down, Z forward, in millimetres.</remarks>
public sealed class Scene
{
    // A shadow or a sight line begins this far off the surface, so that it does not meet the point that it starts from.
    private const double OffSurfaceMm = 1e-5;

    private readonly Placed[] placed;
    private readonly (Vector3D Towards, double Strength)[] lights;

    /// <summary>Makes a scene.</summary>
    /// <param name="objects">What is in it.</param>
    /// <param name="lights">The lights; one from over the cameras when left out.</param>
    /// <param name="ambient">What the surroundings add to the radiance of a white surface.</param>
    /// <param name="background">The radiance where a ray meets nothing.</param>
    /// <param name="castsShadows">Whether things keep light from each other.</param>
    public Scene(
        IEnumerable<SceneObject> objects, IEnumerable<Light>? lights = null, double ambient = 0.3, double background = 0.02, bool castsShadows = false)
    {
        ArgumentNullException.ThrowIfNull(objects);
        Objects = [.. objects];
        Lights = [.. lights ?? [new(new(0.2, -0.35, -1), 0.7)]];
        (Ambient, Background, CastsShadows) = (ambient, background, castsShadows);
        placed = [.. Objects.Select(item => new Placed(item))];
        this.lights = [.. Lights.Select(light => (light.Towards.Normalized, light.Strength))];
    }

    /// <summary>What is in it.</summary>
    public ImmutableArray<SceneObject> Objects { get; }

    /// <summary>The lights.</summary>
    public ImmutableArray<Light> Lights { get; }

    /// <summary>What the surroundings add to the radiance of a white surface.</summary>
    public double Ambient { get; }

    /// <summary>The radiance where a ray meets nothing.</summary>
    public double Background { get; }

    /// <summary>Whether things keep light from each other.</summary>
    public bool CastsShadows { get; }

    /// <summary>A large flat surface that meets the left camera's axis at a distance, turned about the vertical and the horizontal.</summary>
    /// <param name="distanceMm">Where the left camera's axis meets it, in millimetres.</param>
    /// <param name="yawDegrees">Turn about the camera's Y axis: a positive one puts its right side farther away.</param>
    /// <param name="pitchDegrees">Turn about the camera's X axis: a positive one puts its upper side farther away.</param>
    /// <param name="texture">What it looks like; speckle of 1/200 of the distance when left out.</param>
    public static Scene SlantedPlane(double distanceMm, double yawDegrees = 0, double pitchDegrees = 0, Texture? texture = null) =>
        new([Backdrop(distanceMm, yawDegrees, pitchDegrees, texture)]);

    /// <summary>Steps side by side along the left camera's X axis in front of a flat ground, all facing the left camera.</summary>
    /// <param name="groundMm">The distance of the ground along the left camera's axis, in millimetres.</param>
    /// <param name="heightsMm">The heights of the steps over the ground, left to right, above zero; named "step 1", "step 2" and so on.</param>
    /// <param name="stepWidthMm">The width of each step along X.</param>
    /// <param name="stepLengthMm">The length of all along Y.</param>
    /// <param name="texture">What ground and steps look like; speckle of 1/200 of the distance when left out.</param>
    public static Scene StepBlock(
        double groundMm, IReadOnlyList<double> heightsMm, double stepWidthMm = 80, double stepLengthMm = 160, Texture? texture = null)
    {
        ArgumentNullException.ThrowIfNull(heightsMm);
        var look = texture ?? Texture.Speckle(groundMm / 200);
        return new(
        [
            Backdrop(groundMm, 0, 0, look),
            .. heightsMm.Select((height, i) => new SceneObject(
                $"step {i + 1}",
                new Box(stepWidthMm, stepLengthMm, height),
                look,
                new(Matrix3x3.Identity, new((i - (heightsMm.Count - 1) / 2.0) * stepWidthMm, 0, groundMm - height / 2)))),
        ]);
    }

    /// <summary>A box and a ball that float in front of a slanted ground, with edges, hidden parts and curvature.</summary>
    /// <param name="groundMm">Where the left camera's axis meets the ground, in millimetres; all else is in proportion to it.</param>
    /// <param name="seed">Another seed gives other textures.</param>
    public static Scene BoxAndBall(double groundMm, int seed = 1)
    {
        var unit = groundMm / 1000;
        return new(
        [
            Backdrop(groundMm, 12, -8, Texture.Speckle(5 * unit, seed)),
            new(
                "box",
                new Box(170 * unit, 130 * unit, 60 * unit),
                Texture.Speckle(4 * unit, seed + 1),
                Pose.FromVectors(new(0.25, -0.3, 0.2), new(-110 * unit, 40 * unit, 760 * unit))),
            new("ball", new Sphere(80 * unit), Texture.Speckle(4 * unit, seed + 2), new(Matrix3x3.Identity, new(120 * unit, -50 * unit, 800 * unit))),
        ]);
    }

    /// <summary>The nearest surface that a ray meets; nothing where it meets none.</summary>
    /// <param name="origin">Where the ray begins, in the scene's frame, in millimetres.</param>
    /// <param name="direction">Its direction, of any length above zero.</param>
    public SurfaceHit? Cast(Vector3D origin, Vector3D direction)
    {
        if (!TryCast(origin, direction, 0, double.PositiveInfinity, out var index, out var distance))
        {
            return null;
        }

        var target = placed[index];
        var onObject = target.Local(origin) + distance * target.LocalDirection(direction);
        var normal = target.Item.SceneFromObject.Rotation * target.Item.Shape.Normal(onObject);
        return new(
            target.Item, index, distance, origin + distance * direction, onObject, normal.Dot(direction) > 0 ? -normal : normal);
    }

    /// <summary>Whether something stands between a surface point and another place, the surface's own far side included.</summary>
    /// <param name="hit">The surface point.</param>
    /// <param name="place">The other place, in the scene's frame, in millimetres.</param>
    public bool IsHiddenFrom(SurfaceHit hit, Vector3D place)
    {
        var towards = place - hit.Point;
        return hit.Normal.Dot(towards) <= 0 || TryCast(hit.Point + OffSurfaceMm * hit.Normal, towards, 0, 1, out _, out _);
    }

    /// <summary>The light that a surface point gives back to every side: Lambert (1760).</summary>
    public double Radiance(SurfaceHit hit)
    {
        var irradiance = Ambient;
        foreach (var (towards, strength) in lights)
        {
            var cosine = hit.Normal.Dot(towards);
            if (cosine > 0 && !(CastsShadows && TryCast(hit.Point + OffSurfaceMm * hit.Normal, towards, 0, double.PositiveInfinity, out _, out _)))
            {
                irradiance += strength * cosine;
            }
        }

        return irradiance * hit.Albedo;
    }

    /// <summary>Takes a capture.</summary>
    /// <param name="rig">The rig; the scene's frame is its left camera's.</param>
    /// <param name="seed">The seed of the noise.</param>
    /// <param name="conditions">Blur, exposure and noise; the usual ones when left out.</param>
    /// <param name="cancellation">Gives up.</param>
    /// <exception cref="UserErrorException">The conditions are out of range.</exception>
    public SimulatedCapture Shoot(Rig rig, int seed = 1, ShootingConditions? conditions = null, CancellationToken cancellation = default) =>
        ShootRepeats(rig, [seed], conditions, cancellation)[0];

    /// <summary>Takes several captures that differ only in their noise; the light is worked out once.</summary>
    /// <param name="rig">The rig; the scene's frame is its left camera's.</param>
    /// <param name="seeds">The seeds of the noise, one a capture.</param>
    /// <param name="conditions">Blur, exposure and noise; the usual ones when left out.</param>
    /// <param name="cancellation">Gives up.</param>
    /// <exception cref="UserErrorException">The conditions are out of range.</exception>
    public IReadOnlyList<SimulatedCapture> ShootRepeats(
        Rig rig, IReadOnlyList<int> seeds, ShootingConditions? conditions = null, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(rig);
        ArgumentNullException.ThrowIfNull(seeds);
        var how = conditions ?? new();
        how.Check();
        var left = RadianceImage.Render(this, rig.Left, Pose.Identity, how, cancellation);
        var right = RadianceImage.Render(this, rig.Right, rig.RightFromLeft, how, cancellation);
        return [.. seeds.Select(seed => new SimulatedCapture(this, rig, new(left.Expose(View.Left, how, seed), right.Expose(View.Right, how, seed), rig)))];
    }

    /// <summary>What a rectified pair of this scene truly shows.</summary>
    /// <param name="rectification">How the pair is rectified; its rig is the one that looks at the scene.</param>
    /// <param name="threads">The most threads that work at once; all processors when left out.</param>
    /// <param name="cancellation">Gives up.</param>
    public SceneTruth Truth(Rectification rectification, int? threads = null, CancellationToken cancellation = default) =>
        new(this, rectification, threads, cancellation);

    internal bool TryCast(Vector3D origin, Vector3D direction, double beyond, double within, out int index, out double distance)
    {
        (index, distance) = (-1, within);
        var square = direction.Dot(direction);
        for (var i = 0; i < placed.Length; i++)
        {
            var target = placed[i];

            // Most rays pass most things by: the ball that holds the shape is tried first.
            var offset = target.Centre - origin;
            var along = offset.Dot(direction);
            if (offset.Dot(offset) * square - along * along > target.RadiusSquared * square)
            {
                continue;
            }

            var t = target.Item.Shape.Distance(target.Local(origin), target.LocalDirection(direction), beyond);
            if (t < distance)
            {
                (index, distance) = (i, t);
            }
        }

        return index >= 0;
    }

    private static SceneObject Backdrop(double distanceMm, double yawDegrees, double pitchDegrees, Texture? texture)
    {
        var turn = Rotation.FromVector(new(0, -yawDegrees * Math.PI / 180, 0)) * Rotation.FromVector(new(-pitchDegrees * Math.PI / 180, 0, 0));
        return new("ground", new Plate(20 * distanceMm, 20 * distanceMm), texture ?? Texture.Speckle(distanceMm / 200), new(turn, new(0, 0, distanceMm)));
    }

    private sealed class Placed
    {
        private readonly Matrix3x3 objectFromScene;
        private readonly Vector3D shift;

        public Placed(SceneObject item)
        {
            Item = item;
            var inverse = item.SceneFromObject.Inverse;
            (objectFromScene, shift) = (inverse.Rotation, inverse.Translation);
            Centre = item.SceneFromObject.Transform(item.Shape.BoundCentre);
            var radius = item.Shape.BoundRadiusMm * (1 + 1e-9);
            RadiusSquared = radius * radius;
        }

        public SceneObject Item { get; }

        public Vector3D Centre { get; }

        public double RadiusSquared { get; }

        public Vector3D Local(Vector3D point) => objectFromScene * point + shift;

        public Vector3D LocalDirection(Vector3D direction) => objectFromScene * direction;
    }
}
