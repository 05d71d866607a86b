using System.Runtime.ExceptionServices;
using System.Runtime.Intrinsics;
using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>Semi-global matching of whole-number costs without a stored cost volume, vectorised: the same maps as <see cref="PlainMatcher"/> bit for bit.</summary>
internal static class FusedMatcher
{
    /// <summary>Matches where the recipe is of the kind that is fused.</summary>
    /// <returns>Whether it is.</returns>
    public static bool TryRun(RectifiedPair pair, Recipe recipe, MatcherSettings settings, WorkingMap map, CancellationToken stop, IProgress<double>? progress)
    {
        if (recipe.Cost is WindowCost cost)
        {
            pair.MustHold(cost.Window);
        }

        if (FusedCost.Of(pair, recipe) is not { } fused)
        {
            return false;
        }

        var bits = settings.VectorBits != 0 ? settings.VectorBits : Lanes512.Pays ? 512 : 256;
        switch (bits)
        {
            case 512:
                Run<Lanes512, Vector512<byte>, Vector512<ushort>, Vector512<byte>>(pair, recipe, fused, settings, map, stop, progress);
                break;
            case 256:
                Run<Lanes256, Vector256<byte>, Vector256<ushort>, Vector256<byte>>(pair, recipe, fused, settings, map, stop, progress);
                break;
            default:
                Run<Lanes8, byte, ushort, nint>(pair, recipe, fused, settings, map, stop, progress);
                break;
        }

        return true;
    }

    private static void Run<TLanes, TBytes, TWords, TTable>(
        RectifiedPair pair, Recipe recipe, FusedCost cost, MatcherSettings settings, WorkingMap map, CancellationToken stop, IProgress<double>? progress)
        where TLanes : struct, ILanes<TBytes, TWords, TTable>
        where TBytes : unmanaged
        where TWords : unmanaged
        where TTable : unmanaged
    {
        try
        {
            using var run = new FusedRun<TLanes, TBytes, TWords, TTable>(pair, recipe, cost, settings, map, stop, progress);
            run.Run();
        }
        catch (AggregateException several)
        {
            // Both threads may have met the same trouble; one sentence tells it.
            ExceptionDispatchInfo.Throw(several.InnerExceptions[0]);
        }
    }
}
