using System.Collections.Immutable;

namespace Pairwright.Measurement;

/// <summary>The signed effects of one shared cause, such as a rig's calibration errors, on a measured value.</summary>
/// <param name="Source">
/// What is shared: the <see cref="Pairwright.Geometry.Rig"/>, or a token of its own for a common uncertainty that was stated without a source.
/// </param>
/// <param name="Effects">
/// What one standard deviation along each independent axis of the cause does to the value, in the value's unit. For a rig the axes are
/// its <see cref="Pairwright.Geometry.Rig.PrincipalChanges"/>, in order. The common standard uncertainty is the root of the sum of their squares.
/// </param>
public sealed record CommonPart(object Source, ImmutableArray<double> Effects);
