namespace Pairwright.Calibration;

/// <summary>What a calibration estimates for each camera; the pose between the cameras is always estimated.</summary>
/// <remarks>Fewer terms are steadier where the boards did not reach the corners of the picture; leave-one-view-out figures tell which is better.</remarks>
public sealed record CalibrationModel
{
    /// <summary>The distortion terms that are estimated, the same for both cameras.</summary>
    public LensTerms Terms { get; init; } = LensTerms.FiveTerms;

    /// <summary>Whether pixels are held square, so that one focal length serves both directions.</summary>
    public bool SquarePixels { get; init; }

    /// <summary>Five distortion terms (k1, k2, p1, p2, k3), two focal lengths and the principal point.</summary>
    public static CalibrationModel FiveTerms { get; } = new();

    /// <summary>The five terms and the rational denominator (k4, k5, k6), for wide lenses.</summary>
    public static CalibrationModel Rational { get; } = new() { Terms = LensTerms.EightTerms };

    /// <summary>Two radial terms alone, for narrow lenses and few views.</summary>
    public static CalibrationModel TwoRadialTerms { get; } = new() { Terms = LensTerms.K1 | LensTerms.K2 };

    /// <summary>The model in words.</summary>
    public override string ToString() => $"distortion {(Terms == LensTerms.None ? "none" : Words())}, {(SquarePixels ? "square pixels" : "two focal lengths")}";

    private string Words() => string.Join(
        " ",
        new[] { (LensTerms.K1, "k1"), (LensTerms.K2, "k2"), (LensTerms.Tangential, "p1 p2"), (LensTerms.K3, "k3"), (LensTerms.K4, "k4"), (LensTerms.K5, "k5"), (LensTerms.K6, "k6") }
            .Where(term => Terms.HasFlag(term.Item1)).Select(term => term.Item2));
}
