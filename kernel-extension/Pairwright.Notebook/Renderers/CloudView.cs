using Pairwright.Geometry;
using Pairwright.Measurement;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>A cloud seen along one direction without perspective: nearest points in front, lit from the upper left.</summary>
internal sealed record CloudView(string Heading, string RightAxis, string UprightAxis, Vector3D Right, Vector3D Upright)
{
    /// <summary>Whether the upright axis grows downwards, as picture rows do.</summary>
    public bool GrowsDown { get; init; } = true;

    /// <summary>Whether the points keep the picture's colours, where they have any.</summary>
    public bool WithPictureColours { get; init; }

    private Vector3D Away => GrowsDown ? Right.Cross(Upright) : -Right.Cross(Upright);

    public Svg Draw(PointCloud cloud, double width = 420, double height = 300)
    {
        var across = cloud.Positions.Select(p => p.Dot(Right)).ToArray();
        var upright = cloud.Positions.Select(p => p.Dot(Upright)).ToArray();
        var away = cloud.Positions.Select(p => p.Dot(Away)).ToArray();
        var chart = Chart.Isometric(Heading, Around(RightAxis, across), Around(UprightAxis, upright), width, height, GrowsDown);
        var (w, h) = ((int)chart.Plot.Width, (int)chart.Plot.Height);
        var nearest = new int[w * h];
        Array.Fill(nearest, -1);
        var (x, y) = (chart.XAxis, chart.YAxis);
        for (var i = 0; i < across.Length; i++)
        {
            var share = y.Share(upright[i]);
            Splat(nearest, w, h, (int)(x.Share(across[i]) * w), (int)((GrowsDown ? share : 1 - share) * h), i, away);
        }

        return chart.Image(Shaded(cloud, nearest, w, h, away, (x.Most - x.Least) / w)).ToSvg();
    }

    // All but the outermost half percent on either side: a few wild points must not shrink the rest to nothing.
    private static Axis Around(string title, double[] values)
    {
        var sorted = values.Order().ToArray();
        var (low, high) = (sorted[(int)(0.005 * (sorted.Length - 1))], sorted[(int)(0.995 * (sorted.Length - 1))]);
        var room = Math.Max(0.06 * (high - low), 0.5);
        return new(title, low - room, high + room);
    }

    // A point covers two by two pixels, so that a surface a little sparser than the raster has no holes.
    private static void Splat(int[] nearest, int w, int h, int u, int v, int point, double[] away)
    {
        for (var at = 0; at < 4; at++)
        {
            var (x, y) = (u + at % 2, v + at / 2);
            if (x >= 0 && y >= 0 && x < w && y < h && (nearest[y * w + x] < 0 || away[point] < away[nearest[y * w + x]]))
            {
                nearest[y * w + x] = point;
            }
        }
    }

    private Raster Shaded(PointCloud cloud, int[] nearest, int w, int h, double[] away, double unit)
    {
        var seen = nearest.Where(i => i >= 0).Select(i => away[i]).Order().ToArray();
        var (front, back) = seen.Length == 0 ? (0, 1) : (seen[(int)(0.01 * (seen.Length - 1))], seen[(int)(0.99 * (seen.Length - 1))]);
        return Raster.From(w, h, (u, v) =>
        {
            var point = nearest[v * w + u];
            if (point < 0)
            {
                return (255, 255, 255);
            }

            if (WithPictureColours && !cloud.Rgb.IsEmpty)
            {
                return (cloud.Rgb[3 * point], cloud.Rgb[3 * point + 1], cloud.Rgb[3 * point + 2]);
            }

            var colour = Ramp.Values.At(back > front ? 0.08 + 0.84 * (back - away[point]) / (back - front) : 0.5);
            var light = Light(u, v);
            return ((byte)(colour.Red * light), (byte)(colour.Green * light), (byte)(colour.Blue * light));
        });

        // Lambert's law for the slope over a few pixels, kept mild so that noise does not drown the shape.
        double Light(int u, int v)
        {
            const int reach = 2;
            double At(int x, int y) => x < 0 || y < 0 || x >= w || y >= h || nearest[y * w + x] < 0 ? double.NaN : away[nearest[y * w + x]];
            var slopeU = (At(u + reach, v) - At(u - reach, v)) / (2 * reach * unit);
            var slopeV = (At(u, v + reach) - At(u, v - reach)) / (2 * reach * unit);
            if (double.IsNaN(slopeU + slopeV))
            {
                return 0.85;
            }

            var normal = new Vector3D(slopeU, slopeV, -1).Normalized;
            return Math.Clamp(0.6 + 0.4 * normal.Dot(new Vector3D(-0.45, -0.55, -0.7).Normalized), 0.45, 1);
        }
    }
}
