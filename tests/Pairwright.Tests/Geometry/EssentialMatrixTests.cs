using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class EssentialMatrixTests
{
    [Fact]
    public void Its_singular_values_are_one_one_and_zero()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 51, count: 200, pointsPerRig: 1))
        {
            var values = rig.EssentialMatrix.Matrix.ToMatrix().Svd(computeVectors: false).S;
            Assert.Equal(1, values[0], 12);
            Assert.Equal(1, values[1], 12);
            Assert.Equal(0, values[2], 12);
        }
    }

    [Fact]
    public void The_essential_and_the_fundamental_matrix_of_a_rig_are_one_through_the_camera_matrices()
    {
        foreach (var (rig, _) in RandomRigs.WithPoints(seed: 52, count: 200, pointsPerRig: 1))
        {
            var fromF = rig.FundamentalMatrix.ToEssential(rig.Left.Matrix, rig.Right.Matrix);
            Assert.InRange(Apart(fromF.Matrix, rig.EssentialMatrix.Matrix), 0, 1e-9);
            Assert.InRange(Math.Abs(fromF.GivenSingularValues[0] - 1), 0, 1e-9);
        }
    }

    [Fact]
    public void Its_decomposition_finds_the_pose_of_the_rig_by_cheirality()
    {
        foreach (var (rig, points) in RandomRigs.WithPoints(seed: 53, count: 500))
        {
            IdealMatch[] matches = [.. points.Select(point => Matches.Of(rig, point))];
            var found = rig.EssentialMatrix.PoseInFrontOf(rig.Left.Matrix, rig.Right.Matrix, matches);
            Assert.Equal((matches.Length, matches.Length), (found.InFrontOfBoth, found.Matches));
            Assert.InRange((found.RightFromLeft.Translation - rig.RightFromLeft.Translation.Normalized).Norm, 0, 1e-9);
            Assert.InRange((found.RightFromLeft.Rotation.Row1 - rig.RightFromLeft.Rotation.Row1).Norm, 0, 1e-9);
            Assert.InRange((found.RightFromLeft.Rotation.Row2 - rig.RightFromLeft.Rotation.Row2).Norm, 0, 1e-9);
        }
    }

    [Fact]
    public void All_four_poses_share_the_matrix_up_to_sign()
    {
        var rig = RandomRigs.Any(new(54));
        foreach (var pose in rig.EssentialMatrix.Poses())
        {
            Assert.True(Rotation.IsRotation(pose.Rotation));
            Assert.Equal(1, pose.Translation.Norm, 12);
            Assert.InRange(Apart(Matrix3x3.Skew(pose.Translation) * pose.Rotation, rig.EssentialMatrix.Matrix), 0, 1e-12);
        }
    }

    [Fact]
    public void Matches_that_decide_nothing_are_refused()
    {
        var rig = RandomRigs.Any(new(55));
        Assert.Throws<UserErrorException>(() => rig.EssentialMatrix.PoseInFrontOf(rig.Left.Matrix, rig.Right.Matrix, []));
    }

    [Fact]
    public void A_matrix_of_rank_one_or_with_no_number_is_refused()
    {
        Assert.Throws<UserErrorException>(() => EssentialMatrix.From(new(1, 1, 1, 1, 1, 1, 1, 1, 1)));
        Assert.Throws<UserErrorException>(() => EssentialMatrix.From(new(1, 0, 0, 0, double.NaN, 0, 0, 0, 0)));
    }

    private static double Apart(Matrix3x3 a, Matrix3x3 b) =>
        Math.Min((a.ToMatrix() - b.ToMatrix()).FrobeniusNorm(), (a.ToMatrix() + b.ToMatrix()).FrobeniusNorm());
}
