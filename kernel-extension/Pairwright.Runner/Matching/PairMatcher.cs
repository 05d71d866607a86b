using Pairwright.Imaging;
using Pairwright.Matching;
using Pairwright.Measurement;
using Pairwright.Trials;

namespace Pairwright.Runner.Matching;

/// <summary>Matches one pair and writes what was asked for.</summary>
internal static class PairMatcher
{
    /// <returns>The map, and where the truth is known how near the measured values come to it, and all of them where gaps were filled.</returns>
    /// <exception cref="UserErrorException">A file cannot be read or written, or the pair cannot be matched.</exception>
    public static PairResult Match(PairFiles files, MatchJob job, CancellationToken stop, IProgress<double> progress)
    {
        var pair = job.Rectification is { } rectification
            ? StereoPair.Read(files.Left, files.Right, rectification.Rig).Rectify(rectification)
            : RectifiedPair.Read(files.Left, files.Right, job.Geometry);
        var truth = files.Truth is { } path ? DisparityTruth.Read(path, job.TruthScale) : null;
        if (truth is not null && truth.Disparity.Size != pair.Size)
        {
            throw new UserErrorException(
                $"The true disparities '{files.Truth}' are {truth.Disparity.Size} px, but the rectified pair is {pair.Size} px; give those of the rectified left picture.");
        }

        var map = pair.Match(job.Recipe, stop, progress, job.MemoryMb);
        if (files.Filled is { } filled)
        {
            MapFile.Write(map.Disparity, files.Map);
            WhiteWhereFilled(map).WritePng(filled);
        }
        else
        {
            MapFile.Write(Measured(map), files.Map);
        }
        if (files.Sigma is { } sigma)
        {
            MapFile.Write(
                map.Sigma ?? throw new UserErrorException("The recipe states no standard uncertainty, so there is none to write; leave out --sigma or add a filter that estimates it, such as least-squares."),
                sigma);
        }

        if ((files.Depth ?? files.Cloud) is not null)
        {
            var depth = map.ToDepth();
            if (files.Depth is { } depthFile)
            {
                MapFile.Write(depth.Z, depthFile);
            }
            if (files.Cloud is { } cloud)
            {
                depth.ToCloud().ToPly(cloud);
            }
        }

        return new PairResult(
            map,
            truth is null ? null : DisparityAccuracy.Of(map, truth),
            truth is null || files.Filled is null ? null : DisparityAccuracy.Of(map, truth, withFilled: true));
    }

    /// <summary>Whatever a recipe fills in was not measured.</summary>
    private static ScalarMap Measured(DisparityMap map) =>
        ScalarMap.From(map.Size, (u, v) => map.Labels[u, v] == DisparityLabel.Measured ? map.Disparity[u, v] : float.NaN);

    private static Picture WhiteWhereFilled(DisparityMap map)
    {
        var levels = new ushort[map.Size.Area];
        for (var i = 0; i < levels.Length; i++)
        {
            levels[i] = map.Labels.Labels[i] == DisparityLabel.Filled ? byte.MaxValue : (ushort)0;
        }
        return new Picture(map.Size, levels);
    }
}
