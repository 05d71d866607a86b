namespace Pairwright.Notebook;

/// <summary>Drawings of plain numbers, for a notebook cell.</summary>
public static class NumberDrawings
{
    /// <summary>How the numbers are spread: a histogram with mean, root mean square and extremes.</summary>
    /// <param name="values">The numbers; those that are none are counted apart.</param>
    /// <param name="title">What they are.</param>
    /// <param name="unit">Their unit; empty for pure numbers.</param>
    public static NumberSpread Spread(this IEnumerable<double> values, string title, string unit)
    {
        ArgumentNullException.ThrowIfNull(values);
        return new(title, unit, [.. values]);
    }
}
