using Pairwright.Measurement;
using Xunit;

namespace Pairwright.Tests.Measurement;

public class Random_trials_follow_the_guide
{
    [Fact]
    public void Four_normal_inputs_add_to_a_normal_output()
    {
        // JCGM 101:2008, 9.2.2, typed from memory: four standard normal inputs; u = 2.00, 95 % interval ±3.92.
        var result = MonteCarlo.Propagate(draw => Enumerable.Range(0, 4).Sum(_ => draw.Normal(0, 1)));
        Assert.Equal(2.00, result.StandardUncertainty, 0.015);
        Assert.Equal(-3.92, result.SymmetricInterval().Low, 0.05);
        Assert.Equal(3.92, result.SymmetricInterval().High, 0.05);
    }

    [Fact]
    public void Four_rectangular_inputs_reach_less_far_than_normal_ones()
    {
        // JCGM 101:2008, 9.2.3, typed from memory: rectangular inputs of σ = 1; u = 2.00, 95 % interval ±3.88.
        var result = MonteCarlo.Propagate(draw => Enumerable.Range(0, 4).Sum(_ => draw.Rectangular(-Math.Sqrt(3), Math.Sqrt(3))));
        Assert.Equal(2.00, result.StandardUncertainty, 0.015);
        Assert.Equal(3.88, result.SymmetricInterval().High, 0.04);
    }

    [Fact]
    public void The_mass_calibration_shows_where_the_linear_law_falls_short()
    {
        // JCGM 101:2008, 9.3, typed from memory: estimate 1.2341 mg, u = 0.0754 mg, shortest 95 % interval [1.0834, 1.3825] mg.
        var result = MonteCarlo.Propagate(
            draw =>
            {
                var (reference, added) = (draw.Normal(100_000, 0.050), draw.Normal(1.234, 0.020));
                var (air, ofWeight, ofReference) = (draw.Rectangular(1.10, 1.30), draw.Rectangular(7000, 9000), draw.Rectangular(7950, 8050));
                return (reference + added) * (1 + (air - 1.2) * (1 / ofWeight - 1 / ofReference)) - 100_000;
            },
            trials: 400_000,
            seed: 7);
        Assert.Equal(1.2341, result.Mean, 0.0006);
        Assert.Equal(0.0754, result.StandardUncertainty, 0.0004);
        Assert.Equal(1.0834, result.ShortestInterval().Low, 0.004);
        Assert.Equal(1.3825, result.ShortestInterval().High, 0.004);
    }

    [Fact]
    public void The_same_seed_gives_the_same_result()
    {
        MonteCarloResult Run(int seed) => MonteCarlo.Propagate(draw => draw.Student(0, 1, 5), 1000, seed);
        Assert.Equal(Run(4).Mean, Run(4).Mean);
        Assert.NotEqual(Run(4).Mean, Run(5).Mean);
    }

    [Fact]
    public void Rigs_are_drawn_with_their_covariance()
    {
        var rig = TestRig.Of();
        var draw = new MonteCarloDraw(2);
        var drawn = Enumerable.Range(0, 2000).Select(_ => draw.Rig(rig)).ToArray();
        double Spread(Func<Pairwright.Geometry.Rig, double> parameter)
        {
            var values = drawn.Select(parameter).ToArray();
            return Math.Sqrt(values.Sum(value => Math.Pow(value - values.Average(), 2)) / (values.Length - 1));
        }

        // 5 σ of a standard deviation from 2,000 draws.
        var tolerance = 5 / Math.Sqrt(2 * 2000.0);
        Assert.Equal(1, Spread(r => r.Left.Matrix.FocalU) / rig.StandardUncertainty(0), tolerance);
        Assert.Equal(1, Spread(r => r.Right.Distortion.K1) / rig.StandardUncertainty(16), tolerance);
        Assert.Equal(1, Spread(r => r.RightFromLeft.Translation.X) / rig.StandardUncertainty(27), tolerance);
    }
}
