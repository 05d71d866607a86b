using System.Globalization;
using Pairwright.Imaging;
using Pairwright.Matching;

namespace Pairwright.Trials;

/// <summary>What is left between the left picture and the right one brought over by the disparities: a figure that needs no truth.</summary>
/// <remarks>
/// <para>
/// One gain and offset for the whole picture are taken out. A right match leaves what noise, interpolation, gloss and the two cameras' own
/// responses leave; a wrong one leaves more, but only where there is texture: on a plain surface every disparity fits.
/// </para>
/// <para>Levels between pixels are looked up by cubic convolution. Immutable.</para>
/// </remarks>
public sealed class PhotometricResidual
{
    private PhotometricResidual(double gain, double offset, int compared, double rms, double median, ScalarMap residual) =>
        (Gain, Offset, Compared, RmsLevels, MedianLevels, Levels) = (gain, offset, compared, rms, median, residual);

    /// <summary>The gain that takes right levels to left ones.</summary>
    public double Gain { get; }

    /// <summary>The offset that takes right levels to left ones, in grey levels.</summary>
    public double Offset { get; }

    /// <summary>How many measured pixels were compared.</summary>
    public int Compared { get; }

    /// <summary>The root mean square of the residuals, in grey levels; NaN where nothing was compared.</summary>
    public double RmsLevels { get; }

    /// <summary>The magnitude, in grey levels, that half of the residuals do not exceed; NaN where nothing was compared.</summary>
    public double MedianLevels { get; }

    /// <summary>Left level less the right one brought over, in grey levels; NaN where nothing was measured.</summary>
    public ScalarMap Levels { get; }

    /// <summary>Brings the right picture over.</summary>
    /// <param name="map">The map; only what it measured is compared.</param>
    public static PhotometricResidual Of(DisparityMap map)
    {
        ArgumentNullException.ThrowIfNull(map);
        var pair = map.Pair;
        var right = new CubicLevels(pair.Right);
        var brought = ScalarMap.From(map.Size, (u, v) =>
            map.Labels[u, v] == DisparityLabel.Measured && right.Holds(u - map.Disparity[u, v], v) ? right.At(u - map.Disparity[u, v], v) : float.NaN);
        var (compared, sumL, sumR, sumRR, sumLR) = (0, 0.0, 0.0, 0.0, 0.0);
        for (var i = 0; i < brought.Values.Length; i++)
        {
            var (l, r) = (pair.Left.Grey[i], (double)brought.Values[i]);
            if (!double.IsNaN(r))
            {
                (compared, sumL, sumR, sumRR, sumLR) = (compared + 1, sumL + l, sumR + r, sumRR + r * r, sumLR + l * r);
            }
        }

        var spread = compared * sumRR - sumR * sumR;
        var gain = spread > 0 ? (compared * sumLR - sumL * sumR) / spread : 1;
        var offset = (sumL - gain * sumR) / compared;
        var residual = ScalarMap.From(map.Size, (u, v) => (float)(pair.Left[u, v] - gain * brought[u, v] - offset));
        var sorted = residual.Values.ToArray().Where(value => !float.IsNaN(value)).Select(Math.Abs).Order().ToArray();
        return new(
            gain,
            offset,
            compared,
            Math.Sqrt(sorted.Sum(value => (double)value * value) / compared),
            compared == 0 ? double.NaN : sorted[(compared - 1) / 2],
            residual);
    }

    /// <summary>The main figures in a line.</summary>
    public override string ToString() => string.Create(
        CultureInfo.InvariantCulture, $"Photometric residual: RMS {RmsLevels:0.00} grey levels, median {MedianLevels:0.00} over {Compared} px (gain {Gain:0.000}, offset {Offset:0.0})");
}
