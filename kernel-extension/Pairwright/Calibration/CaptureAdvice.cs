using System.Collections.Immutable;

namespace Pairwright.Calibration;

/// <summary>What to capture next, from what the views lack. The limits are common practice.</summary>
internal static class CaptureAdvice
{
    private const int EnoughViews = 10;
    private const double EnoughTiltDegrees = 20;
    private const int EnoughTilted = 4;
    private const double EnoughDistanceRatio = 1.25;
    private const double OverfitRatio = 1.5;

    public static ImmutableArray<string> For(IReadOnlyList<BoardView> views, Coverage left, Coverage right, double stereoRmsPx, LeaveOneOut leaveOneOut)
    {
        var used = views.Where(view => view.Used).ToArray();
        var tilted = used.Count(view => view.TiltDegrees >= EnoughTiltDegrees);
        var (nearest, farthest) = (used.Min(view => view.DistanceMm), used.Max(view => view.DistanceMm));
        return
        [
            .. views.Where(view => !view.Used).Select(view => $"View {view.Name} was not used: {view.WhyNotUsed}"),
            .. used.Where(view => view.Outlying).Select(view =>
                FormattableString.Invariant($"View {view.Name} stands out with {view.RmsPx:0.00} px RMS: look for motion blur, glare or a bent board, and capture it again.")),
            .. Missing(left, "left"),
            .. Missing(right, "right"),
            .. used.Length < EnoughViews ? [$"Capture more views: {used.Length} were used, and {EnoughViews} or more steady every parameter."] : Array.Empty<string>(),
            .. tilted < EnoughTilted
                ? [$"Tilt the board more: {tilted} views are tilted by {EnoughTiltDegrees:0}° or more, and focal length and distance are told apart by tilt alone."]
                : Array.Empty<string>(),
            .. farthest < EnoughDistanceRatio * nearest
                ? [FormattableString.Invariant($"Vary the distance: all boards stand between {nearest:0} and {farthest:0} mm; capture some nearer and some farther, at the working distances.")]
                : Array.Empty<string>(),
            .. leaveOneOut.ReprojectionRmsPx > OverfitRatio * stereoRmsPx
                ? [FormattableString.Invariant($"Views that were left out fit worse ({leaveOneOut.ReprojectionRmsPx:0.00} px) than those that were used ({stereoRmsPx:0.00} px): capture more views, or estimate fewer distortion terms.")]
                : Array.Empty<string>(),
        ];
    }

    private static IEnumerable<string> Missing(Coverage coverage, string view) =>
        coverage.Missing.IsEmpty ? [] : [$"Capture the board so that it reaches the {string.Join(", ", coverage.Missing)} of the {view} picture: no corner was seen there, and the lens model is a guess beyond the outermost ones."];
}
