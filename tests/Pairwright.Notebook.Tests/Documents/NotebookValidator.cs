using System.Diagnostics;
using Xunit;

namespace Pairwright.Notebook.Tests.Documents;

/// <summary>Debian's python3-nbformat, which holds a notebook against the format's published schema.</summary>
internal static class NotebookValidator
{
    private const string Python = "/usr/bin/python3";

    private const string Script =
        """
        import sys, nbformat
        notebook = nbformat.read(sys.argv[1], as_version=nbformat.NO_CONVERT)
        assert (notebook.nbformat, notebook.nbformat_minor) == (4, 5), notebook.nbformat_minor
        nbformat.validate(notebook)
        """;

    private const string Missing = "Debian's python3-nbformat is missing; tests/run installs it.";

    private static readonly Lazy<bool> IsHere = new(() => File.Exists(Python) && Run("import nbformat").Code == 0);

    /// <summary>Fails where the validator finds a fault; skips where it is missing, except on a build server.</summary>
    public static void Judge(string notebook)
    {
        Assert.True(IsHere.Value || Environment.GetEnvironmentVariable("CI") != "true", Missing);
        Skip.IfNot(IsHere.Value, Missing);
        var (code, errors) = Run(Script, notebook);
        Assert.True(code == 0, errors);
        Assert.DoesNotContain("MissingIDFieldWarning", errors);
    }

    private static (int Code, string Errors) Run(params string[] script)
    {
        using var process = Process.Start(new ProcessStartInfo(Python, ["-c", .. script]) { RedirectStandardError = true })!;
        var errors = process.StandardError.ReadToEnd();
        process.WaitForExit();
        return (process.ExitCode, errors);
    }
}
