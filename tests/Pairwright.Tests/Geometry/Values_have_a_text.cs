using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public class Values_have_a_text
{
    // A record that holds a value of its own type would otherwise write itself without end and take the process with it.
    [Fact]
    public void Vectors_matrices_and_poses_write_themselves_in_a_line()
    {
        Assert.Equal("(1.5, -2, 1000.25)", new Vector3D(1.5, -2, 1000.25).ToString());
        Assert.Equal("[1, 0, 0; 0, 1, 0; 0, 0, 1]", Matrix3x3.Identity.ToString());
        Assert.Equal("R = [1, 0, 0; 0, 1, 0; 0, 0, 1], t = (-50, 0, 0) mm", new Pose(Matrix3x3.Identity, new(-50, 0, 0)).ToString());
        Assert.Contains("640 × 480", new Camera(new(500, 500, 320, 240), new(640, 480)).ToString());
    }
}
