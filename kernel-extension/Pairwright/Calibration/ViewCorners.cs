using System.Collections.Immutable;
using Pairwright.Geometry;

namespace Pairwright.Calibration;

/// <summary>The measured corners of one view in an adjustment; empty where a camera did not see the board.</summary>
internal readonly record struct ViewCorners(ImmutableArray<RawPixel> Left, ImmutableArray<RawPixel> Right);
