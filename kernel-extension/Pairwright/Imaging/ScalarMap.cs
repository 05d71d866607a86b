using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>One number per pixel, such as a disparity, a depth or a standard uncertainty. No value is NaN.</summary>
/// <remarks>Immutable by convention: the maker hands its array over and keeps no other reference to it.</remarks>
public sealed class ScalarMap
{
    private readonly float[] values;

    /// <summary>Makes a map.</summary>
    /// <param name="size">The size.</param>
    /// <param name="values">Row after row, <c>Width · Height</c> numbers, handed over.</param>
    /// <exception cref="ArgumentException">The number of values is not the size's area.</exception>
    public ScalarMap(PictureSize size, float[] values)
    {
        ArgumentNullException.ThrowIfNull(values);
        if (values.LongLength != size.Area)
        {
            throw new ArgumentException($"A map of {size} pixels takes {size.Area} values, not {values.LongLength}.", nameof(values));
        }

        (Size, this.values) = (size, values);
    }

    /// <summary>The size.</summary>
    public PictureSize Size { get; }

    /// <summary>The values, row after row.</summary>
    public ReadOnlySpan<float> Values => values;

    /// <summary>The value at column <paramref name="u"/> of row <paramref name="v"/>.</summary>
    public float this[int u, int v] => values[(long)v * Size.Width + u];

    /// <summary>One row.</summary>
    public ReadOnlySpan<float> Row(int v) => values.AsSpan(v * Size.Width, Size.Width);

    /// <summary>A map made pixel by pixel.</summary>
    /// <param name="size">The size.</param>
    /// <param name="value">Column and row to value.</param>
    public static ScalarMap From(PictureSize size, Func<int, int, float> value)
    {
        ArgumentNullException.ThrowIfNull(value);
        var values = new float[size.Area];
        for (var v = 0; v < size.Height; v++)
        {
            for (var u = 0; u < size.Width; u++)
            {
                values[v * size.Width + u] = value(u, v);
            }
        }

        return new(size, values);
    }

    /// <summary>The same map with every value replaced.</summary>
    public ScalarMap Select(Func<float, float> value) => new(Size, Array.ConvertAll(values, v => value(v)));

    /// <summary>The share of pixels that have a value, 0 to 1.</summary>
    public double ValidShare => values.Length == 0 ? 0 : values.Count(value => !float.IsNaN(value)) / (double)values.Length;

    /// <summary>The values between which the middle of the map lies: two quantiles of the values that there are, for a colour scale that outliers do not spoil.</summary>
    /// <param name="lowShare">The share of values below the first, 0 to 1.</param>
    /// <param name="highShare">The share of values below the second, 0 to 1.</param>
    /// <returns>Both NaN where the map holds no value.</returns>
    public (double Low, double High) Quantiles(double lowShare = 0.01, double highShare = 0.99)
    {
        var sorted = Array.FindAll(values, value => !float.IsNaN(value));
        Array.Sort(sorted);
        double At(double share) => sorted.Length == 0 ? double.NaN : sorted[(int)Math.Round(Math.Clamp(share, 0, 1) * (sorted.Length - 1))];
        return (At(lowShare), At(highShare));
    }

    /// <summary>The size and the share of pixels with a value in a line.</summary>
    public override string ToString() => string.Create(System.Globalization.CultureInfo.InvariantCulture, $"Map of {Size} px, {ValidShare:0.0%} with a value");
}
