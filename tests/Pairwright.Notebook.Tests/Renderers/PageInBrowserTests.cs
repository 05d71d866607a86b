using Microsoft.Playwright;
using Xunit;

namespace Pairwright.Notebook.Tests.Renderers;

/// <summary>The cards in a real browser that is cut off from every network.</summary>
public sealed class PageInBrowserTests
{
    private const string Browser = "/usr/bin/chromium";

    [SkippableFact]
    public async Task Every_drawing_shows_without_a_network_and_fits_the_page()
    {
        var here = File.Exists(Browser);
        if (Environment.GetEnvironmentVariable("CI") == "true")
        {
            Assert.True(here, $"{Browser} is missing: install Debian's package chromium.");
        }

        Skip.IfNot(here, $"{Browser} is missing: install Debian's package chromium.");
        using var playwright = await Playwright.CreateAsync();
        await using var browser = await playwright.Chromium.LaunchAsync(new() { ExecutablePath = Browser, Args = ["--no-sandbox", "--disable-gpu", "--disable-quic"] });
        await using var context = await browser.NewContextAsync(new() { Offline = true, ViewportSize = new() { Width = 1040, Height = 900 } });
        var page = await context.NewPageAsync();
        var (asked, complained) = (new List<string>(), new List<string>());
        page.Request += (_, request) => asked.Add(request.Url);
        page.Console += (_, message) => complained.Add(message.Text);

        await page.SetContentAsync("<!doctype html><html lang=\"en\"><head><meta charset=\"utf-8\"></head><body>" + string.Concat(Samples.All.Select(sample => sample.Html)) + "</body></html>");

        Assert.DoesNotContain(asked, url => !url.StartsWith("data:image/png", StringComparison.Ordinal));
        Assert.Empty(complained);
        Assert.Equal(Samples.All.Count, await page.Locator(".pw-card").CountAsync());
        Assert.True(await page.EvaluateAsync<bool>(
            "() => [...document.querySelectorAll('.pw-card svg[role=img]')].filter(s => !s.closest('details')).every(s => { const b = s.getBoundingClientRect(); return b.width > 40 && b.height > 20 && b.right <= innerWidth; })"));
        Assert.True(await page.EvaluateAsync<bool>(
            "() => Promise.all([...document.querySelectorAll('.pw-card image')].map(i => { const p = new Image(); p.src = i.getAttribute('href'); return p.decode().then(() => p.naturalWidth > 0, () => false); })).then(all => all.length > 20 && all.every(ok => ok))"));
    }
}
