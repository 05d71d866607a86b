using System.Collections.Immutable;

namespace Pairwright.Imaging;

/// <summary>The pairs in a folder, found by the files' names; nothing is decoded yet.</summary>
/// <remarks>
/// <para>
/// A file belongs to a view when its name holds the word <c>left</c> or <c>right</c> (in any case), at its beginning or end or set off by
/// a character that is no letter, or as a capitalised part: <c>left_03.png</c>/<c>right_03.png</c>, <c>03_left.tif</c>/<c>03_right.tif</c>,
/// <c>left01.jpg</c>/<c>right01.jpg</c>, <c>cameraLeft7.png</c>/<c>cameraRight7.png</c>. Two files are a pair when their names are equal but for that word. A folder with the subfolders
/// <c>left</c> and <c>right</c> pairs files of equal names, the ending and such a word aside.
/// </para>
/// <para>
/// Where the folder holds a <c>captures.csv</c> with the columns <c>left,right,left_time,right_time</c> (the times, in ISO 8601 with an
/// offset or Z, may be empty), the list alone says what belongs together.
/// </para>
/// </remarks>
public sealed class CaptureFolder
{
    private CaptureFolder(string path, ImmutableArray<Capture> captures, ImmutableArray<string> unmatched) =>
        (FolderPath, Captures, Unmatched) = (path, captures, unmatched);

    /// <summary>The name of the capture list that is looked for in a folder.</summary>
    public const string ListName = "captures.csv";

    /// <summary>The folder.</summary>
    public string FolderPath { get; }

    /// <summary>The pairs, in the natural order of their names (2 before 10), or in the order of the capture list.</summary>
    public ImmutableArray<Capture> Captures { get; }

    /// <summary>The picture files that belong to a view but to no pair, by their names in the folder.</summary>
    public ImmutableArray<string> Unmatched { get; }

    /// <summary>Looks through a folder.</summary>
    /// <param name="path">The folder.</param>
    /// <exception cref="UserErrorException">The folder is missing or holds no pair, or its capture list is not right.</exception>
    public static CaptureFolder Open(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        if (!Directory.Exists(path))
        {
            throw new UserErrorException($"The folder '{path}' does not exist; check the name ({Directory.GetCurrentDirectory()} is where it is looked for).");
        }

        var (captures, unmatched) = File.Exists(Path.Combine(path, ListName)) ? CaptureList.Read(path) : CaptureNames.Match(path);
        if (captures.Count == 0)
        {
            var hint = unmatched.Count == 0 ? "" : $" ({string.Join(", ", unmatched.Take(3))}{(unmatched.Count > 3 ? " …" : "")} stand alone)";
            throw new UserErrorException(
                $"The folder '{path}' holds no pair of pictures{hint}; name them left_01.png and right_01.png or the like, or put them into subfolders left and right.");
        }

        return new(path, [.. captures], [.. unmatched]);
    }

    /// <summary>What two files' names share once the words left and right are gone.</summary>
    internal static string SharedName(string leftPath, string rightPath)
    {
        var shared = CaptureNames.Parse(Path.GetFileNameWithoutExtension(leftPath))?.Shared ?? Path.GetFileNameWithoutExtension(leftPath);
        var right = CaptureNames.Parse(Path.GetFileNameWithoutExtension(rightPath))?.Shared ?? Path.GetFileNameWithoutExtension(rightPath);
        return string.Equals(shared, right, StringComparison.OrdinalIgnoreCase) && shared.Length > 0
            ? shared
            : $"{Path.GetFileNameWithoutExtension(leftPath)} and {Path.GetFileNameWithoutExtension(rightPath)}";
    }
}
