using Pairwright.Geometry;
using Xunit;

namespace Pairwright.Tests.Geometry;

public sealed class DistortionTests
{
    public static TheoryData<string, Distortion> Lenses => new()
    {
        { "strong barrel", new(k1: -0.4, k2: 0.08) },
        { "barrel that folds", new(k1: -0.9) },
        { "strong pincushion", new(k1: 0.8, k2: 0.4, k3: 0.2) },
        { "pincushion that folds far out", new(k1: 0.3, k2: -0.05) },
        { "wide rational", new(k1: 8, k2: 5, k3: 0.3, k4: 8.3, k5: 6.8, k6: 1.1) },
        { "rational with a pole", new(k1: 0.1, k4: -0.2) },
        { "tangential", new(p1: 0.02, p2: -0.03) },
        { "all terms", new(k1: -0.35, k2: 0.15, p1: 0.004, p2: -0.006, k3: -0.02, k4: 0.05, k5: -0.01, k6: 0.002) },
    };

    [Theory]
    [MemberData(nameof(Lenses))]
    public void Undistorting_finds_every_direction_of_the_valid_field_again(string name, Distortion lens)
    {
        var random = new Random(21);
        for (var i = 0; i < 5000; i++)
        {
            // To the very edge, where barrels hardly stretch any more and rounding is amplified.
            var radius = Math.Min(lens.ValidRadius, 5) * Math.Sqrt(random.NextDouble());
            var angle = 2 * Math.PI * random.NextDouble();
            var (x, y) = (radius * Math.Cos(angle), radius * Math.Sin(angle));
            var (distortedX, distortedY) = lens.Distort(x, y);
            var found = lens.Undistort(distortedX, distortedY);
            Assert.True(found is not null, $"{name}: ({x}, {y}) is refused");
            var (againX, againY) = lens.Distort(found.Value.X, found.Value.Y);
            var length = Math.Sqrt(distortedX * distortedX + distortedY * distortedY);
            Assert.InRange(Math.Abs(againX - distortedX) + Math.Abs(againY - distortedY), 0, 1e-14 * (1 + length));
            if (radius < 0.95 * lens.ValidRadius)
            {
                Assert.InRange(Math.Abs(found.Value.X - x) + Math.Abs(found.Value.Y - y), 0, 1e-12 * (1 + radius));
            }
        }
    }

    [Theory]
    [MemberData(nameof(Lenses))]
    public void What_undistorts_lies_in_the_valid_field_and_distorts_back(string name, Distortion lens)
    {
        var random = new Random(22);
        var refused = 0;
        for (var i = 0; i < 5000; i++)
        {
            var (x, y) = (RandomRigs.Between(random, -3, 3), RandomRigs.Between(random, -3, 3));
            if (lens.Undistort(x, y) is not var (a, b))
            {
                refused++;
                continue;
            }

            Assert.True(a * a + b * b <= lens.ValidRadius * lens.ValidRadius * (1 + 1e-9), name);
            var (againX, againY) = lens.Distort(a, b);
            Assert.InRange(Math.Abs(againX - x) + Math.Abs(againY - y), 0, 1e-13);
        }

        Assert.True(refused < 5000, name);
    }

    /// <summary>By hand: r·(1 + k1·r²) stops growing where 1 + 3·k1·r² = 0.</summary>
    [Theory]
    [InlineData(-0.3)]
    [InlineData(-0.01)]
    [InlineData(-2.5)]
    public void The_valid_field_of_a_one_term_barrel_ends_where_its_slope_does(double k1) =>
        Assert.Equal(Math.Sqrt(-1 / (3 * k1)), new Distortion(k1: k1).ValidRadius, 12);

    /// <summary>By hand: a lens of tangential terms alone, with p² = P1² + P2², folds where 6·p·r = 1.</summary>
    [Fact]
    public void The_valid_field_of_a_tangential_lens_ends_where_it_folds() =>
        Assert.Equal(1 / (6 * 0.05), new Distortion(p1: 0.03, p2: 0.04).ValidRadius, 12);

    /// <summary>By hand: the denominator 1 + k4·r² is zero at r² = 5.</summary>
    [Fact]
    public void The_valid_field_of_a_rational_lens_ends_before_its_pole() =>
        Assert.InRange(new Distortion(k1: 0.1, k4: -0.2).ValidRadius, 0.5, Math.Sqrt(5));

    /// <summary>By hand: r·(1 + 0.3·r²) reaches 50 at r = 5.3 or so, where the image is 88.9° off the axis.</summary>
    [Fact]
    public void A_pincushion_lens_is_valid_until_its_image_is_as_far_out_as_any_camera_sees()
    {
        var lens = new Distortion(k1: 0.3);
        Assert.Equal(50, lens.Distort(lens.ValidRadius, 0).X, 9);
        Assert.Equal(50, Distortion.None.ValidRadius, 9);
    }

    /// <summary>The derivative, taken by differences, keeps its orientation and never shrinks to nothing inside the valid field.</summary>
    [Theory]
    [MemberData(nameof(Lenses))]
    public void Inside_the_valid_field_the_lens_never_folds(string name, Distortion lens)
    {
        const double h = 1e-6;
        var random = new Random(23);
        for (var i = 0; i < 5000; i++)
        {
            var radius = 0.999 * Math.Min(lens.ValidRadius, 5) * Math.Sqrt(random.NextDouble());
            var angle = 2 * Math.PI * random.NextDouble();
            var (x, y) = (radius * Math.Cos(angle), radius * Math.Sin(angle));
            var ((x1, y1), (x2, y2)) = (lens.Distort(x + h, y), lens.Distort(x - h, y));
            var ((x3, y3), (x4, y4)) = (lens.Distort(x, y + h), lens.Distort(x, y - h));
            var determinant = ((x1 - x2) * (y3 - y4) - (x3 - x4) * (y1 - y2)) / (4 * h * h);
            Assert.True(determinant > 0, $"{name}: folds at ({x}, {y})");
        }
    }
}
