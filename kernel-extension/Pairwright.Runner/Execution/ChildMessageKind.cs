namespace Pairwright.Runner.Execution;

/// <summary>The kinds of message from the child process to its parent.</summary>
internal enum ChildMessageKind
{
    /// <summary>The kernel stands; the first cell follows.</summary>
    Ready,

    /// <summary>A cell begins.</summary>
    CellStarted,

    /// <summary>Text on standard output or standard error.</summary>
    Stream,

    /// <summary>A value is shown.</summary>
    Display,

    /// <summary>A value that was shown earlier is replaced.</summary>
    Update,

    /// <summary>The value of the cell's last expression.</summary>
    Result,

    /// <summary>A verdict was made.</summary>
    Verdict,

    /// <summary>The cell failed; no later cell will run.</summary>
    CellFailed,

    /// <summary>The cell ended well.</summary>
    CellFinished,

    /// <summary>All cells ended well; the process is about to leave.</summary>
    Finished,
}
