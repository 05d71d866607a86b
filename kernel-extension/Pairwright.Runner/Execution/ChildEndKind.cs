namespace Pairwright.Runner.Execution;

/// <summary>The sorts of end that a child process can come to.</summary>
internal enum ChildEndKind
{
    /// <summary>By itself.</summary>
    Left,

    /// <summary>We ended it: the time was over.</summary>
    OutOfTime,

    /// <summary>We ended it: it took more memory than allowed.</summary>
    OutOfMemory,

    /// <summary>We ended it: someone asked us to stop.</summary>
    Interrupted,
}
