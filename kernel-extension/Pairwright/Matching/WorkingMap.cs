using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>A disparity map while filters work on it.</summary>
/// <remarks>Row after row, one entry per pixel.</remarks>
public sealed class WorkingMap
{
    internal WorkingMap(RectifiedPair pair, DisparityRange range, int? threads = null, bool withEvidence = false)
    {
        (Pair, Range, Threads) = (pair, range, threads ?? Environment.ProcessorCount);
        DisparityArray = new float[pair.Size.Area];
        ConfidenceArray = new float[pair.Size.Area];
        LabelArray = new DisparityLabel[pair.Size.Area];
        Evidence = withEvidence ? new(pair.Size) : null;
    }

    /// <summary>The pair that is matched.</summary>
    public RectifiedPair Pair { get; }

    /// <summary>The disparities that were searched.</summary>
    public DisparityRange Range { get; }

    /// <summary>The size.</summary>
    public PictureSize Size => Pair.Size;

    /// <summary>Disparities in pixels; NaN where the label is neither <see cref="DisparityLabel.Measured"/> nor <see cref="DisparityLabel.Filled"/>.</summary>
    public Span<float> Disparity => DisparityArray;

    /// <summary>Confidences, 0 to 1; NaN where nothing could be compared.</summary>
    public Span<float> Confidence => ConfidenceArray;

    /// <summary>Labels.</summary>
    public Span<DisparityLabel> Labels => LabelArray;

    /// <summary>How many threads may work on it at once.</summary>
    internal int Threads { get; }

    internal float[] DisparityArray { get; }

    internal float[] ConfidenceArray { get; }

    internal MatchEvidence? Evidence { get; }

    internal float[]? SigmaArray { get; set; }

    internal RowOffset? RowOffset { get; set; }

    internal DisparityLabel[] LabelArray { get; }
}
