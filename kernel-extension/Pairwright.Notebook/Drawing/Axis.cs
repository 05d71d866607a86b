namespace Pairwright.Notebook.Drawing;

/// <summary>One axis of a chart: its title with the unit, and the range it shows.</summary>
internal sealed record Axis(string Title, double Least, double Most)
{
    public bool IsHidden { get; init; }

    /// <summary>An axis over all finite values with a little room at both ends; from 0 to 1 when there are none.</summary>
    public static Axis Over(string title, IEnumerable<double> values, bool fromZero = false, double room = 0.05)
    {
        var finite = values.Where(double.IsFinite).ToArray();
        if (finite.Length == 0)
        {
            return new(title, 0, 1);
        }

        var (least, most) = (finite.Min(), finite.Max());
        if (fromZero)
        {
            (least, most) = (Math.Min(least, 0), Math.Max(most, 0));
        }

        if (!(most > least))
        {
            var around = Math.Max(Math.Abs(most) * 0.05, 1e-6);
            (least, most) = fromZero && most == 0 ? (0, 1) : (least - around, most + around);
        }

        var margin = room * (most - least);
        return new(title, fromZero && least == 0 ? 0 : least - margin, fromZero && most == 0 ? 0 : most + margin);
    }

    /// <summary>Where a value lies between the ends, 0 to 1.</summary>
    public double Share(double value) => (value - Least) / (Most - Least);
}
