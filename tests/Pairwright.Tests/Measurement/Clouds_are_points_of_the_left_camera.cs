using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Clouds_are_points_of_the_left_camera
{
    [Fact]
    public void A_cloud_holds_every_depth_in_the_left_cameras_own_frame()
    {
        var rectification = Rectification.Of(TestRig.Of());
        var geometry = rectification.Geometry;
        var map = new DepthMap(
            ScalarMap.From(geometry.Size, (u, v) => u is >= 100 and < 110 && v is 50 or 51 ? (float)geometry.Disparity(900) : float.NaN),
            geometry,
            rectification,
            ScalarMap.From(geometry.Size, (_, _) => 0.1f),
            picture: new Picture(geometry.Size, new ushort[geometry.Size.Area].Select((_, i) => (ushort)(i % 1024)).ToArray(), significantBits: 10));
        var cloud = map.ToCloud();
        Assert.Equal(map.Within(new PixelRegion(100, 50, 10, 2)).Positions.ToArray(), cloud.Positions.ToArray());
        Assert.Equal((byte)(((50 * geometry.Size.Width) + 100) % 1024 >> 2), cloud.Rgb[0]);
        Assert.Equal(map.PointAt(100, 50).Along(cloud.Positions[0]).RandomSigma, cloud.SigmaMm[0], 4);
        Assert.Contains("left camera's frame", cloud.ToString());
    }

    [Fact]
    public void A_cloud_survives_its_file()
    {
        var folder = Directory.CreateTempSubdirectory("cloud");
        try
        {
            var path = Path.Combine(folder.FullName, "cloud.ply");
            var cloud = new PointCloud([new(1, 2, 3), new(-4, 5.5, 600)], [1, 2, 3, 4, 5, 6], [0.5f, 0.25f]);
            cloud.ToPly(path);
            var stored = PointFile.Read(path);
            Assert.Equal(cloud.Positions.ToArray(), stored.Positions.ToArray());
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }

    [Fact]
    public void Thinning_keeps_one_measured_point_in_each_cube()
    {
        var random = new Random(2);
        var cloud = new PointCloud([.. Enumerable.Range(0, 5000).Select(_ => new Vector3D(10 * random.NextDouble(), 10 * random.NextDouble(), 100))]);
        var thin = cloud.Thinned(1);
        Assert.Equal(100, thin.Count);
        Assert.All(thin.Positions, point => Assert.Contains(point, cloud.Positions));
        Assert.Equal(100, thin.Positions.Select(p => (Math.Floor(p.X), Math.Floor(p.Y))).Distinct().Count());
        Assert.Equal(50, cloud.ThinnedTo(50).Count);
        Assert.Same(thin, thin.ThinnedTo(1000));
        Assert.Throws<UserErrorException>(() => cloud.Thinned(0));
    }

    [Fact]
    public void The_box_holds_all_points_and_touches_some()
    {
        var bounds = new PointCloud([new(1, -2, 3), new(-4, 5, 6)]).Bounds;
        Assert.Equal(new Vector3D(-4, -2, 3), bounds.Least);
        Assert.Equal(new Vector3D(5, 7, 3), bounds.Size);
    }

    [Fact]
    public void Regions_without_a_depth_are_refused_in_one_sentence()
    {
        var size = new PictureSize(40, 30);
        var map = new DepthMap(ScalarMap.From(size, (_, _) => float.NaN), new(600, 200, 0, 20, 15, size));
        Assert.Throws<UserErrorException>(() => map.Within(new PixelRegion(0, 0, 10, 10)));
        Assert.Throws<UserErrorException>(() => map.Within(new PixelRegion(35, 0, 10, 10)));
        Assert.Throws<UserErrorException>(() => map.Within(Mask.From(new(41, 30), (_, _) => true)));
        Assert.Throws<UserErrorException>(() => map.PointAt(3, 3));
        Assert.Throws<UserErrorException>(() => map.PointAt(40, 3));
    }
}
