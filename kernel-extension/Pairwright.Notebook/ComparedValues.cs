using System.Collections.Immutable;
using Pairwright.Measurement;

namespace Pairwright.Notebook;

/// <summary>Measured values beside what is known of them: the truth of a simulated scene, a stated length, a reference instrument's reading.</summary>
public sealed class ComparedValues
{
    internal ComparedValues(string title, string knownName, ImmutableArray<(string Name, MeasuredValue Measured, double Known)> entries) =>
        (Title, KnownName, Entries) = (title, knownName, entries);

    /// <summary>What is compared.</summary>
    public string Title { get; }

    /// <summary>What the known values are, such as <c>true</c> or <c>stated</c>.</summary>
    public string KnownName { get; }

    /// <summary>The values: a name, what was measured, and what is known, in the measured value's unit.</summary>
    public ImmutableArray<(string Name, MeasuredValue Measured, double Known)> Entries { get; }

    /// <summary>How many known values lie within the expanded uncertainty (k = 2) of the measured one.</summary>
    public int Covered => Entries.Count(entry => Covers(entry.Measured, entry.Known));

    /// <summary>The root mean square of the differences, where all values have one unit; NaN otherwise or without values.</summary>
    public double RmsDifference => Entries.Select(entry => entry.Measured.Unit).Distinct().Count() == 1
        ? Math.Sqrt(Entries.Average(entry => Math.Pow(entry.Measured.Value - entry.Known, 2)))
        : double.NaN;

    internal static bool Covers(MeasuredValue measured, double known) => Math.Abs(measured.Value - known) <= measured.Expanded();
}
