namespace Pairwright.Geometry;

/// <summary>A pose told from an essential matrix and matches; the length of its translation is one, for matches tell no scale.</summary>
/// <param name="RightFromLeft">X_right = R·X_left + t with ‖t‖ = 1.</param>
/// <param name="InFrontOfBoth">How many matches lie in front of both cameras in this pose.</param>
/// <param name="Matches">How many matches were given.</param>
public readonly record struct RecoveredPose(Pose RightFromLeft, int InFrontOfBoth, int Matches);
