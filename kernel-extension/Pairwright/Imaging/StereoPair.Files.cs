using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <content>Reading pairs from files.</content>
public sealed partial class StereoPair
{
    /// <summary>Reads a pair from two files.</summary>
    /// <param name="leftPath">The left picture's file.</param>
    /// <param name="rightPath">The right picture's file.</param>
    /// <param name="rig">The rig that took the pair, where it is known.</param>
    /// <param name="reading">What the left file does not say about itself, and the right one where <paramref name="rightReading"/> is left out.</param>
    /// <param name="rightReading">What the right file does not say about itself.</param>
    /// <exception cref="UserErrorException">A file cannot be read, or a picture's size is not that of its camera.</exception>
    public static StereoPair Read(string leftPath, string rightPath, Rig? rig = null, PictureReading? reading = null, PictureReading? rightReading = null) =>
        new(Picture.Read(leftPath, reading), Picture.Read(rightPath, rightReading ?? reading), rig, CaptureFolder.SharedName(leftPath, rightPath));

    /// <summary>Reads every pair of a folder, in the order of their names.</summary>
    /// <remarks>See <see cref="CaptureFolder"/> for the layouts.</remarks>
    /// <param name="folder">The folder.</param>
    /// <param name="rig">The rig that took the pairs, where it is known.</param>
    /// <param name="reading">What the left files do not say about themselves, and the right ones where <paramref name="rightReading"/> is left out.</param>
    /// <param name="rightReading">What the right files do not say about themselves.</param>
    /// <exception cref="UserErrorException">The folder is missing or holds no pair, or a file cannot be read.</exception>
    public static CaptureSeries ReadFolder(string folder, Rig? rig = null, PictureReading? reading = null, PictureReading? rightReading = null)
    {
        var found = CaptureFolder.Open(folder);
        return new(found, [.. found.Captures.Select(capture => capture.Read(rig, reading, rightReading))]);
    }

    /// <summary>Reads a pair from one picture that holds the left view in its left half and the right view in its right half.</summary>
    /// <param name="path">The file; its width is even.</param>
    /// <param name="rig">The rig that took the pair, where it is known.</param>
    /// <param name="reading">What the file does not say about itself; region and mask are those of each half.</param>
    /// <param name="rightReading">The right half's region, mask and time where they differ.</param>
    /// <exception cref="UserErrorException">The file cannot be read, its width is odd, or a half's size is not that of its camera.</exception>
    public static StereoPair ReadSideBySide(string path, Rig? rig = null, PictureReading? reading = null, PictureReading? rightReading = null)
    {
        reading ??= PictureReading.Default;
        var both = Picture.Read(path, reading with { Region = null, Mask = null });
        if (both.Size.Width % 2 != 0)
        {
            throw new UserErrorException($"'{path}' is {both.Size} px: an odd width has no two halves; give a side-by-side picture with two views of one width.");
        }

        var width = both.Size.Width / 2;
        Picture Half(int start, PictureReading half) =>
            PictureFile.Restricted(both.Cropped(new(start, 0, width, both.Size.Height)), half, path);
        return new(Half(0, reading), Half(width, rightReading ?? reading), rig, Path.GetFileNameWithoutExtension(path));
    }
}
