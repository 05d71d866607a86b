using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>What of a rectified pair can be compared with what.</summary>
internal static class PairExtent
{
    /// <summary>Whether a left pixel and the right one at a disparity from it are on the pictures and usable.</summary>
    public static bool CanCompare(this RectifiedPair pair, int u, int v, int disparity)
    {
        var right = u - disparity;
        return right >= 0 && right < pair.Size.Width && pair.Left.Usable?[u, v] != false && pair.Right.Usable?[right, v] != false;
    }

    /// <summary>Refuses pictures that do not hold a window.</summary>
    public static void MustHold(this RectifiedPair pair, PictureSize window)
    {
        if (pair.Size.Width < window.Width || pair.Size.Height < window.Height)
        {
            throw new UserErrorException($"Pictures of {pair.Size} px are smaller than the cost's window of {window} px; give larger pictures or a smaller window.");
        }
    }
}
