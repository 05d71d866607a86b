using System.Runtime.Versioning;
using Xunit;

namespace Pairwright.Notebook.Tests.Launching;

[SupportedOSPlatform("linux")]
public sealed class LauncherTests : IDisposable
{
    private readonly Launch _launch = new();

    public void Dispose() => _launch.Dispose();

    [Fact]
    public async Task The_program_runs_in_the_callers_folder_with_the_callers_words_and_its_exit_code_is_passed_on()
    {
        var (code, output, errors) = await _launch.RunAsync("run", "day 2/a.ipynb", "--set", "note=it's \"so\" $HOME", "");

        Assert.Equal(17, code);
        Assert.Equal($"in {_launch.Caller}\n<run>\n<day 2/a.ipynb>\n<--set>\n<note=it's \"so\" $HOME>\n<>\n", output);
        Assert.Matches(@"\Apairwright: building …\npairwright: built in \d+ s\.\n\z", errors);
    }

    [Fact]
    public async Task What_is_built_is_not_built_again_until_a_source_changes_comes_or_goes()
    {
        await _launch.RunAsync();
        var (_, _, again) = await _launch.RunAsync();
        Assert.Empty(again);
        Assert.Single(_launch.Said);

        await ChangeAsync(() => File.WriteAllText(_launch.Source, "changed"), builds: 2);
        await ChangeAsync(() => File.WriteAllText(_launch.Source + ".new.cs", "new"), builds: 3);
        await ChangeAsync(() => File.Delete(_launch.Source), builds: 4);
        await ChangeAsync(() => File.WriteAllText(Path.Combine(_launch.Project, "Directory.Build.props"), "changed"), builds: 5);

        async Task ChangeAsync(Action change, int builds)
        {
            change();
            await _launch.RunAsync();
            await _launch.RunAsync();
            Assert.Equal(builds, _launch.Said.Count());
        }
    }

    [Fact]
    public async Task A_build_that_fails_exits_with_70_the_compilers_error_and_one_sentence_and_runs_nothing()
    {
        _launch.Sets("build-fails", "");

        var (code, output, errors) = await _launch.RunAsync("run", "a.ipynb");

        Assert.Equal(70, code);
        Assert.Empty(output);
        var lines = errors.TrimEnd().Split('\n');
        Assert.Equal(["pairwright: building …", "kernel-extension/Pairwright/Camera.cs(3,7): error CS1002: ; expected"], lines[..2]);
        Assert.StartsWith("pairwright: the build failed; the whole log is in ", Assert.Single(lines[2..]));
    }

    [Theory]
    [InlineData("")]
    [InlineData("8.0.404 [/usr/share/dotnet/sdk]\n")]
    public async Task A_machine_without_the_SDK_is_told_so_in_one_line(string sdks)
    {
        _launch.Sets("sdks", sdks);

        var (code, _, errors) = await _launch.RunAsync("run", "a.ipynb");

        Assert.Equal(70, code);
        Assert.Equal("pairwright: the .NET 10 SDK is missing; install it (package dotnet-sdk-10.0) and try again.\n", errors);
    }

    [Fact]
    public async Task A_missing_GTK_is_installed_and_said_before_it_is()
    {
        _launch.Sets("libraries", "libc.so.6\n");

        var (code, _, errors) = await _launch.RunAsync("run", "a.ipynb");

        Assert.Equal(17, code);
        Assert.StartsWith("pairwright: installing Debian's package libgtk-3-0, which OpenCV's native library loads …\npairwright: building", errors);
        Assert.Equal(["apt-get install -y -qq --no-install-recommends libgtk-3-0", "built"], _launch.Said);
    }

    [Fact]
    public async Task Without_the_right_to_install_a_missing_GTK_is_named_in_one_line()
    {
        _launch.Sets("libraries", "libc.so.6\n");
        _launch.Sets("user", "1000\n");

        var (code, _, errors) = await _launch.RunAsync("run", "a.ipynb");

        Assert.Equal(70, code);
        Assert.Equal("pairwright: Debian's package libgtk-3-0 is missing, which OpenCV's native library loads; as root run: apt-get install libgtk-3-0\n", errors);
        Assert.Empty(_launch.Said);
    }

    [Fact]
    public async Task An_installation_that_fails_exits_with_70_in_one_sentence()
    {
        _launch.Sets("libraries", "libc.so.6\n");
        _launch.Sets("apt-fails", "");

        var (code, _, errors) = await _launch.RunAsync("run", "a.ipynb");

        Assert.Equal(70, code);
        Assert.EndsWith("\npairwright: the package libgtk-3-0 could not be installed; see the lines above.\n", errors);
        Assert.DoesNotContain("built", _launch.Said);
    }
}
