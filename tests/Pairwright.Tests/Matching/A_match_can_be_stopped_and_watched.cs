using Pairwright.Matching;
using Xunit;

namespace Pairwright.Tests.Matching;

public class A_match_can_be_stopped_and_watched
{
    [Fact]
    public void It_ends_when_it_is_asked_to_stop()
    {
        using var stop = new CancellationTokenSource();
        var progress = new Reports(share => stop.Cancel());
        Assert.ThrowsAny<OperationCanceledException>(() => TestPairs.RandomDots(150, 80, (_, _) => 5).Match(Recipe.For(new DisparityRange(0, 31)), stop.Token, progress));

        // Another thread may be about to report when this one asks to stop; none comes to the end.
        Assert.NotEmpty(progress.Shares);
        Assert.All(progress.Shares, share => Assert.True(share < 1));
    }

    [Fact]
    public void It_does_not_begin_when_it_was_stopped_before() =>
        Assert.ThrowsAny<OperationCanceledException>(() => TestPairs.RandomDots(50, 30, (_, _) => 5).Match(Recipe.For(new DisparityRange(0, 7)), new(true)));

    [Fact]
    public void Its_progress_only_grows_and_ends_at_one()
    {
        var progress = new Reports(_ => { });
        TestPairs.RandomDots(80, 50, (_, _) => 5).Match(Recipe.For(new DisparityRange(0, 15)), progress: progress);
        Assert.True(progress.Shares.Count > 2);
        Assert.Equal(progress.Shares.Order(), progress.Shares);
        Assert.Equal(1, progress.Shares[^1]);
    }

    // System.Progress hands reports to another thread; these come at once.
    private sealed class Reports(Action<double> then) : IProgress<double>
    {
        private readonly Lock gate = new();

        public List<double> Shares { get; } = [];

        public void Report(double value)
        {
            lock (gate)
            {
                Shares.Add(value);
            }

            then(value);
        }
    }
}
