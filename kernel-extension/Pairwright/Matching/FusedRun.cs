using Pairwright.Imaging;

namespace Pairwright.Matching;

/// <summary>One match by two sweeps that meet in the middle.</summary>
/// <remarks>
/// One worker sweeps down the upper half while the other sweeps up the lower half, both storing sums. Then each goes on into the other's half, where
/// the sums of the other direction already stand, and chooses winners on the way. With less memory the halves are cut into strips: in the
/// first pass a worker keeps only its state at the strips' edges, and in the second the sums of a strip are made again from there just before
/// they are needed. The numbers are the same either way.
/// </remarks>
internal sealed unsafe class FusedRun<TLanes, TBytes, TWords, TTable> : IDisposable
    where TLanes : struct, ILanes<TBytes, TWords, TTable>
    where TBytes : unmanaged
    where TWords : unmanaged
    where TTable : unmanaged
{
    private readonly RectifiedPair pair;
    private readonly Recipe recipe;
    private readonly WorkingMap map;
    private readonly FusedCost cost;
    private readonly FusedLayout layout;
    private readonly FusedPenalties penalties;
    private readonly RowCounter counter;
    private readonly CancellationToken stop;
    private readonly ParallelOptions threads;
    private readonly Half down;
    private readonly Half up;

    public FusedRun(RectifiedPair pair, Recipe recipe, FusedCost cost, MatcherSettings settings, WorkingMap map, CancellationToken stop, IProgress<double>? progress)
    {
        (this.pair, this.recipe, this.cost, this.map, this.stop) = (pair, recipe, cost, map, stop);
        layout = new(pair.Size, recipe.Range, TLanes.Bytes, cost.Paths, cost.LargePenalty);
        var plan = FusedPlan.For(layout, settings, FusedSweep<TLanes, TBytes, TWords, TTable>.StateBytes(layout));
        penalties = cost.Penalties();
        counter = new(plan.Sweeps * pair.Size.Height, progress);
        threads = new() { MaxDegreeOfParallelism = Math.Min(settings.Threads, 2), CancellationToken = stop };
        var middle = pair.Size.Height / 2;
        down = new(this, plan, forwards: true, [.. Enumerable.Range(0, middle)]);
        up = new(this, plan, forwards: false, [.. Enumerable.Range(middle, pair.Size.Height - middle).Reverse()]);
    }

    public void Run()
    {
        Parallel.Invoke(threads, down.Approach, up.Approach);
        Parallel.Invoke(threads, () => down.Continue(up), () => up.Continue(down));
    }

    public void Dispose()
    {
        down.Dispose();
        up.Dispose();
        penalties.Dispose();
    }

    /// <summary>One direction: its first half of the rows, and then the other direction's.</summary>
    private sealed class Half : IDisposable
    {
        private readonly FusedRun<TLanes, TBytes, TWords, TTable> run;
        private readonly bool forwards;
        private readonly int[][] strips;
        private readonly FusedCostLine<TLanes, TBytes, TWords, TTable> costs;
        private readonly FusedSweep<TLanes, TBytes, TWords, TTable> sweep;
        private readonly AlignedMemory sums;
        private readonly AlignedMemory? states;
        private readonly int[] rowsBefore;

        public Half(FusedRun<TLanes, TBytes, TWords, TTable> run, FusedPlan plan, bool forwards, int[] rows)
        {
            (this.run, this.forwards) = (run, forwards);
            strips = [.. rows.Chunk(plan.StripRows)];
            (costs, sweep) = Sweep(forwards);
            sums = WorkingMemory.Rent(plan.SumBytes);
            states = plan.Stores ? null : new(strips.Length * FusedSweep<TLanes, TBytes, TWords, TTable>.StateBytes(run.layout));
            rowsBefore = new int[strips.Length];
        }

        /// <summary>Sweeps this direction's own half.</summary>
        public void Approach()
        {
            sweep.Begin();
            for (var i = 0; i < strips.Length; i++)
            {
                if (states is not null)
                {
                    sweep.Save(State(i), out rowsBefore[i]);
                }

                foreach (var v in strips[i])
                {
                    if (states is null)
                    {
                        sweep.Store(v, sums.Start + Place(v));
                    }
                    else
                    {
                        sweep.Pass(v);
                    }

                    run.counter.Add(run.stop);
                }
            }
        }

        /// <summary>Goes on into the other direction's half and chooses its winners.</summary>
        public void Continue(Half other)
        {
            var row = new RowMatches(run.pair, run.recipe.Range);
            using var decision = new FusedDecision<TLanes, TBytes, TWords, TTable>(run.layout, costs, row, run.cost.LargestTotal);
            var (helperCosts, helper) = other.states is null ? default : Sweep(other.forwards);
            using (helperCosts)
            using (helper)
            {
                for (var i = other.strips.Length - 1; i >= 0; i--)
                {
                    if (helper is not null)
                    {
                        helper.Restore(other.State(i), other.rowsBefore[i]);
                        foreach (var v in other.strips[i])
                        {
                            helper.Store(v, sums.Start + Place(v));
                            run.counter.Add(run.stop);
                        }
                    }

                    var stored = helper is null ? other : this;
                    foreach (var v in other.strips[i].Reverse())
                    {
                        row.V = v;
                        sweep.Decide(v, stored.sums.Start + stored.Place(v), decision);
                        decision.End();
                        RowFinish.Apply(row, run.recipe, run.map, run.stop);
                        run.counter.Add(run.stop);
                    }
                }
            }
        }

        public void Dispose()
        {
            sweep.Dispose();
            costs.Dispose();
            WorkingMemory.Return(sums);
            states?.Dispose();
        }

        private (FusedCostLine<TLanes, TBytes, TWords, TTable> Costs, FusedSweep<TLanes, TBytes, TWords, TTable> Sweep) Sweep(bool forwards)
        {
            var lines = run.cost.Lines<TLanes, TBytes, TWords, TTable>(run.layout);
            return (lines, new(run.layout, lines, forwards, run.penalties));
        }

        private byte* State(int strip) => states!.Start + strip * FusedSweep<TLanes, TBytes, TWords, TTable>.StateBytes(run.layout);

        // Rows of one strip stand at places of their own, whichever direction fills them: a strip's rows follow each other.
        private long Place(int v) => v % (sums.Bytes / run.layout.RowBytes) * run.layout.RowBytes;
    }
}
