namespace Pairwright;

/// <summary>Writes files beside their destination and renames them, so that no reader ever meets half a file.</summary>
public static class AtomicFile
{
    /// <summary>Writes a file through a stream; the destination appears, or is replaced, only when <paramref name="write"/> has returned.</summary>
    /// <param name="path">The destination. Its folder is made when it is missing.</param>
    /// <param name="write">Writes the whole content.</param>
    /// <exception cref="UserErrorException">The folder or file cannot be written.</exception>
    public static void Write(string path, Action<Stream> write)
    {
        ArgumentNullException.ThrowIfNull(write);
        var full = Path.GetFullPath(path);
        var beside = $"{full}.{Guid.NewGuid():N}.part";
        try
        {
            Directory.CreateDirectory(Path.GetDirectoryName(full)!);
            using (var stream = new FileStream(beside, FileMode.CreateNew, FileAccess.Write))
            {
                write(stream);
            }

            File.Move(beside, full, overwrite: true);
        }
        catch (Exception fault) when (fault is UnauthorizedAccessException or IOException)
        {
            throw new UserErrorException($"'{path}' cannot be written ({fault.Message.TrimEnd('.')}); choose a folder that you may write to and that has room.", fault);
        }
        finally
        {
            if (File.Exists(beside))
            {
                File.Delete(beside);
            }
        }
    }

    /// <summary>Writes text as UTF-8 without a byte order mark.</summary>
    /// <param name="path">The destination.</param>
    /// <param name="text">The whole content.</param>
    /// <exception cref="UserErrorException">The folder or file cannot be written.</exception>
    public static void WriteText(string path, string text) =>
        Write(path, stream => stream.Write(System.Text.Encoding.UTF8.GetBytes(text)));
}
