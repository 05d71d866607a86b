using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A sawn plank on a flat ground, cupped across its grain and twisted along it by exactly known amounts.</summary>
/// <remarks>
/// In the plank's own frame x runs along the grain, y across, z up from the ground: z(x, y) = lift + thickness + cup·(1 − (2y/width)²) +
/// twist·x·y/(length·width). Over the width the quadratic's sagitta is the cup; the corners stand at ±twist/4, so that the fourth one lies the twist
/// away from the plane of the other three (but for the plane's tilt, less than one part in a thousand).
/// </remarks>
/// <param name="Name">Its name in the scene sheet.</param>
/// <param name="LengthMm">Along the grain.</param>
/// <param name="WidthMm">Across the grain.</param>
/// <param name="ThicknessMm">At the long edges.</param>
/// <param name="CupMm">The sagitta across the grain; positive where the edges stand nearer to the cameras than the middle.</param>
/// <param name="TwistMm">The distance of the fourth corner from the plane of the other three; positive where, looking along the plank with the cameras above, the far corner at the right is raised.</param>
/// <param name="Seed">Another seed gives another piece of wood.</param>
public sealed record Plank(string Name, double LengthMm, double WidthMm, double ThicknessMm, double CupMm, double TwistMm, int Seed)
{
    // Keeps the underside of a twisted plank off the ground.
    private double LiftMm => Math.Abs(TwistMm) / 4;

    /// <summary>The height of the top over the ground.</summary>
    /// <param name="x">Along the grain from the middle, in millimetres.</param>
    /// <param name="y">Across the grain from the middle, in millimetres.</param>
    public double Height(double x, double y)
    {
        var across = 2 * y / WidthMm;
        return LiftMm + ThicknessMm - CupMm * (1 - across * across) - TwistMm * x * y / (LengthMm * WidthMm);
    }

    /// <summary>The plank as a thing in a scene.</summary>
    /// <param name="sceneFromPlank">Where it lies: its own frame stands on the ground with z up.</param>
    public SceneObject At(Pose sceneFromPlank)
    {
        var spread = Math.Abs(CupMm) + Math.Abs(TwistMm) / 4 + 0.01;
        var top = new HeightField(LengthMm, WidthMm, Height, LiftMm + ThicknessMm - spread, LiftMm + ThicknessMm + spread);
        return new(Name, top, Texture.Wood(Seed), sceneFromPlank);
    }

    /// <summary>Points around the edge of the top, in the plank's own frame: the outline that a camera sees from above.</summary>
    /// <param name="perSide">Points on each of the four sides.</param>
    public ImmutableArray<Vector3D> Outline(int perSide = 8)
    {
        var corners = new[] { (-1.0, -1.0), (1.0, -1.0), (1.0, 1.0), (-1.0, 1.0) };
        return
        [
            .. from side in Enumerable.Range(0, 4)
               from step in Enumerable.Range(0, perSide)
               let share = step / (double)perSide
               let x = LengthMm / 2 * (corners[side].Item1 + share * (corners[(side + 1) % 4].Item1 - corners[side].Item1))
               let y = WidthMm / 2 * (corners[side].Item2 + share * (corners[(side + 1) % 4].Item2 - corners[side].Item2))
               select new Vector3D(x, y, Height(x, y)),
        ];
    }
}
