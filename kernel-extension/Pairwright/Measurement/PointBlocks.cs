namespace Pairwright.Measurement;

/// <summary>Points grouped into square blocks of pixels, so that the errors of different blocks are nearly independent.</summary>
internal sealed class PointBlocks
{
    // Wider blocks lose less of the correlation at their borders; more blocks estimate the scatter better.
    private const double WidestInLengths = 4;
    private const int EnoughBlocks = 30;

    private PointBlocks(int[] of, int count, double borderFactor, string scatter) =>
        (Of, Count, BorderFactor, Scatter) = (of, count, borderFactor, scatter);

    /// <summary>The block of each point.</summary>
    public int[] Of { get; }

    /// <summary>How many blocks hold a point.</summary>
    public int Count { get; }

    /// <summary>By how much the variance over blocks falls short because neighbouring blocks share correlated errors; at least 1.</summary>
    /// <remarks>
    /// Windows that overlap correlate as a triangle that reaches zero at the length L; a block of side B then holds the share 1 − L/(3B) of
    /// the correlation along each axis.
    /// </remarks>
    public double BorderFactor { get; }

    /// <summary>What the scatter between blocks is taken from, as a phrase.</summary>
    public string Scatter { get; }

    /// <summary>Groups points.</summary>
    /// <param name="places">Where each point lies in the picture, in pixels.</param>
    /// <param name="correlationLength">How far errors of neighbouring pixels are correlated, in pixels; 0 makes every point its own block.</param>
    public static PointBlocks Group(IReadOnlyList<(double U, double V)> places, double correlationLength)
    {
        if (correlationLength <= 0)
        {
            return new([.. Enumerable.Range(0, places.Count)], places.Count, 1, $"the scatter of {places.Count} independent points");
        }

        var (leastU, leastV) = (places.Min(place => place.U), places.Min(place => place.V));
        var (width, height) = (places.Max(place => place.U) - leastU + 1, places.Max(place => place.V) - leastV + 1);
        for (var lengths = WidestInLengths; ; lengths -= 0.5)
        {
            // As many whole blocks as fit, widened to fill the region: slivers at its border would be blocks in name only.
            var (columns, rows) = (Fitting(width, lengths * correlationLength), Fitting(height, lengths * correlationLength));
            if (columns * rows >= EnoughBlocks || lengths <= 1)
            {
                var (of, count) = Number([.. places.Select(place => (int)((place.V - leastV) * rows / height) * columns + (int)((place.U - leastU) * columns / width))]);
                var (sideU, sideV) = (width / columns, height / rows);
                var kept = Kept(sideU / correlationLength) * Kept(sideV / correlationLength);
                return new(of, count, 1 / kept, $"the scatter of {count} blocks of {sideU:0} × {sideV:0} px");
            }
        }
    }

    private static int Fitting(double extent, double side) => Math.Max(1, (int)(extent / side));

    // A region narrower than the length is one block across it, which holds all there is.
    private static double Kept(double lengths) => lengths < 1 ? 1 : 1 - 1 / (3 * lengths);

    // Blocks that hold a point, numbered from 0.
    private static (int[] Of, int Count) Number(int[] keys)
    {
        var numbers = new Dictionary<int, int>();
        var of = Array.ConvertAll(keys, key =>
        {
            if (!numbers.TryGetValue(key, out var number))
            {
                numbers[key] = number = numbers.Count;
            }

            return number;
        });
        return (of, numbers.Count);
    }
}
