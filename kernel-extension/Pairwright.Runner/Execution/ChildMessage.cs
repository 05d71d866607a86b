using System.Text.Json;
using System.Text.Json.Serialization;

namespace Pairwright.Runner.Execution;

/// <summary>One line of what the child process tells its parent while it runs the cells.</summary>
internal sealed record ChildMessage
{
    private static readonly JsonSerializerOptions Format = new()
    {
        DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull,
        NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
        Converters = { new JsonStringEnumConverter() },
    };

    public required ChildMessageKind Kind { get; init; }

    /// <summary>The place in the job's list of cells of the cell that was running.</summary>
    public int Cell { get; init; } = -1;

    /// <summary>A text: the stream's, or the sentence of a failure.</summary>
    public string? Text { get; init; }

    /// <summary>Which stream: <c>stdout</c> or <c>stderr</c>.</summary>
    public string? Stream { get; init; }

    /// <summary>Names a shown value, so that a later message can replace it.</summary>
    public string? ValueId { get; init; }

    /// <summary>What is shown, by MIME type.</summary>
    public Dictionary<string, string>? Data { get; init; }

    public CellFailure? Failure { get; init; }

    public VerdictRecord? Verdict { get; init; }

    public string ToLine() => JsonSerializer.Serialize(this, Format);

    public static ChildMessage? FromLine(string line) => JsonSerializer.Deserialize<ChildMessage>(line, Format);
}
