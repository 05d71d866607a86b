namespace Pairwright.Runner.Execution;

/// <summary>Why a cell failed, as far as the process that ran it can say.</summary>
/// <param name="Kind">What sort of failure.</param>
/// <param name="Name">The exception's type, or the compiler's number of the error.</param>
/// <param name="Message">The exception's or compiler's message.</param>
/// <param name="Line">The line in the cell, from 1, or null where it is not known.</param>
/// <param name="Trace">Where it happened, innermost first, in the cells and below; empty for a user's mistake.</param>
internal sealed record CellFailure(CellFailureKind Kind, string Name, string Message, int? Line, IReadOnlyList<string> Trace);
