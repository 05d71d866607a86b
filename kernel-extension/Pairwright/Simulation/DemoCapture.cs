using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>One capture of the demo: where it goes, and how to take it.</summary>
/// <param name="Folder">The folder below the demo's own.</param>
/// <param name="Name">What is added to "left_" and "right_" to name the files.</param>
/// <param name="Take">Takes the capture; always the same one.</param>
public sealed record DemoCapture(string Folder, string Name, Func<CancellationToken, StereoPair> Take);
