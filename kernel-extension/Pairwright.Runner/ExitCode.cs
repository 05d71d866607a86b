namespace Pairwright.Runner;

/// <summary>What the exit code of the command line says. The launcher adds 70: it could not build or install.</summary>
internal static class ExitCode
{
    /// <summary>Every requirement that the notebook stated is met; every pair is matched.</summary>
    public const int AllMet = 0;

    /// <summary>At least one requirement is not met or undecided.</summary>
    public const int NotAllMet = 1;

    /// <summary>A cell failed, or the run ended early for want of time or memory or because someone stopped it; a pair could not be matched.</summary>
    public const int Stopped = 2;

    /// <summary>The command line or the notebook file makes no sense; nothing was run.</summary>
    public const int BadUsage = 64;

    /// <summary>Someone stopped a command that wrote files one by one: 128 + SIGINT, as a shell expects it.</summary>
    public const int Interrupted = 130;
}
