using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>The penalties of paths in whole numbers, and grey levels to which the large one adapts.</summary>
internal sealed unsafe class FusedPenalties : IDisposable
{
    private readonly Picture picture;
    private readonly AlignedMemory? byDifference;

    /// <param name="penalties">The same penalties for the general path.</param>
    /// <param name="picture">The left picture.</param>
    /// <param name="isAdapted">Whether the large penalty depends on the picture.</param>
    public FusedPenalties(PathPenalties penalties, Picture picture, bool isAdapted)
    {
        (this.picture, Small, Large) = (picture, (byte)penalties.Small, (byte)penalties.LargeAt(0));
        if (!isAdapted)
        {
            return;
        }

        byDifference = new(1 << picture.SignificantBits);
        var scale = GreyLevels.ScaleOf(picture);
        for (var i = 0; i < byDifference.Bytes; i++)
        {
            byDifference.Start[i] = (byte)penalties.LargeAt(i * scale);
        }
    }

    /// <summary>What a change by one costs.</summary>
    public byte Small { get; }

    /// <summary>What a larger change costs at most.</summary>
    public byte Large { get; }

    /// <summary>What a larger change costs for each difference of two levels; nothing where it is the same everywhere.</summary>
    public byte* ByDifference => byDifference is null ? null : byDifference.Start;

    /// <summary>Copies a row's grey levels.</summary>
    public void CopyLevels(int v, ushort* to) => picture.Grey.Slice(v * picture.Size.Width, picture.Size.Width).CopyTo(new(to, picture.Size.Width));

    public void Dispose() => byDifference?.Dispose();
}
