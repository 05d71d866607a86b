using System.Text.Json.Nodes;
using Pairwright.Notebook.Tests.Headless;
using Pairwright.Runner.Documents;
using Xunit;
using static Pairwright.Notebook.Tests.Headless.NotebookText;

namespace Pairwright.Notebook.Tests.Documents;

public sealed class NotebookDocumentTests
{
    [Fact]
    public void What_the_reader_does_not_know_it_leaves_alone()
    {
        var notebook = Of(Markdown("![picture](attachment:dot.png)"), Raw("raw"), Code("1"));
        notebook["metadata"]!["our_tool"] = new JsonObject { ["deep"] = new JsonArray(1, null, "ü <&> '") };
        notebook["cells"]![0]!["attachments"] = new JsonObject { ["dot.png"] = new JsonObject { ["image/png"] = "AAAA" } };
        notebook["cells"]![1]!["metadata"]!["raw_mimetype"] = "text/latex";

        var written = JsonNode.Parse(ReadBack(notebook).ToJson())!;

        Assert.True(JsonNode.DeepEquals(notebook["metadata"], written["metadata"]));
        Assert.True(JsonNode.DeepEquals(notebook["cells"]![0]!["attachments"], written["cells"]![0]!["attachments"]));
        Assert.Equal("text/latex", written["cells"]![1]!["metadata"]!["raw_mimetype"]!.GetValue<string>());
    }

    [Fact]
    public void Every_cell_gets_an_identifier_and_keeps_one_that_is_good_and_its_own()
    {
        var notebook = Of(Code("1"), Code("2"), Code("3"), Code("4"));
        notebook["cells"]![1]!["id"] = "mine";
        notebook["cells"]![2]!["id"] = "mine";
        notebook["cells"]![3]!["id"] = "not good: spaces";

        var ids = ReadBack(notebook).Cells.Select(cell => NotebookCell.TextOf(cell.Json["id"])).ToList();

        Assert.Equal("mine", ids[1]);
        Assert.Equal(4, ids.Distinct().Count());
        Assert.All(ids, id => Assert.Matches("^[a-zA-Z0-9-_]{1,64}$", id));
    }

    private static NotebookDocument ReadBack(JsonObject notebook)
    {
        using var run = HeadlessRun.In(notebook);
        return NotebookDocument.Read(run.NotebookPath);
    }
}
