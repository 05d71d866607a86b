using System.Collections.Immutable;

namespace Pairwright.Geometry;

/// <summary>The order of a rig's parameters in vectors and covariance matrices.</summary>
/// <remarks>
/// Twelve per camera, left first (FocalU, FocalV, CentreU, CentreV, K1, K2, P1, P2, K3, K4, K5, K6), then the rotation vector of
/// RightFromLeft in radians as a small turn applied after its rotation, then its translation in millimetres.
/// </remarks>
public static class RigParameters
{
    /// <summary>The number of parameters.</summary>
    public const int Count = 30;

    /// <summary>Where the right camera's parameters begin.</summary>
    public const int RightCamera = 12;

    /// <summary>Where the three of the rotation begin.</summary>
    public const int RotationStart = 24;

    /// <summary>Where the three of the translation begin.</summary>
    public const int TranslationStart = 27;

    /// <summary>The names, in order.</summary>
    public static ImmutableArray<string> Names { get; } =
    [
        .. new[] { "left", "right" }.SelectMany(view =>
            new[] { "focal u", "focal v", "centre u", "centre v", "k1", "k2", "p1", "p2", "k3", "k4", "k5", "k6" }.Select(name => $"{view} {name}")),
        "rotation x", "rotation y", "rotation z", "translation x", "translation y", "translation z",
    ];

    /// <summary>The units, in order: px, none (empty), rad or mm.</summary>
    public static ImmutableArray<string> Units { get; } =
    [
        .. Enumerable.Range(0, 2).SelectMany(_ => Enumerable.Repeat("px", 4).Concat(Enumerable.Repeat("", 8))),
        "rad", "rad", "rad", "mm", "mm", "mm",
    ];
}
