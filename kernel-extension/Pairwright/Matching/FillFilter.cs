using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Filling of gaps; see <see cref="Filter.Fill"/>.</summary>
/// <remarks>
/// <para>
/// From every gap pixel eight ways lead to the nearest measured pixels; each is as long as its steps and the differences of grey level that it
/// crosses, so that a way across an edge of the picture is far (geodesic distance; Criminisi, Sharp, Rother and Pérez 2010).
/// </para>
/// <para>
/// What the right camera does not see lies behind what hides it: a disparity is possible for an occluded pixel only where the pixel of the right
/// picture that it would match shows something nearer, or lies outside (Hirschmüller 2008, section 2.6, chooses the background for the same reason). The
/// nearest possible one wins, and a weighted median along the picture's edges settles the rest.
/// </para>
/// </remarks>
internal sealed class FillFilter : Filter
{
    private static readonly (int U, int V)[] Ways = [(1, 0), (-1, 0), (0, 1), (0, -1), (1, 1), (-1, -1), (-1, 1), (1, -1)];

    // A step of a pixel counts as much as this many grey levels crossed.
    private const float LevelsPerStep = 2;

    private const int MedianHalf = 4;
    private const double MedianLevels = 12;

    public override string Name => "fill";

    public override void Apply(WorkingMap map, CancellationToken stop)
    {
        var gaps = Enumerable.Range(0, map.LabelArray.Length)
            .Where(i => map.LabelArray[i] is not (DisparityLabel.Measured or DisparityLabel.Unusable or DisparityLabel.Filled))
            .ToArray();
        var (nearest, far) = Nearest(map, gaps, stop);
        var visible = new RightVisibility(map);
        var filled = map.DisparityArray.AsSpan().ToArray();
        var labels = map.LabelArray.AsSpan().ToArray();
        for (var k = 0; k < gaps.Length; k++)
        {
            var i = gaps[k];
            var chosen = Choose(map, visible, i, nearest.AsSpan(k * Ways.Length, Ways.Length), far.AsSpan(k * Ways.Length, Ways.Length));
            if (!float.IsNaN(chosen))
            {
                (filled[i], labels[i]) = (chosen, DisparityLabel.Filled);
            }
        }

        var median = new EdgeMedian(map.Pair.Left, MedianHalf, MedianLevels);
        var width = map.Size.Width;
        RowWork.ForEach(0, map.Size.Height, Environment.ProcessorCount, stop, median.Buffer, (v, buffer) =>
        {
            for (var i = v * width; i < (v + 1) * width; i++)
            {
                if (labels[i] == DisparityLabel.Filled && map.LabelArray[i] != DisparityLabel.Filled)
                {
                    (map.DisparityArray[i], map.LabelArray[i]) = (median.At(i % width, v, filled, labels, buffer), DisparityLabel.Filled);
                }
            }
        });
    }

    // The disparity at the end of each way of each gap pixel, and how far it is; NaN where a way ends at the border.
    private static (float[] Nearest, float[] Far) Nearest(WorkingMap map, int[] gaps, CancellationToken stop)
    {
        var (width, height) = (map.Size.Width, map.Size.Height);
        var index = new int[map.LabelArray.Length];
        index.AsSpan().Fill(-1);
        for (var k = 0; k < gaps.Length; k++)
        {
            index[gaps[k]] = k;
        }

        var levels = GreyLevels.Of(map.Pair.Left);
        var (nearest, far) = (new float[gaps.Length * Ways.Length], new float[gaps.Length * Ways.Length]);
        RowWork.ForEach(0, Ways.Length, Environment.ProcessorCount, stop, way =>
        {
            var (du, dv) = Ways[way];
            var length = LevelsPerStep * MathF.Sqrt(du * du + dv * dv);
            for (var j = 0; j < height; j++)
            {
                stop.ThrowIfCancellationRequested();
                var v = dv < 0 ? height - 1 - j : j;
                for (var n = 0; n < width; n++)
                {
                    var u = du < 0 ? width - 1 - n : n;
                    if (index[v * width + u] is not (>= 0 and var k))
                    {
                        continue;
                    }

                    var (x, y, here) = (u - du, v - dv, k * Ways.Length + way);
                    (nearest[here], far[here]) = (float.NaN, float.PositiveInfinity);
                    if (x < 0 || y < 0 || x >= width || y >= height)
                    {
                        continue;
                    }

                    var (before, step) = (y * width + x, length + Math.Abs(levels[v * width + u] - levels[y * width + x]));
                    (nearest[here], far[here]) = index[before] is >= 0 and var earlier
                        ? (nearest[earlier * Ways.Length + way], far[earlier * Ways.Length + way] + step)
                        : (map.DisparityArray[before], step);
                }
            }
        });
        return (nearest, far);
    }

    private static float Choose(WorkingMap map, RightVisibility visible, int i, ReadOnlySpan<float> nearest, ReadOnlySpan<float> far)
    {
        var occluded = map.LabelArray[i] == DisparityLabel.Occluded;
        var (best, distance) = (float.NaN, float.PositiveInfinity);
        for (var way = 0; way < nearest.Length; way++)
        {
            if (float.IsNaN(nearest[way]))
            {
                continue;
            }

            // What would be seen by the right camera and was not matched there is less likely than what is hidden.
            var cost = far[way] * (occluded && !visible.Hides(i, nearest[way]) ? 8 : 1);
            if (cost < distance)
            {
                (best, distance) = (nearest[way], cost);
            }
        }

        return best;
    }
}
