using System.Text.RegularExpressions;
using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Pairs files by their names.</summary>
internal static partial class CaptureNames
{
    private static readonly HashSet<string> Endings =
        new(StringComparer.OrdinalIgnoreCase) { ".png", ".tif", ".tiff", ".jpg", ".jpeg", ".bmp", ".pgm", ".ppm", ".pnm" };

    /// <summary>The pairs of a folder and the files left over.</summary>
    public static (IReadOnlyList<Capture> Captures, IReadOnlyList<string> Unmatched) Match(string folder)
    {
        var files = new List<(string Key, View View, string Path)>();
        foreach (var (name, view) in Subfolders(folder))
        {
            files.AddRange(Pictures(Path.Combine(folder, name)).Select(path => (KeyInSubfolder(path, view), view, path)));
        }

        foreach (var path in Pictures(folder))
        {
            if (Parse(Path.GetFileNameWithoutExtension(path)) is var (view, shared, key))
            {
                files.Add((key, view, path));
            }
        }

        var captures = new List<Capture>();
        var unmatched = new List<string>();
        foreach (var group in files.GroupBy(file => file.Key, StringComparer.OrdinalIgnoreCase))
        {
            var lefts = group.Where(file => file.View == View.Left).ToArray();
            var rights = group.Where(file => file.View == View.Right).ToArray();
            if (lefts.Length > 1 || rights.Length > 1)
            {
                var twice = (lefts.Length > 1 ? lefts : rights).Select(file => $"'{Path.GetRelativePath(folder, file.Path)}'");
                throw new UserErrorException($"In the folder '{folder}' the files {string.Join(" and ", twice)} claim one place in a pair; keep one of them.");
            }

            if (lefts.Length == 1 && rights.Length == 1)
            {
                captures.Add(new(NameOf(lefts[0].Path, rights[0].Path), lefts[0].Path, rights[0].Path));
            }
            else
            {
                unmatched.Add(Path.GetRelativePath(folder, lefts.Concat(rights).Single().Path));
            }
        }

        var natural = Comparer<string>.Create(CompareNaturally);
        return ([.. captures.OrderBy(capture => capture.Name, natural)], [.. unmatched.Order(natural)]);
    }

    /// <summary>
    /// The view that a name (without its ending) says, the name without that word, and the key that partners share; nothing where it says none.
    /// </summary>
    public static (View View, string Shared, string Key)? Parse(string stem)
    {
        // The last word decides, so that "left-shelf_right" is a right picture; partners differ in that word alone.
        if (ViewWord().Matches(stem).LastOrDefault() is not { } word)
        {
            return null;
        }

        var view = word.Value.Equals("left", StringComparison.OrdinalIgnoreCase) ? View.Left : View.Right;
        var (before, after) = (stem[..word.Index], stem[(word.Index + word.Length)..]);
        var shared = $"{before.TrimEnd(Separators)}{(before.Trim(Separators).Length > 0 && after.Trim(Separators).Length > 0 ? "_" : "")}{after.TrimStart(Separators)}";
        return (view, shared, $"{before}\0{after}");
    }

    /// <summary>Compares names so that runs of digits count as numbers: 2 before 10.</summary>
    public static int CompareNaturally(string? one, string? other)
    {
        var (a, b) = (Runs().Matches(one ?? ""), Runs().Matches(other ?? ""));
        for (var i = 0; i < Math.Min(a.Count, b.Count); i++)
        {
            var (x, y) = (a[i].Value, b[i].Value);
            var order = char.IsAsciiDigit(x[0]) && char.IsAsciiDigit(y[0])
                ? CompareNumbers(x.TrimStart('0'), y.TrimStart('0'))
                : string.Compare(x, y, StringComparison.OrdinalIgnoreCase);
            if (order != 0)
            {
                return order;
            }
        }

        return a.Count != b.Count ? a.Count - b.Count : string.CompareOrdinal(one, other);
    }

    private static readonly char[] Separators = ['_', '-', '.', ' '];

    private static int CompareNumbers(string x, string y) => x.Length != y.Length ? x.Length - y.Length : string.CompareOrdinal(x, y);

    // left/left01.png and right/right01.png say the view twice.
    private static string KeyInSubfolder(string path, View view)
    {
        var stem = Path.GetFileNameWithoutExtension(path);
        return Parse(stem) is var (said, _, key) && said == view ? key : stem;
    }

    private static string NameOf(string left, string right) => CaptureFolder.SharedName(left, right);

    private static IEnumerable<(string Name, View View)> Subfolders(string folder)
    {
        foreach (var path in Directory.EnumerateDirectories(folder).Order(StringComparer.Ordinal))
        {
            var name = Path.GetFileName(path);
            if (name.Equals("left", StringComparison.OrdinalIgnoreCase))
            {
                yield return (name, View.Left);
            }
            else if (name.Equals("right", StringComparison.OrdinalIgnoreCase))
            {
                yield return (name, View.Right);
            }
        }
    }

    private static IEnumerable<string> Pictures(string folder) =>
        Directory.EnumerateFiles(folder).Where(path => Endings.Contains(Path.GetExtension(path))).Order(StringComparer.Ordinal);

    // A word of its own in any case, or a capitalised part of a name such as cameraLeft.
    [GeneratedRegex("(?<![A-Za-z])(?i:left|right)(?![A-Za-z])|(?<=[a-z])(?:Left|Right)(?![a-z])", RegexOptions.CultureInvariant)]
    private static partial Regex ViewWord();

    [GeneratedRegex("[0-9]+|[^0-9]+", RegexOptions.CultureInvariant)]
    private static partial Regex Runs();
}
