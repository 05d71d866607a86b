using Pairwright.Geometry;

namespace Pairwright.Matching;

/// <summary>One label per pixel of a match.</summary>
/// <remarks>Immutable by convention: the maker hands its array over and keeps no other reference to it.</remarks>
public sealed class LabelMap
{
    private readonly DisparityLabel[] labels;

    /// <summary>Makes a map.</summary>
    /// <param name="size">The size.</param>
    /// <param name="labels">Row after row, one per pixel, handed over.</param>
    /// <exception cref="ArgumentException">The number of labels is not the size's area.</exception>
    public LabelMap(PictureSize size, DisparityLabel[] labels)
    {
        ArgumentNullException.ThrowIfNull(labels);
        if (labels.LongLength != size.Area)
        {
            throw new ArgumentException($"A map of {size} pixels takes {size.Area} labels, not {labels.LongLength}.", nameof(labels));
        }

        (Size, this.labels) = (size, labels);
    }

    /// <summary>The size.</summary>
    public PictureSize Size { get; }

    /// <summary>The labels, row after row.</summary>
    public ReadOnlySpan<DisparityLabel> Labels => labels;

    /// <summary>The label at column <paramref name="u"/> of row <paramref name="v"/>.</summary>
    public DisparityLabel this[int u, int v] => labels[(long)v * Size.Width + u];

    /// <summary>The share of all pixels that carry a label, 0 to 1.</summary>
    public double Share(DisparityLabel label) => labels.Length == 0 ? 0 : labels.Count(each => each == label) / (double)labels.Length;
}
