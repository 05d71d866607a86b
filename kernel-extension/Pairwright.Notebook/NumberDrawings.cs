using Pairwright.Measurement;

namespace Pairwright.Notebook;

/// <summary>Drawings of plain numbers and values, for a notebook cell.</summary>
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

    /// <summary>Measured values beside what is known of them: a table, and each difference against its expanded uncertainty.</summary>
    /// <param name="values">A name, what was measured, and what is known, in the measured value's unit.</param>
    /// <param name="title">What is compared.</param>
    /// <param name="knownName">What the known values are, such as <c>true</c> or <c>stated</c>.</param>
    public static ComparedValues BesideKnown(this IEnumerable<(string Name, MeasuredValue Measured, double Known)> values, string title, string knownName = "true")
    {
        ArgumentNullException.ThrowIfNull(values);
        return new(title, knownName, [.. values]);
    }
}
