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

        for (var lengths = WidestInLengths; ; lengths -= 0.5)
        {
            var side = lengths * correlationLength;
            var blocks = new Dictionary<(int, int), int>();
            var of = new int[places.Count];
            for (var i = 0; i < of.Length; i++)
            {
                var key = ((int)Math.Floor(places[i].U / side), (int)Math.Floor(places[i].V / side));
                if (!blocks.TryGetValue(key, out of[i]))
                {
                    blocks[key] = of[i] = blocks.Count;
                }
            }

            if (blocks.Count >= EnoughBlocks || lengths <= 1)
            {
                var kept = 1 - 1 / (3 * lengths);
                return new(of, blocks.Count, 1 / (kept * kept), $"the scatter of {blocks.Count} blocks of {side:0} × {side:0} px");
            }
        }
    }
}
