using Pairwright.Geometry;

namespace Pairwright.Simulation;

/// <summary>A thing in a scene: a shape with a texture at a place.</summary>
/// <param name="Name">What it is called, so that its pixels can be asked for; need not be unique.</param>
/// <param name="Shape">Its surface, in its own frame.</param>
/// <param name="Texture">What its surface looks like, in its own frame.</param>
/// <param name="SceneFromObject">Where it is: the change from its own frame to the scene's, which is the left camera's.</param>
public sealed record SceneObject(string Name, Shape Shape, Texture Texture, Pose SceneFromObject);
