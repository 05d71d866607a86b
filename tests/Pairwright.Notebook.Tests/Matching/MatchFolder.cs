using System.Text.Json.Nodes;
using Pairwright.Geometry;
using Pairwright.Imaging;
using Pairwright.Notebook.Tests.Headless;

namespace Pairwright.Notebook.Tests.Matching;

/// <summary>A folder with small pairs of random dots, whose right picture is the left one moved by a known disparity.</summary>
internal sealed class MatchFolder : IDisposable
{
    public const int Disparity = 5;

    private static readonly PictureSize Size = new(96, 64);

    private readonly HeadlessRun _run = HeadlessRun.Empty();

    public string this[string name] => Path.Combine(_run.Folder, name);

    public int ExitCode => _run.ExitCode;

    public string Output => _run.Output;

    public string Errors => _run.Errors;

    public IEnumerable<string> Files =>
        Directory.EnumerateFiles(_run.Folder, "*", SearchOption.AllDirectories).Select(path => Path.GetRelativePath(_run.Folder, path)).Order(StringComparer.Ordinal);

    /// <summary>Writes a pair; the larger the slower to match.</summary>
    public void AddPair(string left, string right, int scale = 1)
    {
        var size = new PictureSize(Size.Width * scale, Size.Height * scale);
        var random = new Random(20080101);
        var dots = new byte[size.Height, size.Width + Disparity];
        for (var v = 0; v < size.Height; v++)
        {
            for (var u = 0; u < size.Width + Disparity; u++)
            {
                dots[v, u] = (byte)random.Next(256);
            }
        }

        Write(left, 0);
        Write(right, Disparity);

        void Write(string name, int shift)
        {
            Directory.CreateDirectory(Path.GetDirectoryName(this[name])!);
            var levels = new ushort[size.Area];
            for (var i = 0; i < levels.Length; i++)
            {
                levels[i] = dots[i / size.Width, i % size.Width + shift];
            }
            new Picture(size, levels).WritePng(this[name]);
        }
    }

    /// <summary>Two equal cameras side by side.</summary>
    public void AddRig(string name, double focalPx, double baselineMm)
    {
        var camera = new Camera(new CameraMatrix(focalPx, focalPx, (Size.Width - 1) / 2.0, (Size.Height - 1) / 2.0), Size);
        RigFile.Write(new Rig(camera, camera, new Pose(Matrix3x3.Identity, new Vector3D(-baselineMm, 0, 0))), this[name]);
    }

    public void AddTruth(string name, float disparity) => MapFile.Write(ScalarMap.From(Size, (_, _) => disparity), this[name]);

    public Task RunAsync(params string[] options) => _run.CommandAsync(["match", .. options]);

    public System.Diagnostics.Process Start(params string[] options) => _run.Start(["match", .. options]);

    public Task Finish(System.Diagnostics.Process process) => _run.Finish(process);

    public JsonNode Record(string name) => JsonNode.Parse(File.ReadAllText(this[name]))!;

    public void Dispose() => _run.Dispose();
}
