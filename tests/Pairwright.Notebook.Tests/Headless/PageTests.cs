using Microsoft.Playwright;
using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Headless;

/// <summary>Opens the page in Debian's Chromium, headless and without a network.</summary>
public sealed class PageTests
{
    private const string Chromium = "/usr/bin/chromium";

    [SkippableFact]
    public async Task The_page_opens_without_a_network_asks_for_nothing_and_shows_verdicts_outputs_and_cautions()
    {
        var reason = $"{Chromium} is missing; tests/run installs it.";
        Assert.True(File.Exists(Chromium) || Environment.GetEnvironmentVariable("CI") != "true", reason);
        Skip.IfNot(File.Exists(Chromium), reason);

        using var run = await HeadlessRun.Of(Of(
            Markdown("# Commissioning <b>line 3</b>\n\nText, [a link](javascript:alert(1)), <script>document.title = 'taken'</script> and ![out there](http://example.invalid/x.png)."),
            Code(Verdict("met", "<i>cup</i>") + Verdict("undecided", "twist")),
            Code("Console.WriteLine(\"<b>plain</b>\"); \"<script>document.title = 'taken'</script>\""),
            Code("\"<b id='rich'>rich</b><img src='http://example.invalid/y.png'><script>document.body.dataset.ran = 'yes'</script>\".DisplayAs(\"text/html\");")));

        using var playwright = await Playwright.CreateAsync();
        await using var browser = await playwright.Chromium.LaunchAsync(new() { ExecutablePath = Chromium, Args = ["--no-sandbox"] });
        await using var context = await browser.NewContextAsync(new() { Offline = true });
        var page = await context.NewPageAsync();
        var (asked, refused) = (new List<string>(), new List<string>());
        page.Request += (_, request) => asked.Add(request.Url);
        page.RequestFailed += (_, request) => refused.Add($"{request.Url} {request.Failure}");
        await page.GotoAsync(new Uri(run.ReportPath("html")).AbsoluteUri);

        // What a cell's own HTML asks for is refused by the page's policy before it could reach a network.
        Assert.All(asked.Where(url => !url.StartsWith("file:", StringComparison.Ordinal)), url => Assert.Equal("http://example.invalid/y.png", url));
        Assert.Equal(["http://example.invalid/y.png csp"], refused);
        Assert.Equal("Commissioning <b>line 3</b>", await page.TitleAsync());
        Assert.Equal("1 of 2 requirements is met: 1 undecided, which counts as not met.", await page.InnerTextAsync("#summary .sentence"));
        Assert.Equal(["✓ met", "? undecided"], await page.Locator(".verdicts .outcome").AllInnerTextsAsync());
        Assert.Contains("<i>cup</i>", await page.InnerTextAsync(".verdicts"));
        Assert.Equal("rich", await page.InnerTextAsync("#rich"));
        Assert.Equal("yes", await page.EvaluateAsync<string>("document.body.dataset.ran"));
        Assert.Contains("<b>plain</b>", await page.InnerTextAsync("#cell-2 .stdout"));
        Assert.Contains("not a safety function", await page.InnerTextAsync("footer"));

        // Code is folded away until someone asks for it; outputs are not.
        Assert.False(await page.Locator("#cell-1 .code pre").IsVisibleAsync());
        await page.ClickAsync("#cell-1 summary");
        Assert.True(await page.Locator("#cell-1 .code pre").IsVisibleAsync());
        Assert.Equal(0, await page.Locator("a[href^='javascript']").CountAsync());
    }
}
