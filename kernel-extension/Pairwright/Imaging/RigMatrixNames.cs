namespace Pairwright.Imaging;

/// <summary>The names under which a file of matrices holds a rig.</summary>
/// <param name="LeftCameraMatrix">The left camera's matrix, 3 × 3, in pixels.</param>
/// <param name="LeftDistortion">The left lens's terms in the order k1, k2, p1, p2, k3, k4, k5, k6; later ones may be missing.</param>
/// <param name="RightCameraMatrix">The right camera's matrix.</param>
/// <param name="RightDistortion">The right lens's terms.</param>
/// <param name="Rotation">The rotation of the right camera from the left one, a 3 × 3 matrix or a vector in radians.</param>
/// <param name="Translation">The translation of the right camera from the left one, three numbers.</param>
public sealed record RigMatrixNames(
    string LeftCameraMatrix = "M1",
    string LeftDistortion = "D1",
    string RightCameraMatrix = "M2",
    string RightDistortion = "D2",
    string Rotation = "R",
    string Translation = "T");
