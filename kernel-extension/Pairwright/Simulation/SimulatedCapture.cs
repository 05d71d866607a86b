using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>A capture of a simulated scene, with what is truly there.</summary>
public sealed class SimulatedCapture
{
    internal SimulatedCapture(Scene scene, Rig rig, StereoPair pair) => (Scene, Rig, Pair) = (scene, rig, pair);

    /// <summary>What was captured.</summary>
    public Scene Scene { get; }

    /// <summary>The rig that took it.</summary>
    public Rig Rig { get; }

    /// <summary>The pictures as the lenses formed them.</summary>
    public StereoPair Pair { get; }

    /// <summary>What the rectified pair truly shows.</summary>
    /// <param name="rectification">How the pair is rectified.</param>
    public SceneTruth Truth(Rectification rectification) => Scene.Truth(rectification);
}
