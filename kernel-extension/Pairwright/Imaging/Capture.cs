using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>The two files of a pair in a folder.</summary>
/// <param name="Name">What the two names share, for example <c>03</c> for left_03.png and right_03.png.</param>
/// <param name="LeftPath">The left picture's file.</param>
/// <param name="RightPath">The right picture's file.</param>
/// <param name="LeftTime">When the left picture was taken, where the capture list says so.</param>
/// <param name="RightTime">When the right picture was taken, where the capture list says so.</param>
public sealed record Capture(string Name, string LeftPath, string RightPath, DateTimeOffset? LeftTime = null, DateTimeOffset? RightTime = null)
{
    /// <summary>Reads the two pictures.</summary>
    /// <param name="rig">The rig that took the pair, where it is known.</param>
    /// <param name="reading">What the left file does not say about itself, and the right one where <paramref name="rightReading"/> is left out.</param>
    /// <param name="rightReading">What the right file does not say about itself.</param>
    /// <exception cref="UserErrorException">A file cannot be read, or a picture's size is not that of its camera.</exception>
    public StereoPair Read(Rig? rig = null, PictureReading? reading = null, PictureReading? rightReading = null)
    {
        var left = reading ?? PictureReading.Default;
        var right = rightReading ?? left;
        return new(
            Picture.Read(LeftPath, left with { CapturedAt = LeftTime ?? left.CapturedAt }),
            Picture.Read(RightPath, right with { CapturedAt = RightTime ?? right.CapturedAt }),
            rig,
            Name);
    }
}
