using System.Text.RegularExpressions;
using System.Xml.Linq;
using Microsoft.DotNet.Interactive.Formatting;
using OpenCvSharp;
using Pairwright.Notebook.Renderers;
using Xunit;

namespace Pairwright.Notebook.Tests.Renderers;

public sealed class RendererTests
{
    public static TheoryData<string> Names => [.. Samples.All.Select(sample => sample.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void The_page_is_well_formed(string name)
    {
        var page = XElement.Parse($"<body>{Of(name).Html}</body>");

        Assert.Contains(page.Descendants(), element => element.Attribute("class")?.Value == "pw-h" && element.Value.Length > 0);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void The_page_asks_for_nothing_from_outside_and_runs_nothing(string name)
    {
        var html = Of(name).Html;
        var page = XElement.Parse($"<body>{html}</body>");

        Assert.DoesNotContain(page.Descendants(), element => element.Name.LocalName is "script" or "link" or "iframe" or "object" or "embed" or "base");
        Assert.DoesNotContain(page.Descendants().Attributes(), attribute => attribute.Name.LocalName.StartsWith("on", StringComparison.OrdinalIgnoreCase));
        Assert.All(page.Descendants().Attributes().Where(attribute => attribute.Name.LocalName is "href" or "src"), attribute => Assert.StartsWith("data:image/png;base64,", attribute.Value));
        Assert.DoesNotContain("url(", html);
        Assert.DoesNotContain("@import", html);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Drawings_carry_no_identifiers_that_could_clash_on_one_page(string name) =>
        Assert.Empty(XElement.Parse($"<body>{Of(name).Html}</body>").Descendants().Attributes("id"));

    [Theory]
    [MemberData(nameof(Names))]
    public void No_number_that_is_none_reaches_the_page(string name)
    {
        var sample = Of(name);
        var text = XElement.Parse($"<body>{sample.Html}</body>").Value;

        Assert.DoesNotMatch(new Regex(@"\bNaN\b|Infinity"), text + sample.Plain);
        Assert.DoesNotMatch(new Regex(@"=""[^""]*\bNaN\b"), sample.Html);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Plain_text_is_a_few_lines_with_units(string name)
    {
        var sample = Of(name);

        Assert.Contains(sample.Unit, sample.Plain);
        Assert.InRange(sample.Plain.Split('\n').Length, 1, 8);
        Assert.DoesNotContain("Pairwright.", sample.Plain);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void A_page_stays_small_enough_for_a_report(string name) => Assert.True(Of(name).Html.Length < 1_000_000);

    [Fact]
    public void What_is_a_picture_has_a_PNG_that_OpenCV_reads()
    {
        var pictures = Samples.All.Where(sample => sample.Png is not null).ToArray();

        Assert.Equal(4, pictures.Length);
        Assert.All(pictures, sample =>
        {
            using var picture = Cv2.ImDecode(sample.Png!, ImreadModes.Unchanged);
            Assert.True(picture.Width > 50 && picture.Height > 50);
        });
    }

    [Theory]
    [InlineData("StereoPairRenderer")]
    [InlineData("VerdictRenderer")]
    [InlineData("VerdictListRenderer")]
    public void A_hostile_name_is_shown_as_text(string name)
    {
        var html = Of(name).Html;

        Assert.DoesNotContain("<script", html);
        Assert.Contains("alert(", XElement.Parse($"<body>{html}</body>").Value);
    }

    [Fact]
    public void A_verdict_is_told_by_word_and_sign_not_by_colour_alone()
    {
        var html = Of("VerdictListRenderer").Html;

        Assert.Contains("✓ met", html);
        Assert.Contains("✗ not met", html);
        Assert.Contains("? undecided", html);
    }

    [Fact]
    public void A_map_of_depth_and_a_cloud_each_say_their_frame()
    {
        Assert.Contains("Z along the rectified left axis", Of("DepthMapRenderer").Html);
        Assert.Contains("left camera&#39;s own", Of("PointCloudRenderer").Html);
        Assert.Contains("rectified left axis", Of("DepthMapRenderer").Plain);
        Assert.Contains("left camera's own frame", Of("PointCloudRenderer").Plain);
    }

    [Fact]
    public void A_rig_without_covariance_says_what_that_costs()
    {
        var html = new RigRenderer().Html(Samples.Rig(withCovariance: false));

        Assert.Contains("covariance of this rig is not known", html);
        Assert.Contains("uncertainty unknown", html);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void The_notebook_finds_the_renderer_for_each_form(string name)
    {
        RendererRegistry.RegisterAll();
        RendererRegistry.RegisterAll();
        var sample = Of(name);

        Assert.Equal(sample.Html, Sent(sample, "text/html"));
        Assert.Equal(sample.Plain, Sent(sample, "text/plain"));
        var forms = Formatter.GetPreferredMimeTypesFor(sample.Value.GetType()).ToArray();
        Assert.Equal(forms.Distinct(), forms);
        Assert.Contains("text/html", forms);
        Assert.Contains("text/plain", forms);
        if (sample.Png is not null)
        {
            Assert.Equal(Convert.ToBase64String(sample.Png), Sent(sample, "image/png"));
            Assert.Contains("image/png", forms);
        }
    }

    private static string Sent(Sample sample, string form) => sample.Value.ToDisplayString(form);

    private static Sample Of(string name) => Samples.All.Single(sample => sample.Name == name);
}
