using Pairwright.Geometry;
using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A cloud from the front, from above, from the side and at a slant.</summary>
internal sealed class PointCloudRenderer : Renderer<PointCloud>
{
    // Enough for every pixel of the drawings, few enough to draw at once.
    private const int MostDrawn = 400_000;

    public override string Plain(PointCloud cloud) => Lines(
        $"Point cloud of {cloud.Count} points in the left camera's own frame (X right, Y down, Z forward, mm)",
        cloud.Count == 0 ? null : Box(cloud),
        cloud.SigmaMm.IsEmpty ? "the uncertainty of its points is not known" : $"median σ along the ray, random part, {Numbers.Significant(MedianSigma(cloud), 2, "mm")}");

    public override Card Draw(PointCloud cloud)
    {
        var card = new Card("Point cloud", "Frame: the left camera's own, X to the right, Y down, Z forward, millimetres.");
        if (cloud.Count == 0)
        {
            return card.Warning("the cloud holds no points.");
        }

        var drawn = cloud.ThinnedTo(MostDrawn);
        card.Facts(
            ("points", drawn.Count < cloud.Count ? $"{cloud.Count} ({drawn.Count} drawn)" : $"{cloud.Count}"),
            ("box", Box(cloud)),
            ("median σ along the ray, random part", cloud.SigmaMm.IsEmpty ? "not known" : Numbers.Significant(MedianSigma(cloud), 2, "mm")));
        card.Row(Views().Select(view => view.Draw(drawn)));
        card.Caption("Parallel projections; equal scale on both axes; the outermost half percent of points on each side is cut off. Colours run with the distance from the viewer, light in front.");
        return card.From(cloud.Provenance);
    }

    private static IEnumerable<CloudView> Views()
    {
        Vector3D x = new(1, 0, 0), y = new(0, 1, 0), z = new(0, 0, 1);
        yield return new("From the front, as the camera sees it", "X, mm", "Y, mm", x, y) { WithPictureColours = true };
        yield return new("From above", "X, mm", "Z, mm", x, z) { GrowsDown = false };
        yield return new("From the right side", "Z, mm", "Y, mm", z, y);

        // Turned about the vertical, then tipped towards the viewer.
        var turn = Rotation.FromVector(new(0.6, 0, 0)) * Rotation.FromVector(new(0, 0, 0.5));
        yield return new("At a slant", "mm", "mm", turn.Row1, turn.Row2);
    }

    private static string Box(PointCloud cloud)
    {
        var (least, most) = (cloud.Bounds.Least, cloud.Bounds.Most);
        return $"X {Numbers.Text(least.X, 0)} to {Numbers.Text(most.X, 0)}, Y {Numbers.Text(least.Y, 0)} to {Numbers.Text(most.Y, 0)}, Z {Numbers.Text(least.Z, 0)} to {Numbers.Text(most.Z, 0, "mm")}";
    }

    private static double MedianSigma(PointCloud cloud)
    {
        var known = cloud.SigmaMm.Where(sigma => !float.IsNaN(sigma)).Order().ToArray();
        return known.Length == 0 ? double.NaN : known[known.Length / 2];
    }
}
