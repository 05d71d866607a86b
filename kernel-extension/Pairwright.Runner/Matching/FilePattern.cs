namespace Pairwright.Runner.Matching;

/// <summary>A file name, or a pattern in which one <c>*</c> stands for any run of characters within a folder's or file's name.</summary>
internal sealed class FilePattern
{
    private const char Star = '*';

    private FilePattern(string text) => Text = text;

    public string Text { get; }

    public bool HasStar => Text.Contains(Star);

    /// <exception cref="BadUsageException">It has more than one <c>*</c>.</exception>
    public static FilePattern Of(string option, string text) =>
        text.Count(letter => letter == Star) <= 1
            ? new FilePattern(text)
            : throw new BadUsageException($"{option} {text} has more than one *; use one, which stands for what differs from pair to pair.");

    /// <summary>The file's name where the star stands for <paramref name="part"/>.</summary>
    public string With(string part) => Text.Replace(Star.ToString(), part, StringComparison.Ordinal);

    /// <summary>What the star stands for in the files that are there, shorter ones first, so that 2 comes before 10.</summary>
    public IReadOnlyList<string> PartsOfFiles()
    {
        var at = Text.IndexOf(Star);
        var before = Text.LastIndexOf('/', at) + 1;
        var after = Text.IndexOf('/', at);
        var folder = before == 0 ? "." : Text[..before];
        var start = Text[before..at];
        var end = Text[(at + 1)..(after < 0 ? Text.Length : after)];
        if (!Directory.Exists(folder))
        {
            return [];
        }

        return
        [
            .. Directory.EnumerateFileSystemEntries(folder)
                .Select(path => Path.GetFileName(path)!)
                .Where(name => name.Length >= start.Length + end.Length && name.StartsWith(start, StringComparison.Ordinal) && name.EndsWith(end, StringComparison.Ordinal))
                .Select(name => name[start.Length..^end.Length])
                .Where(part => File.Exists(With(part)))
                .OrderBy(part => part.Length)
                .ThenBy(part => part, StringComparer.Ordinal),
        ];
    }
}
