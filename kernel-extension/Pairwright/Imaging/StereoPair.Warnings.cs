namespace Pairwright.Imaging;

/// <content>What may be wrong with a pair.</content>
public sealed partial class StereoPair
{
    private IReadOnlyList<string>? warnings;

    /// <summary>How far apart two pictures may be taken before a warning: 1 ms, in which a belt of 1 m/s moves 1 mm.</summary>
    public static TimeSpan DefaultSkewTolerance { get; } = TimeSpan.FromMilliseconds(1);

    /// <summary>
    /// What may make matching harder, one sentence with figures each: exposures that differ by more than a quarter, more than 1 % of saturated
    /// pixels, sharpness that differs by more than 30 %, sizes or bits that differ, time stamps farther apart than
    /// <see cref="DefaultSkewTolerance"/>, and what was noticed on reading. Empty where nothing was found.
    /// </summary>
    /// <remarks>The limits are common practice.</remarks>
    public IReadOnlyList<string> Warnings => warnings ??= WarningsAt(DefaultSkewTolerance);

    /// <summary>How long after the left picture the right one was taken, negative when before; nothing where a time stamp is not known.</summary>
    public TimeSpan? Skew => Right.CapturedAt - Left.CapturedAt;

    /// <summary>As <see cref="Warnings"/>, with another tolerance of skew.</summary>
    /// <param name="skewTolerance">How far apart the pictures may be taken.</param>
    public IReadOnlyList<string> WarningsAt(TimeSpan skewTolerance) => PairWarnings.Of(Left, Right, skewTolerance);
}
