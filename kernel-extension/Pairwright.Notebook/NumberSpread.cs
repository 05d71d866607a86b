using System.Collections.Immutable;

namespace Pairwright.Notebook;

/// <summary>Numbers of one kind, drawn as a histogram.</summary>
public sealed class NumberSpread
{
    private readonly ImmutableArray<double> finite;

    internal NumberSpread(string title, string unit, ImmutableArray<double> values)
    {
        (Title, Unit, Values) = (title, unit, values);
        finite = [.. values.Where(double.IsFinite)];
    }

    /// <summary>What the numbers are.</summary>
    public string Title { get; }

    /// <summary>Their unit; empty for pure numbers.</summary>
    public string Unit { get; }

    /// <summary>The numbers, those that are none included.</summary>
    public ImmutableArray<double> Values { get; }

    /// <summary>How many numbers are none.</summary>
    public int Missing => Values.Length - finite.Length;

    /// <summary>The mean; NaN without numbers.</summary>
    public double Mean => finite.IsEmpty ? double.NaN : finite.Average();

    /// <summary>The root mean square; NaN without numbers.</summary>
    public double Rms => finite.IsEmpty ? double.NaN : Math.Sqrt(finite.Average(value => value * value));

    /// <summary>The least number; NaN without numbers.</summary>
    public double Least => finite.IsEmpty ? double.NaN : finite.Min();

    /// <summary>The greatest number; NaN without numbers.</summary>
    public double Most => finite.IsEmpty ? double.NaN : finite.Max();
}
