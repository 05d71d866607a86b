using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>By how much matches of a rectified pair miss their common row, as a smooth field over the left picture: v_right − v_left, in pixels.</summary>
/// <remarks>
/// <para>
/// A calibration leaves some hundredths of a pixel between the rows. Where texture runs aslant, such as the grain of a plank along the belt, a window cannot
/// tell a step across the rows from one along them (the aperture problem), and the offset passes for disparity. The field is of second order, since that is
/// what small errors of a pose and of a lens leave.
/// </para>
/// <para>
/// Between the rows the truth is known to be zero, so that the scatter of single windows about the field also tests what is said of their uncertainty.
/// </para>
/// </remarks>
public sealed class RowOffset
{
    private readonly PictureSize size;
    private readonly double[] coefficients;
    private readonly double least;
    private readonly double most;

    internal RowOffset(PictureSize size, double[] coefficients, double least, double most, double rmsPx, double sigmaPx, double scatterRatio, int windows)
    {
        (this.size, this.coefficients, this.least, this.most) = (size, coefficients, least, most);
        (RmsPx, SigmaPx, ScatterRatio, Windows) = (rmsPx, sigmaPx, scatterRatio, windows);
    }

    /// <summary>Root mean square of the field over the windows that it rests on, in pixels; zero where there were too few.</summary>
    public double RmsPx { get; }

    /// <summary>Root mean square standard uncertainty of the field over those windows, in pixels; NaN where there were too few.</summary>
    public double SigmaPx { get; }

    /// <summary>The scatter of single windows across the rows over what their stated uncertainty foretells, robustly (median absolute deviation); about 1 when it is honest, NaN where there were too few.</summary>
    public double ScatterRatio { get; }

    /// <summary>The number of windows that the field rests on.</summary>
    public int Windows { get; }

    /// <summary>The offset at a pixel of the left picture, never beyond the values at the windows.</summary>
    /// <param name="u">The column.</param>
    /// <param name="v">The row.</param>
    public double At(double u, double v)
    {
        Span<double> terms = stackalloc double[Terms];
        Fill(terms, size, u, v);
        var sum = 0.0;
        for (var i = 0; i < coefficients.Length; i++)
        {
            sum += coefficients[i] * terms[i];
        }

        return Math.Clamp(sum, least, most);
    }

    /// <summary>No offset, resting on nothing.</summary>
    internal static RowOffset None(PictureSize size) => new(size, [0], 0, 0, 0, double.NaN, double.NaN, 0);

    /// <summary>The number of terms of the whole field.</summary>
    internal const int Terms = 6;

    /// <summary>The terms 1, x, y, x², xy, y² over a picture stretched to −1 … 1.</summary>
    internal static void Fill(Span<double> terms, PictureSize size, double u, double v)
    {
        var (x, y) = (2 * u / (size.Width - 1) - 1, 2 * v / (size.Height - 1) - 1);
        (terms[0], terms[1], terms[2], terms[3], terms[4], terms[5]) = (1, x, y, x * x, x * y, y * y);
    }

    /// <summary>The offset in words.</summary>
    public override string ToString() => Windows == 0
        ? "row offset not known"
        : FormattableString.Invariant($"row offset {RmsPx:0.000} px RMS, known to {SigmaPx:0.000} px, from {Windows} windows");
}
