using OpenCvSharp;
using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class RotationTests
{
    /// <summary>Reference: OpenCV's Rodrigues.</summary>
    [Fact]
    public void Rotation_vectors_become_the_matrices_that_OpenCV_makes_and_come_back()
    {
        var random = new Random(95);
        for (var i = 0; i < 2000; i++)
        {
            var length = i switch { < 500 => Math.Pow(10, -10 * random.NextDouble()), < 1000 => Math.PI * (1 - Math.Pow(10, -12 * random.NextDouble())), _ => Math.PI * random.NextDouble() };
            var vector = length * new Vector3D(RandomRigs.Gauss(random), RandomRigs.Gauss(random), RandomRigs.Gauss(random)).Normalized;
            var matrix = Rotation.FromVector(vector);
            Cv2.Rodrigues([vector.X, vector.Y, vector.Z], out var expected, out _);
            var ours = matrix.ToMatrix();
            for (var entry = 0; entry < 9; entry++)
            {
                Assert.InRange(Math.Abs(ours[entry / 3, entry % 3] - expected[entry / 3, entry % 3]), 0, 1e-12);
            }

            Assert.True(Rotation.IsRotation(matrix));
            var back = Rotation.ToVector(matrix);
            Assert.InRange(Math.Min((back - vector).Norm, (back + vector).Norm), 0, 1e-9);
            if (length < Math.PI - 1e-6)
            {
                Assert.InRange((back - vector).Norm, 0, 1e-9);
            }
        }
    }

    [Fact]
    public void Half_turns_about_the_axes_come_back()
    {
        foreach (var axis in new Vector3D[] { new(1, 0, 0), new(0, 1, 0), new(0, 0, 1), new Vector3D(1, -1, 0).Normalized })
        {
            var back = Rotation.ToVector(Rotation.FromVector(Math.PI * axis));
            Assert.Equal(Math.PI, back.Norm, 9);
            Assert.Equal(1, Math.Abs(back.Normalized.Dot(axis)), 9);
        }
    }

    [Fact]
    public void What_is_no_rotation_has_no_vector()
    {
        Assert.Throws<ArgumentException>(() => Rotation.ToVector(new(2, 0, 0, 0, 1, 0, 0, 0, 1)));
        Assert.Throws<ArgumentException>(() => Rotation.ToVector(new(1, 0, 0, 0, 1, 0, 0, 0, -1)));
        Assert.Throws<ArgumentException>(() => Rotation.Nearest(new(2, 0, 0, 0, 1, 0, 0, 0, 1)));
    }

    [Fact]
    public void A_pose_and_its_inverse_undo_each_other()
    {
        var pose = Pose.FromVectors(new(0.3, -0.2, 0.9), new(5, -7, 20));
        var point = new Vector3D(3, 4, 500);
        Assert.InRange((pose.Inverse.Transform(pose.Transform(point)) - point).Norm, 0, 1e-12);
        Assert.InRange((pose.Then(pose.Inverse).Transform(point) - point).Norm, 0, 1e-12);
    }
}
