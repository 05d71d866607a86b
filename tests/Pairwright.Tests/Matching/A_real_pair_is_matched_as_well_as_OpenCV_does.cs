using Pairwright.Matching;
using Xunit;
using Xunit.Abstractions;

namespace Pairwright.Tests.Matching;

/// <summary>Outside references: the published truth of Aloe (Middlebury 2006), and OpenCV 4.13 on the same pictures.</summary>
public class A_real_pair_is_matched_as_well_as_OpenCV_does(ITestOutputHelper output)
{
    [SkippableFact]
    public void Aloe_over_eight_paths()
    {
        var aloe = AloePair.Read();
        var recipe = Recipe.For(new DisparityRange(0, 239)) with { Optimisation = Optimisation.SemiGlobal(16, 93), Checks = [Check.LeftRight()], Filters = [Filter.Speckle(), Filter.Median] };
        var ours = aloe.SharesOf(aloe.Pair.Match(recipe).Disparity.Values);
        var theirs = aloe.SharesOf(aloe.OpenCv(240));
        output.WriteLine($"ours:   {ours}");
        output.WriteLine($"OpenCV: {theirs}");

        // Census with plain penalties gives fewer wrong matches and fewer matches than a cost on gradients.
        Assert.InRange(ours.MatchedBeyondTwo, 0, theirs.MatchedBeyondTwo);
        Assert.InRange(ours.MatchedBeyondOne, 0, 1.05 * theirs.MatchedBeyondOne);
        Assert.InRange(ours.AllBeyondTwo, 0, 1.25 * theirs.AllBeyondTwo);
        Assert.InRange(ours.AllBeyondOne, 0, 1.25 * theirs.AllBeyondOne);
    }
}
