namespace Pairwright.Tests.Imaging;

/// <summary>A folder of its own for one test, gone afterwards.</summary>
internal sealed class TestFolder : IDisposable
{
    public TestFolder() => Root = Directory.CreateTempSubdirectory("pairwright-test-").FullName;

    public string Root { get; }

    public string Path(params string[] names) => System.IO.Path.Combine([Root, .. names]);

    /// <summary>Writes a file and returns its full name.</summary>
    public string Write(string name, byte[] content)
    {
        var path = Path(name);
        Directory.CreateDirectory(System.IO.Path.GetDirectoryName(path)!);
        File.WriteAllBytes(path, content);
        return path;
    }

    public string Write(string name, string content) => Write(name, System.Text.Encoding.UTF8.GetBytes(content));

    public void Dispose() => Directory.Delete(Root, recursive: true);
}
