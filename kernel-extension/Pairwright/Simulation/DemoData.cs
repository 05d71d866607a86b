using System.Collections.Immutable;
using System.Globalization;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Simulation;

/// <summary>Writes the captures of the invented site to a folder: the demo that the worked notebooks run on.</summary>
public static class DemoData
{
    /// <summary>Writes everything; the same files on every machine but for the last grey level of a few pixels.</summary>
    /// <param name="folder">The folder, made when it is missing; files of the demo's names are replaced.</param>
    /// <param name="progress">Told the share done, 0 to 1, after each capture.</param>
    /// <param name="stop">Asks to stop between captures.</param>
    /// <exception cref="UserErrorException">The folder cannot be written.</exception>
    /// <exception cref="OperationCanceledException">It was asked to stop.</exception>
    public static void Write(string folder, IProgress<double>? progress = null, CancellationToken stop = default)
    {
        ArgumentNullException.ThrowIfNull(folder);
        ImmutableArray<DemoCapture> captures = [.. TarnHollow.Captures()];
        RigFile.Write(TarnHollow.Rig, Path.Combine(folder, "rig-true.yaml"));
        TarnHollow.StepSheet().Write(Path.Combine(folder, "step-block", "scene.yaml"));
        foreach (var (name, planks) in TarnHollow.PlankScenes)
        {
            TarnHollow.PlankSheet(planks).Write(Path.Combine(folder, name, "scene.yaml"));
        }

        TarnHollow.PlankSheet(TarnHollow.PlankScenes[0].Planks).Write(Path.Combine(folder, "repeats", "scene.yaml"));
        AtomicFile.WriteText(Path.Combine(folder, "README.md"), Description());
        for (var i = 0; i < captures.Length; i++)
        {
            stop.ThrowIfCancellationRequested();
            var pair = captures[i].Take(stop);
            foreach (var view in Enum.GetValues<View>())
            {
                pair[view].WritePng(PathOf(folder, captures[i], view));
            }

            progress?.Report((i + 1.0) / (captures.Length + TarnHollow.PlankScenes.Length));
        }

        var rectification = Rectification.Of(TarnHollow.Rig);
        for (var i = 0; i < TarnHollow.PlankScenes.Length; i++)
        {
            var (name, planks) = TarnHollow.PlankScenes[i];
            var truth = TarnHollow.Planks(planks).Truth(rectification, cancellation: stop);
            MapFile.Write(truth.Disparity, Path.Combine(folder, name, "truth-disparity.png"), TruthFactor);
            new Picture(truth.Disparity.Size, Array.ConvertAll(truth.Occluded.Usable.ToArray(), hidden => (ushort)(hidden ? 255 : 0)))
                .WritePng(Path.Combine(folder, name, "truth-occluded.png"));
            progress?.Report((captures.Length + i + 1.0) / (captures.Length + TarnHollow.PlankScenes.Length));
        }
    }

    /// <summary>The file of one view of a capture.</summary>
    /// <param name="folder">The demo's folder.</param>
    /// <param name="capture">The capture.</param>
    /// <param name="view">The view.</param>
    public static string PathOf(string folder, DemoCapture capture, View view)
    {
        ArgumentNullException.ThrowIfNull(capture);
        return Path.Combine(folder, capture.Folder, $"{view.ToString().ToLowerInvariant()}_{capture.Name}.png");
    }

    // Disparities of the demo reach about 300 px: 1/200 px is finer than any matcher and fits 16 bits.
    private const double TruthFactor = 200;

    private static string Description() => string.Create(CultureInfo.InvariantCulture, $"""
        # Captures of Tarn Hollow, an invented sawmill

        At the outfeed of the mill a stereo rig looks down on the belt from {TarnHollow.BeltMm:0} mm and measures how much planks are cupped and
        twisted; the promise is 1.5 mm. Nothing here was photographed: the pictures come from the simulator, so that the truth is
        known exactly. `kernel-extension/pairwright demo-data data-demo` makes this folder again.

        | folder | what is in it |
        | --- | --- |
        | `boards` | the calibration board, {TarnHollow.BoardCornersAcross} × {TarnHollow.BoardCornersDown} inner corners, squares of {TarnHollow.BoardSquareMm:0} mm, in fourteen poses |
        | `step-block` | three steps of {string.Join(", ", TarnHollow.StepHeightsMm)} mm on the belt |
        | `planks-1`, `planks-2`, `planks-3` | three planks each; two of `planks-3` are beyond 1.5 mm |
        | `repeats` | the scene of `planks-1` five times, with nothing changed but the noise |
        | `knock-pitch`, `knock-yaw` | a board and the planks of `planks-2` after the right camera was turned against the left one by 0.08° in pitch, by 0.05° in yaw |

        Pictures are named `left_NAME.png` and `right_NAME.png`, 960 × 720 pixels, 8 bits, with lens distortion, blur and noise. `scene.yaml` beside
        them names regions of the left picture and their true values in millimetres: `cup` is the sagitta of the surface across the grain over the
        plank's width, positive where the edges stand up; `twist` is the distance of the fourth corner from the plane of the other three,
        positive where, looking along the plank, the far corner at the right stands up.
        `truth-disparity.png` holds the true disparity times {TruthFactor:0} (0: none) at the pixels of the left picture rectified by the true rig, `truth-occluded.png`
        is 255 where the right camera does not see the point. `rig-true.yaml` is the true rig; what a calibration finds differs from it by its uncertainty.

        """);
}
