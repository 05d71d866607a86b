using System.IO.Compression;
using System.Xml.Linq;
using Xunit;

namespace Pairwright.Notebook.Tests.Loading;

/// <summary>The ways by which the library comes into a notebook of a host that knows nothing of it.</summary>
public sealed class LoadingTests : IDisposable
{
    private const string Rig =
        """
        var camera = new Camera(new CameraMatrix(800, 800, 319.5, 239.5), new PictureSize(640, 480));
        new Rig(camera, camera, new Pose(Matrix3x3.Identity, new Vector3D(-120, 0, 0)))
        """;

    // Reading a picture takes OpenCV's native library.
    private static readonly string Pixels =
        $"Picture.Read(\"{Path.Combine(OtherHost.Root, "data-demo", "boards", "left_01.png")}\").Size.ToString()";

    private readonly string _folder = Directory.CreateTempSubdirectory("pairwright test ").FullName;

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [Fact]
    public async Task By_its_path_a_cell_makes_a_rig_that_draws_itself_and_reads_pictures_without_a_using_line()
    {
        var assembly = Path.Combine(OtherHost.Root, "kernel-extension", "Pairwright.Notebook", "bin", OtherHost.Configuration, "net10.0", "Pairwright.Notebook.dll");

        var left = await OtherHost.RunAsync(_folder, $"#r \"{assembly}\"\nawait Pairwright.Notebook.Extension.Load();", Rig, Pixels);

        AssertDrawn(left);
    }

    [Fact]
    public async Task As_a_package_a_cell_makes_a_rig_that_draws_itself_and_reads_pictures_without_a_using_line()
    {
        // A version of its own: package caches never look again at one that they know.
        var version = $"0.0.{(long)(DateTime.UtcNow - new DateTime(2026, 1, 1)).TotalSeconds}";
        try
        {
            await Task.WhenAll(Pack("Pairwright"), Pack("Pairwright.Notebook"));
            AssertPackage(Path.Combine(_folder, $"Pairwright.Notebook.{version}.nupkg"));

            var left = await OtherHost.RunAsync(_folder, $"#i \"nuget:{_folder}\"\n#r \"nuget: Pairwright.Notebook, {version}\"", Rig, Pixels);

            AssertDrawn(left);
        }
        finally
        {
            foreach (var name in (string[])["pairwright", "pairwright.notebook"])
            {
                var cached = Path.Combine(PackageCache(), name, version);
                if (Directory.Exists(cached))
                {
                    Directory.Delete(cached, recursive: true);
                }
            }
        }

        Task Pack(string project) => OtherHost.Run(
            _folder, "pack", Path.Combine(OtherHost.Root, "kernel-extension", project), "-c", OtherHost.Configuration, "--no-build", "--nologo", "-o", _folder, $"-p:PackageVersion={version}");
    }

    private static void AssertDrawn(IReadOnlyList<Dictionary<string, string>> left)
    {
        Assert.All(left, outputs => Assert.Equal("", outputs.GetValueOrDefault("error", "")));
        Assert.StartsWith("Rig, baseline 120.000 mm", left[1]["text/plain"]);
        Assert.Contains("<svg", left[1]["text/html"]);
        Assert.Equal("960 × 720", left[2]["text/plain"]);
    }

    /// <summary>The package brings its start-up script and pinned dependencies, and leaves the host's own libraries to the host.</summary>
    private static void AssertPackage(string path)
    {
        using var package = ZipFile.OpenRead(path);
        Assert.NotNull(package.GetEntry("interactive-extensions/dotnet/extension.dib"));
        using var manifest = package.GetEntry("Pairwright.Notebook.nuspec")!.Open();
        var needed = XDocument.Load(manifest).Descendants().Where(element => element.Name.LocalName == "dependency")
            .ToDictionary(element => element.Attribute("id")!.Value, element => element.Attribute("version")!.Value);
        var pinned = XDocument.Load(Path.Combine(OtherHost.Root, "Directory.Packages.props")).Descendants("PackageVersion")
            .ToDictionary(element => element.Attribute("Include")!.Value, element => element.Attribute("Version")!.Value);
        Assert.Contains("OpenCvSharp4.official.runtime.linux-x64", needed.Keys);
        Assert.DoesNotContain(needed.Keys, name => name.StartsWith("Microsoft.DotNet.Interactive", StringComparison.Ordinal));
        Assert.All(needed.Where(pair => pair.Key != "Pairwright"), pair => Assert.Equal(pinned[pair.Key], pair.Value));
    }

    private static string PackageCache() =>
        Environment.GetEnvironmentVariable("NUGET_PACKAGES")
            ?? Path.Combine(Environment.GetFolderPath(Environment.SpecialFolder.UserProfile), ".nuget", "packages");
}
