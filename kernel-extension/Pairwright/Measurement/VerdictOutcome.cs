namespace Pairwright.Measurement;

/// <summary>What a requirement came to (JCGM 106:2012, 8).</summary>
public enum VerdictOutcome
{
    /// <summary>The value meets the requirement with its whole expanded uncertainty.</summary>
    Met,

    /// <summary>The value misses the requirement with its whole expanded uncertainty.</summary>
    NotMet,

    /// <summary>The uncertainty reaches over a limit, or something is not known; it counts as not met.</summary>
    Undecided,
}
