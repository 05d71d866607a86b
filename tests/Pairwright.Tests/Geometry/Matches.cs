using Pairwright.Geometry;

namespace Pairwright.Tests.Geometry;

/// <summary>What a rig's two cameras see of points.</summary>
internal static class Matches
{
    public static IdealMatch Of(Rig rig, Vector3D point) =>
        new(rig.Left.ProjectIdeal(point), rig.Right.ProjectIdeal(rig.RightFromLeft.Transform(point)));

    public static RawMatch RawOf(Rig rig, Vector3D point) =>
        new(rig.Left.Project(point), rig.Right.Project(rig.RightFromLeft.Transform(point)));

    public static IdealMatch Noisy(this IdealMatch match, Random random, double sigmaPx) => new(
        new(match.Left.U + sigmaPx * RandomRigs.Gauss(random), match.Left.V + sigmaPx * RandomRigs.Gauss(random)),
        new(match.Right.U + sigmaPx * RandomRigs.Gauss(random), match.Right.V + sigmaPx * RandomRigs.Gauss(random)));

    public static RawMatch Noisy(this RawMatch match, Random random, double sigmaPx) => new(
        new(match.Left.U + sigmaPx * RandomRigs.Gauss(random), match.Left.V + sigmaPx * RandomRigs.Gauss(random)),
        new(match.Right.U + sigmaPx * RandomRigs.Gauss(random), match.Right.V + sigmaPx * RandomRigs.Gauss(random)));
}
