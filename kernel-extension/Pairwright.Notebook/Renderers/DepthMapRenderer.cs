using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Depth in colours, its uncertainty, a row's profile, and a few pixels with both parts of their uncertainty.</summary>
internal sealed class DepthMapRenderer : Renderer<DepthMap>
{
    public override bool HasPicture => true;

    public override string Plain(DepthMap map)
    {
        var (least, most) = map.Z.Quantiles();
        return Lines(
            $"Depth map, {map.Size} px, Z along the rectified left axis, {Numbers.Percent(map.Z.ValidShare)} of pixels with depth",
            $"98 % of the depths lie between {Numbers.Text(least, 1)} and {Numbers.Text(most, 1, "mm")}"
            + (map.Sigma is null ? "; the random part of their uncertainty is not known" : $"; median σ, random part, {Numbers.Significant(MapDrawings.Median(map.Sigma), 2, "mm")}"));
    }

    public override Raster Picture(DepthMap map)
    {
        var (least, most) = MapDrawings.Range(map.Z);
        return Pictures.Coloured(map.Z, Ramp.Values, most, least);
    }

    public override Card Draw(DepthMap map)
    {
        var range = MapDrawings.Range(map.Z);
        var row = MapDrawings.TellingRow(map.Z);
        var spots = Spots(map);
        var card = new Card("Depth map", "Frame: Z along the rectified left axis, millimetres, at each pixel of the rectified left picture. (A point cloud is in the left camera's own frame.)");
        if (map.Sigma is null)
        {
            card.Warning("the matching states no uncertainty, so the random part of the depths is not known; repeats of the scene would tell it.");
        }

        card.Facts(
            ("pixels with depth", Numbers.Percent(map.Z.ValidShare)),
            ("middle 98 % of depths", $"{Numbers.Text(range.Least, 1)} to {Numbers.Text(range.Most, 1, "mm")}"),
            ("median σ, random part", map.Sigma is null ? "not known" : Numbers.Significant(MapDrawings.Median(map.Sigma), 2, "mm")),
            ("one pixel of disparity at the median depth", Numbers.Significant(Math.Abs(map.Geometry.DepthPerDisparity(MapDrawings.Median(map.Z))), 3, "mm")));
        var depth = MapDrawings.Coloured("Depth Z", map.Z, Ramp.Values, range, "mm", canvas =>
        {
            canvas.Line(-0.5, row, map.Size.Width - 0.5, row, new("#ffffff", 1, "5 4"));
            foreach (var (i, (u, v)) in spots.Index())
            {
                canvas.Cross(u, v, "#ffffff", 6).Label(u, v, $"{i + 1}", dx: 6, dy: -4);
            }
        });
        card.Row(map.Sigma is null
            ? [depth]
            : [depth, MapDrawings.Coloured("Standard uncertainty of Z, random part", map.Sigma, Ramp.Spreads, (0, Math.Max(1e-3, map.Sigma.Quantiles().High)), "mm")]);
        card.Row(
            MapDrawings.Profile($"Depth along row {row} (dashed in the map)", map.Z, row, "Z, mm", range, map.Sigma),
            MapDrawings.Histogram("How often each depth occurs", map.Z, "Z, mm", range.Least, range.Most));
        card.Table(["spot", "column, row (px)", "depth Z ± standard uncertainty", "random", "common"], spots.Index().Select(entry => Row(map, entry.Index + 1, entry.Item)), 2);
        card.Caption("Random: picture noise and matching, independent from one scene to the next. Common: the rig's calibration, shared by every pixel.");
        return card.From(map.Provenance);
    }

    private static string[] Row(DepthMap map, int number, (int U, int V) spot)
    {
        var depth = map[spot.U, spot.V];
        return
        [
            $"{number}",
            $"{spot.U}, {spot.V}",
            Numbers.WithSigma(depth.Value, depth.StandardUncertainty, "mm"),
            Numbers.Significant(depth.RandomSigma, 2, "mm"),
            Numbers.Significant(depth.CommonSigma, 2, "mm"),
        ];
    }

    // Five spots over the map, each moved to the nearest pixel with a depth.
    private static IReadOnlyList<(int U, int V)> Spots(DepthMap map)
    {
        (double U, double V)[] wished = [(0.5, 0.5), (0.25, 0.3), (0.75, 0.3), (0.25, 0.7), (0.75, 0.7)];
        return [.. wished.Select(wish => Nearest(map, (int)(wish.U * map.Size.Width), (int)(wish.V * map.Size.Height))).OfType<(int, int)>().Distinct()];
    }

    private static (int U, int V)? Nearest(DepthMap map, int u, int v)
    {
        for (var reach = 0; reach <= map.Size.Width / 6; reach++)
        {
            for (var dv = -reach; dv <= reach; dv++)
            {
                var step = Math.Abs(dv) == reach ? 1 : Math.Max(1, 2 * reach);
                for (var du = -reach; du <= reach; du += step)
                {
                    var (x, y) = (u + du, v + dv);
                    if (x >= 0 && y >= 0 && x < map.Size.Width && y < map.Size.Height && float.IsFinite(map.Z[x, y]))
                    {
                        return (x, y);
                    }
                }
            }
        }

        return null;
    }
}
