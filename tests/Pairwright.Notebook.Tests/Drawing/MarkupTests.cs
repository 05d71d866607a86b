using System.Xml.Linq;
using Pairwright.Notebook.Drawing;
using Xunit;

namespace Pairwright.Notebook.Tests.Drawing;

public sealed class MarkupTests
{
    [Theory]
    [InlineData("<script>alert(1)</script>")]
    [InlineData("\" onload=\"alert(1)")]
    [InlineData("plank & belt 'north' < 3 mm")]
    [InlineData("🪵 Tarn Hollow")]
    public void Any_text_survives_escaping_as_text(string text)
    {
        var element = XElement.Parse($"<p title=\"{Markup.Escape(text)}\">{Markup.Escape(text)}</p>");

        Assert.Equal(text, element.Value);
        Assert.Equal(text, element.Attribute("title")!.Value);
        Assert.False(element.HasElements);
    }

    [Theory]
    [InlineData("a\0b")]
    [InlineData("a\u001bb")]
    [InlineData("a\uFFFEb")]
    public void Characters_that_no_page_may_hold_are_replaced_visibly(string text) =>
        Assert.Equal("a\uFFFDb", XElement.Parse($"<p>{Markup.Escape(text)}</p>").Value);

    [Fact]
    public void Half_a_surrogate_pair_is_replaced_visibly() =>
        Assert.Equal("a\uFFFDb", XElement.Parse($"<p>{Markup.Escape("a" + (char)0xD800 + "b")}</p>").Value);
}
