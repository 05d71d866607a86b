using System.Diagnostics;
using System.Runtime.Versioning;
using Pairwright.Notebook.Tests.Loading;

namespace Pairwright.Notebook.Tests.Launching;

/// <summary>
/// The real launcher in a folder of its own whose name has a blank, on a machine that is played by small scripts: what is
/// installed there, what may be installed, and whether a build succeeds is set by the test.
/// </summary>
[SupportedOSPlatform("linux")]
internal sealed class Launch : IDisposable
{
    private readonly string _machine;
    private readonly string _folder = Directory.CreateTempSubdirectory("pairwright test ").FullName;

    public Launch()
    {
        _machine = Directory.CreateDirectory(Path.Combine(_folder, "machine")).FullName;
        Project = Path.Combine(_folder, "the project");
        Caller = Directory.CreateDirectory(Path.Combine(_folder, "the caller")).FullName;
        Source = Path.Combine(Project, "kernel-extension", "Pairwright", "Camera.cs");
        Directory.CreateDirectory(Path.GetDirectoryName(Source)!);
        File.WriteAllText(Source, "");
        File.WriteAllText(Path.Combine(Project, "Directory.Build.props"), "");
        File.Copy(Path.Combine(OtherHost.Root, "kernel-extension", "pairwright"), Launcher);

        Plays("dotnet", $"""
            case "$1" in
                --list-sdks) cat "{_machine}/sdks" ;;
                build)
                    echo built >>"{_machine}/said"
                    if [ -e "{_machine}/build-fails" ]; then echo "$PWD/kernel-extension/Pairwright/Camera.cs(3,7): error CS1002: ; expected [Pairwright.csproj]"; exit 1; fi
                    mkdir -p kernel-extension/Pairwright.Runner/bin/Release/net10.0
                    touch kernel-extension/Pairwright.Runner/bin/Release/net10.0/Pairwright.Runner.dll ;;
                *) echo "in $PWD"; shift; printf '<%s>\n' "$@"; exit 17 ;;
            esac
            """);
        Plays("ldconfig", $"""cat "{_machine}/libraries" """);
        Plays("id", $"""cat "{_machine}/user" """);
        Plays("apt-cache", "");
        Plays("apt-get", $"""
            echo "apt-get $*" >>"{_machine}/said"
            [ ! -e "{_machine}/apt-fails" ] || exit 100
            case "$*" in *libgtk-3-0*) echo libgtk-3.so.0 >"{_machine}/libraries" ;; esac
            """);
        Sets("sdks", "10.0.100 [/usr/share/dotnet/sdk]\n");
        Sets("libraries", "libgtk-3.so.0\n");
        Sets("user", "0\n");
    }

    public string Project { get; }

    public string Caller { get; }

    /// <summary>A source file of the project.</summary>
    public string Source { get; }

    private string Launcher => Path.Combine(Project, "kernel-extension", "pairwright");

    /// <summary>What the machine was told to do, one line for each.</summary>
    public IEnumerable<string> Said =>
        File.Exists(Path.Combine(_machine, "said")) ? File.ReadAllLines(Path.Combine(_machine, "said")) : [];

    /// <summary>Sets a fact about the machine.</summary>
    public void Sets(string fact, string text) => File.WriteAllText(Path.Combine(_machine, fact), text);

    public async Task<(int ExitCode, string Output, string Errors)> RunAsync(params string[] arguments)
    {
        var start = new ProcessStartInfo("bash", [Launcher, .. arguments])
        {
            WorkingDirectory = Caller,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.Environment["PATH"] = $"{_machine}:/usr/bin:/bin";
        using var process = Process.Start(start)!;
        var errors = process.StandardError.ReadToEndAsync();
        var output = await process.StandardOutput.ReadToEndAsync();
        await process.WaitForExitAsync();
        return (process.ExitCode, output, await errors);
    }

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    private void Plays(string program, string script)
    {
        var path = Path.Combine(_machine, program);
        File.WriteAllText(path, $"#!/bin/bash\n{script}\n");
        File.SetUnixFileMode(path, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute);
    }
}
