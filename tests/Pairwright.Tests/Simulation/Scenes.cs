using Pairwright.Geometry;
using Pairwright.Simulation;

namespace Pairwright.Tests.Simulation;

/// <summary>Scenes and rigs that the tests of the simulator share.</summary>
internal static class Scenes
{
    /// <summary>A verged rig with distorting lenses.</summary>
    public static Rig Verged { get; } = SimulatedRig.SideBySide(new(200, 150), 260, 90, vergenceDegrees: 3, new(-0.15, 0.06, 0.0008, -0.0005));

    /// <summary>Two parallel cameras without distortion: rectification turns nothing.</summary>
    public static Rig Parallel { get; } = SimulatedRig.SideBySide(new(200, 150), 260, 90);

    public static Scene BoxAndBall { get; } = Scene.BoxAndBall(1000);

    public static Scene Planks { get; } = TarnHollow.Planks(TarnHollow.PlankScenes[2].Planks);
}
