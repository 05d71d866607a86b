using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

public class The_median_is_that_of_the_measured_neighbours
{
    /// <summary>
    /// A sorting network sorts everything when it sorts every order of zeros and ones (Knuth, The Art of Computer Programming 3, section 5.3.4): all
    /// of them, with every set of neighbours that are not measured, against a plain sort.
    /// </summary>
    [Fact]
    public void For_every_order_of_zeros_and_ones_and_every_set_of_gaps()
    {
        for (var gaps = 0; gaps < 512; gaps++)
        {
            // One neighbourhood of three columns for each order, side by side, with a column of gaps between.
            var pair = TestPairs.Pair(512 * 4, 3, (_, _) => 0, (_, _) => 0);
            var map = new WorkingMap(pair, new(0, 1), 2);
            Fill(map, (u, v) => u % 4 == 3 || (gaps >> (3 * v + u % 4) & 1) == 1 ? float.NaN : u / 4 >> (3 * v + u % 4) & 1);
            Filter.Median.Apply(map, default);
            for (var order = 0; order < 512; order++)
            {
                Assert.Equal(Expected(gaps, i => order >> i & 1), map.Disparity[512 * 4 + 4 * order + 1]);
            }
        }
    }

    [Fact]
    public void At_the_picture_s_edges_and_for_filled_values()
    {
        var random = new Random(2);
        var pair = TestPairs.Pair(21, 9, (_, _) => 0, (_, _) => 0);
        var (map, source) = (new WorkingMap(pair, new(0, 99), 1), new float[21 * 9]);
        Fill(map, (_, _) => random.Next(4) == 0 ? float.NaN : random.Next(99));
        for (var i = 0; i < source.Length; i++)
        {
            if (random.Next(6) == 0)
            {
                (map.Disparity[i], map.Labels[i]) = (50, DisparityLabel.Filled);
            }

            source[i] = map.Disparity[i];
        }

        Filter.Median.Apply(map, default);
        for (var v = 0; v < 9; v++)
        {
            for (var u = 0; u < 21; u++)
            {
                var around = (from row in Enumerable.Range(v - 1, 3)
                              from column in Enumerable.Range(u - 1, 3)
                              where row is >= 0 and < 9 && column is >= 0 and < 21 && map.Labels[row * 21 + column] == DisparityLabel.Measured
                              select source[row * 21 + column]).Order().ToArray();
                Assert.Equal(map.Labels[v * 21 + u] == DisparityLabel.Measured ? around[(around.Length - 1) / 2] : source[v * 21 + u], map.Disparity[v * 21 + u]);
            }
        }
    }

    private static float Expected(int gaps, Func<int, int> value)
    {
        var measured = Enumerable.Range(0, 9).Where(i => (gaps >> i & 1) == 0).Select(value).Order().ToArray();
        return (gaps >> 4 & 1) == 1 ? float.NaN : measured[(measured.Length - 1) / 2];
    }

    private static void Fill(WorkingMap map, Func<int, int, float> disparity)
    {
        for (var i = 0; i < map.Size.Area; i++)
        {
            map.Disparity[i] = disparity(i % map.Size.Width, i / map.Size.Width);
            map.Labels[i] = float.IsNaN(map.Disparity[i]) ? DisparityLabel.NoMatch : DisparityLabel.Measured;
        }
    }
}
