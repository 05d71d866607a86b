namespace Pairwright.Imaging;

/// <content>Figures of the usable pixels' grey levels, taken when first asked for.</content>
public sealed partial class Picture
{
    private PictureStatistics? statistics;

    /// <summary>The mean grey level; NaN where no pixel is usable.</summary>
    public double MeanLevel => Statistics.Mean;

    /// <summary>The standard deviation of the grey levels, in levels; NaN where no pixel is usable.</summary>
    public double Contrast => Statistics.StandardDeviation;

    /// <summary>The share of pixels at or above <see cref="SaturationLevel"/>, 0 to 1; NaN where no pixel is usable.</summary>
    public double SaturatedShare => Statistics.SaturatedShare;

    /// <summary>
    /// The root mean square of the gradient over the standard deviation of the levels, per pixel: how steeply the contrast that is there
    /// changes. Equal for equal scenes whatever gain and offset; NaN where there is no contrast.
    /// </summary>
    /// <remarks>
    /// The gradient's energy is the focus measure of Tenenbaum (1970), here by central differences. Noise counts as detail, so compare
    /// pictures of like exposure.
    /// </remarks>
    public double Sharpness => Statistics.StandardDeviation > 0 ? Statistics.RmsGradient / Statistics.StandardDeviation : double.NaN;

    private PictureStatistics Statistics => statistics ??= PictureStatistics.Of(this);
}
