using System.Globalization;

namespace Pairwright.Imaging;

/// <summary>Reads a folder's capture list: which files belong together, and when each was taken.</summary>
internal static class CaptureList
{
    private static readonly string[] Columns = ["left", "right", "left_time", "right_time"];

    /// <summary>The pairs in the order of the list, and the files of a view that it does not name.</summary>
    /// <exception cref="UserErrorException">The list is not right; the sentence names its line.</exception>
    public static (IReadOnlyList<Capture> Captures, IReadOnlyList<string> Unmatched) Read(string folder)
    {
        var path = Path.Combine(folder, CaptureFolder.ListName);
        var lines = System.Text.Encoding.UTF8.GetString(PictureFile.ReadAll(path)).TrimStart('\uFEFF').Split('\n');
        var header = lines[0].Trim().Split(',').Select(name => name.Trim().ToLowerInvariant()).ToArray();
        if (!header.SequenceEqual(Columns) && !header.SequenceEqual(Columns.Take(2)))
        {
            throw new UserErrorException($"'{path}' must begin with the line {string.Join(",", Columns)}; correct its first line.");
        }

        var captures = new List<Capture>();
        var named = new HashSet<string>(StringComparer.Ordinal);
        for (var i = 1; i < lines.Length; i++)
        {
            if (lines[i].Trim().Length == 0)
            {
                continue;
            }

            var fields = lines[i].Split(',').Select(field => field.Trim().Trim('"')).ToArray();
            if (fields.Length != header.Length || fields[0].Length == 0 || fields[1].Length == 0)
            {
                throw new UserErrorException($"Line {i + 1} of '{path}' does not have the {header.Length} fields {string.Join(",", header)}; correct it.");
            }

            var (left, right) = (Path.Combine(folder, fields[0]), Path.Combine(folder, fields[1]));
            foreach (var file in new[] { left, right })
            {
                if (!File.Exists(file))
                {
                    throw new UserErrorException($"Line {i + 1} of '{path}' names '{Path.GetRelativePath(folder, file)}', which does not exist; correct the list or add the file.");
                }

                named.Add(Path.GetFullPath(file));
            }

            var timed = header.Length == Columns.Length;
            captures.Add(new(
                CaptureFolder.SharedName(left, right), left, right, timed ? Time(fields[2], i, path) : null, timed ? Time(fields[3], i, path) : null));
        }

        var unmatched = CaptureNames.Match(folder) is var (paired, alone)
            ? paired.SelectMany(capture => new[] { capture.LeftPath, capture.RightPath })
                .Where(file => !named.Contains(Path.GetFullPath(file)))
                .Select(file => Path.GetRelativePath(folder, file))
                .Concat(alone.Where(file => !named.Contains(Path.GetFullPath(Path.Combine(folder, file)))))
            : [];
        return (captures, [.. unmatched]);
    }

    private static DateTimeOffset? Time(string text, int line, string path)
    {
        if (text.Length == 0)
        {
            return null;
        }

        // Round-trip ISO 8601 only: a time without an offset would mean another moment on another machine.
        string[] forms = ["yyyy-MM-dd'T'HH:mm:ss.FFFFFFFzzz", "yyyy-MM-dd'T'HH:mm:ss.FFFFFFF'Z'"];
        return DateTimeOffset.TryParseExact(
            text, forms, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal, out var time)
            ? time
            : throw new UserErrorException(
                $"Line {line + 1} of '{path}' has the time '{text}', which is not ISO 8601 with an offset; write it like 2026-03-05T07:15:30.250Z.");
    }
}
