using Pairwright.Runner.Execution;

namespace Pairwright.Runner.Reports;

/// <summary>The four files that a run leaves: the executed notebook, the page, JUnit's XML and the verdicts as JSON.</summary>
internal sealed class ReportFiles
{
    private readonly NotebookRun _run;

    public ReportFiles(NotebookRun run, string folder)
    {
        _run = run;
        Notebook = Path.Combine(folder, run.Name + ".ipynb");
        Page = Path.Combine(folder, run.Name + ".html");
        Junit = Path.Combine(folder, run.Name + ".junit.xml");
        Verdicts = Path.Combine(folder, run.Name + ".verdicts.json");
        if (Path.GetFullPath(Notebook) == run.Document.Path)
        {
            throw new BadUsageException($"--out {folder} is the notebook's own folder, where the executed notebook would overwrite {run.Document.Path}; choose another folder.");
        }
    }

    public string Notebook { get; }

    public string Page { get; }

    public string Junit { get; }

    public string Verdicts { get; }

    public IEnumerable<string> All => [Page, Notebook, Junit, Verdicts];

    /// <summary>Writes all four as far as the run has come; each appears whole or not at all.</summary>
    public void Write()
    {
        AtomicFile.WriteText(Notebook, _run.Document.ToJson());
        AtomicFile.WriteText(Page, HtmlPage.Render(_run));
        AtomicFile.WriteText(Junit, JunitReport.Render(_run));
        AtomicFile.WriteText(Verdicts, VerdictReport.Render(_run));
    }
}
