using System.Diagnostics;
using System.Text.Json.Nodes;
using Pairwright.Notebook.Tests.Documents;
using Pairwright.Runner.Documents;
using Pairwright.Runner.Execution;
using Pairwright.Runner.Reports;
using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

public sealed class StoppedRunTests
{
    private const string Before = "Console.WriteLine(\"before the end\");";

    [SkippableFact]
    public async Task A_cell_that_throws_stops_the_run_with_its_number_its_line_and_the_message()
    {
        using var run = await HeadlessRun.Of(Of(
            Markdown("# Measuring"),
            Code(Before + Verdict("met")),
            Code("#r \"nuget: Pairwright\"\nint Share(int of)\n{\n    return 1 / of;\n}\nShare(0)"),
            Code("Console.WriteLine(\"never\");" + Verdict("met"))));

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("Cell 2, line 4 failed: DivideByZeroException:", run.Summary);
        Assert.Contains("before the end", run.Page);
        Assert.Contains("not run", run.Page);
        Assert.Contains("cell[2]: line 4", NotebookCell.TextOf(run.OutputsOf(2)[^1]!["traceback"]));
        Assert.Empty(run.OutputsOf(3));
        Assert.Matches(@"(?m)^ *2/3 .* s  ✗", run.Output);

        // The verdict that was made before stands beside the error.
        Assert.Single(run.Verdicts["verdicts"]!.AsArray());
        Assert.Equal("2", run.Suite.Attribute("tests")!.Value);
        Assert.Single(run.Suite.Descendants("error"));
        NotebookValidator.Judge(run.ReportPath("ipynb"));
    }

    [Fact]
    public async Task A_users_mistake_is_shown_as_its_sentence_without_a_stack_trace()
    {
        using var run = await HeadlessRun.Of(Of(Code("\nthrow new UserErrorException(\"The picture a.png is missing; look for it.\");")));

        Assert.Equal("Cell 1, line 2: The picture a.png is missing; look for it.", run.Summary);
        Assert.Single(run.OutputsOf(1)[^1]!["traceback"]!.AsArray());
        Assert.DoesNotContain("   at ", run.Page);
    }

    [Fact]
    public async Task A_cell_that_does_not_compile_says_where()
    {
        using var run = await HeadlessRun.Of(Of(Code("var a = 1;\nvar b = a + nowhere;")));

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("Cell 1, line 2 does not compile: CS0103:", run.Summary);
    }

    [Fact]
    public async Task An_endless_loop_is_ended_at_the_time_limit_and_the_page_keeps_what_came_before()
    {
        using var folder = HeadlessRun.In(Of(Code(Before), Code("while (true) { }")));
        var clock = new SetClock();
        var run = new NotebookRun(NotebookDocument.Read(folder.NotebookPath), [], new RunLimits(TimeSpan.FromSeconds(90), RunLimits.DefaultMemoryMb));
        await run.RunAsync(
            (kind, cell) => clock.Now = kind == ChildMessageKind.CellStarted && cell?.Number == 2 ? TimeSpan.FromSeconds(90) : clock.Now,
            clock,
            CancellationToken.None);

        Assert.Equal(2, run.ExitCode);
        Assert.Equal(
            "Cell 2 was still running when the time limit of 90 s ran out; look for a loop in it that never ends, or allow more with --time-limit.",
            run.Stop!.Sentence);
        var page = HtmlPage.Render(run);
        Assert.Contains("before the end", page);
        Assert.Contains("href=\"#cell-2\"", page);
    }

    [Fact]
    public async Task Out_of_time_exits_with_2()
    {
        using var run = await HeadlessRun.Of(Of(Code("while (true) { }")), "--time-limit", "1.5");

        Assert.Equal(2, run.ExitCode);
        Assert.Contains("time limit of 1.5 s ran out", run.Summary);
        Assert.Single(run.Suite.Descendants("error"));
    }

    [Fact]
    public async Task A_cell_that_exits_is_named_and_what_it_printed_is_kept()
    {
        using var run = await HeadlessRun.Of(Of(Code(Before + "Environment.Exit(0);")));

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("Cell 1 ended the process itself (exit code 0)", run.Summary);
        Assert.Contains("before the end", run.Page);
    }

    [Theory]
    [InlineData("var all = new List<byte[]>(); while (true) { var more = new byte[1 << 20]; Array.Fill(more, (byte)1); all.Add(more); }")]
    [InlineData("var one = new byte[2_000_000_000];")]
    [InlineData("while (true) { unsafe { new Span<byte>(System.Runtime.InteropServices.NativeMemory.Alloc(1 << 20), 1 << 20).Fill(1); } }")]
    public async Task A_cell_that_fills_the_memory_is_ended_at_the_memory_limit(string code)
    {
        using var run = await HeadlessRun.Of(Of(Code(code)), "--memory-limit", "600");

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("Cell 1 needed more memory than the limit of 600 MB", run.Summary);
    }

    [Fact]
    public async Task A_cell_that_crashes_the_process_is_named_with_the_runtimes_own_words()
    {
        using var run = await HeadlessRun.Of(Of(Code("Environment.FailFast(\"the sensor bit me\");")));

        Assert.Equal(2, run.ExitCode);
        Assert.Contains("crashed while cell 1 was running", run.Summary);
        Assert.Contains("the sensor bit me", run.Page);
    }

    [Fact]
    public async Task A_run_whose_reports_can_no_longer_be_written_is_ended_and_says_so()
    {
        using var run = await HeadlessRun.Of(Of(
            Code(
                """
                using System.IO;
                // The runner may be writing just now.
                while (!File.Exists("reports"))
                {
                    try { Directory.Delete("reports", recursive: true); File.WriteAllText("reports", "in the way"); }
                    catch (Exception busy) when (busy is IOException or UnauthorizedAccessException) { }
                }
                """),
            Code("while (true) { Console.WriteLine(\"more and more\"); }")));

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("pairwright: The run was ended because its reports cannot be kept: 'reports/tiny.ipynb' cannot be written", run.Errors.Replace(run.Folder + "/", "", StringComparison.Ordinal));
        Assert.Single(run.Errors.Trim().Split('\n'));
    }

    [Fact]
    public async Task An_interrupted_run_ends_its_child_and_keeps_its_report()
    {
        using var run = HeadlessRun.In(Of(Code("Console.WriteLine(\"my number is \" + Environment.ProcessId);"), Code("while (true) { }")));
        using var process = run.Start("run", "tiny.ipynb");
        var child = await ChildOf(run);

        Process.Start("kill", ["-INT", process.Id.ToString()])!.WaitForExit();
        await run.Finish(process);

        Assert.Equal(2, run.ExitCode);
        Assert.StartsWith("The run was interrupted while cell 2 was running", run.Summary);
        Assert.False(Directory.Exists($"/proc/{child}"));
    }

    [Fact]
    public async Task A_parent_that_is_killed_takes_its_child_along_and_leaves_a_page_that_says_it_is_unfinished()
    {
        using var run = HeadlessRun.In(Of(Code("Console.WriteLine(\"my number is \" + Environment.ProcessId);"), Code("while (true) { }")));
        using var process = run.Start("run", "tiny.ipynb");
        var child = await ChildOf(run);

        process.Kill();
        await run.Finish(process);

        Assert.Equal("unfinished", run.Verdicts["outcome"]!.GetValue<string>());
        Assert.Contains("This run has not finished: cell 2 was running", run.Page);
        Assert.True(await Within(TimeSpan.FromSeconds(60), () => !Directory.Exists($"/proc/{child}")));
    }

    /// <summary>Waits until the second cell runs, and reads the child's process number from the first one's output.</summary>
    private static async Task<int> ChildOf(HeadlessRun run)
    {
        var number = 0;
        Assert.True(await Within(TimeSpan.FromSeconds(120), () =>
        {
            if (!File.Exists(run.ReportPath("html")) || !run.Page.Contains("cell 2 was running", StringComparison.Ordinal))
            {
                return false;
            }
            var text = NotebookCell.TextOf(run.OutputsOf(1).OfType<JsonObject>().First()["text"]);
            number = int.Parse(text.Split(' ')[^1]);
            return true;
        }));
        return number;
    }

    private static async Task<bool> Within(TimeSpan time, Func<bool> holds)
    {
        var clock = Stopwatch.StartNew();
        while (!holds())
        {
            if (clock.Elapsed > time)
            {
                return false;
            }
            await Task.Delay(50);
        }
        return true;
    }

    private sealed class SetClock : TimeProvider
    {
        private long _ticks;

        public TimeSpan Now
        {
            get => new(Volatile.Read(ref _ticks));
            set => Volatile.Write(ref _ticks, value.Ticks);
        }

        public override long TimestampFrequency => TimeSpan.TicksPerSecond;

        public override long GetTimestamp() => Now.Ticks;
    }
}
