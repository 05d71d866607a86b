namespace Pairwright.Runner.Execution;

/// <summary>The sorts of failure that a cell's own process can tell apart.</summary>
internal enum CellFailureKind
{
    /// <summary>The code does not compile, or a package or assembly that it names cannot be had.</summary>
    NotCompiled,

    /// <summary>A mistake that the user can mend; the message is one whole sentence.</summary>
    UserError,

    /// <summary>Any other exception.</summary>
    Thrown,

    /// <summary>The managed heap reached its limit.</summary>
    OutOfMemory,
}
