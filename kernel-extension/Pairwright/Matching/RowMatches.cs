using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What the optimisation found in one row: what checks look at, and where they set labels.</summary>
/// <remarks>One object serves row after row: keep nothing of it. All spans hold one entry per column.</remarks>
public sealed class RowMatches
{
    /// <summary>Stands in <see cref="Winner"/> and <see cref="RightWinner"/> where nothing could be compared.</summary>
    public const int None = int.MinValue;

    private readonly int[] winner;
    private readonly int[] rightWinner;
    private readonly float[] lowest;
    private readonly float[] before;
    private readonly float[] after;
    private readonly float[] second;
    private readonly float[] disparity;
    private readonly DisparityLabel[] labels;

    internal RowMatches(RectifiedPair pair, DisparityRange range)
    {
        var width = pair.Size.Width;
        (Pair, Range) = (pair, range);
        (winner, rightWinner, labels) = (new int[width], new int[width], new DisparityLabel[width]);
        (lowest, before, after, second, disparity) = (new float[width], new float[width], new float[width], new float[width], new float[width]);
    }

    /// <summary>The pair that is matched.</summary>
    public RectifiedPair Pair { get; }

    /// <summary>The disparities that were searched.</summary>
    public DisparityRange Range { get; }

    /// <summary>The row.</summary>
    public int V { get; internal set; }

    /// <summary>The whole disparity of the lowest total, the smallest of equal ones.</summary>
    public Span<int> Winner => winner;

    /// <summary>For each column of the right picture, the whole disparity of the lowest total among all left pixels that it could match.</summary>
    public Span<int> RightWinner => rightWinner;

    /// <summary>The lowest total.</summary>
    public Span<float> Lowest => lowest;

    /// <summary>The total at one disparity below the winner; NaN where that could not be compared.</summary>
    public Span<float> Before => before;

    /// <summary>The total at one disparity above the winner; NaN where that could not be compared.</summary>
    public Span<float> After => after;

    /// <summary>The lowest total farther than one disparity from the winner; infinite where there is none.</summary>
    public Span<float> SecondLowest => second;

    /// <summary>The disparity with its sub-pixel part; meaningful where the label is <see cref="DisparityLabel.Measured"/>.</summary>
    public Span<float> Disparity => disparity;

    /// <summary>The labels.</summary>
    public Span<DisparityLabel> Labels => labels;
}
