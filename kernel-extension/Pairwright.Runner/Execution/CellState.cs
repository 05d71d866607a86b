namespace Pairwright.Runner.Execution;

/// <summary>How far a code cell has come.</summary>
internal enum CellState
{
    /// <summary>Its turn has not come, or never came.</summary>
    NotRun,

    /// <summary>It is running.</summary>
    Running,

    /// <summary>It ended well.</summary>
    Done,

    /// <summary>It failed, or the run was stopped while it ran.</summary>
    Failed,
}
