namespace Pairwright.Matching;

/// <summary>How a fused match divides its rows so that it stays within its memory.</summary>
/// <param name="StripRows">How many rows' sums are held at once in each direction.</param>
/// <param name="Stores">Whether that is a whole half, so that nothing is made twice.</param>
/// <param name="SumBytes">The bytes of the sums of one direction.</param>
/// <param name="NeededBytes">The bytes of everything that the match works with, its result included.</param>
internal sealed record FusedPlan(int StripRows, bool Stores, long SumBytes, long NeededBytes)
{
    /// <summary>How often each row is swept: once forwards and once backwards, and once more where sums are made again.</summary>
    public int Sweeps => Stores ? 2 : 3;

    /// <summary>The plan with the fewest strips that a limit allows.</summary>
    /// <param name="layout">What takes how much.</param>
    /// <param name="settings">The limit, and the rows of a strip where a test sets them.</param>
    /// <param name="stateBytes">What a sweep carries from row to row.</param>
    /// <exception cref="UserErrorException">The limit is too small for any number of strips.</exception>
    public static FusedPlan For(FusedLayout layout, MatcherSettings settings, long stateBytes)
    {
        var half = (layout.Height + 1) / 2;
        if (settings.StripRows is { } rows)
        {
            return Of(layout, Math.Clamp(rows, 1, half), rows >= half, stateBytes);
        }

        var least = long.MaxValue;
        for (var strips = 1; strips <= half; strips++)
        {
            var plan = Of(layout, (half + strips - 1) / strips, strips == 1, stateBytes);
            least = Math.Min(least, plan.NeededBytes);
            if (settings.MemoryBytes is not { } limit || plan.NeededBytes <= limit)
            {
                return plan;
            }
        }

        throw new UserErrorException(
            $"A match of pictures of {layout.Width} × {layout.Height} px over {layout.Count} disparities needs at least {(least + 999_999) / 1_000_000} MB, but only {settings.MemoryBytes / 1_000_000} MB are allowed; allow more, or narrow the range.");
    }

    private static FusedPlan Of(FusedLayout layout, int rows, bool stores, long stateBytes)
    {
        var half = (layout.Height + 1) / 2;
        var sums = rows * layout.RowBytes;

        // Each direction: its sums, its state, and with strips a helper's state and one state for each strip.
        var states = stores ? stateBytes : stateBytes * (2 + (half + rows - 1) / rows);
        return new(rows, stores, sums, 2 * (sums + states) + layout.ResultBytes);
    }
}
