using Pairwright.Geometry;
using Pairwright.Matching;
using Pairwright.Simulation;
using Pairwright.Tests.Imaging;
using Xunit;

namespace Pairwright.Tests.Matching;

public class Recipes_survive_their_files
{
    private static readonly DisparityRange Range = new(-3, 40);

    /// <summary>Every stage that is built in, with settings that are not the usual ones.</summary>
    private static readonly Recipe[] Recipes =
    [
        Recipe.For(Range),
        Recipe.For(Range) with { Cost = Cost.Census(5, 3), Checks = [], Filters = [] },
        Recipe.For(Range) with { Cost = Cost.Zncc(7), SubPixel = SubPixel.None, Optimisation = Optimisation.SemiGlobal(0.125, 1.0 / 3) },
        Recipe.For(Range) with { SubPixel = SubPixel.Equiangular, Checks = [Check.LeftRight(0), Check.Uniqueness(0.1)] },
        Recipe.For(Range) with { Cost = Cost.CentreSymmetricCensus(7, 5) },
        Recipe.For(Range) with { Optimisation = Optimisation.WinnerTakesAll },
        Recipe.For(Range) with { Optimisation = Optimisation.SemiGlobal(paths: 16, flatLevels: 12.5) },
        Recipe.For(Range) with { Optimisation = Optimisation.SemiGlobalWithTwoParents(1, 8, 10) },
        Recipe.For(Range) with { Confidence = Confidence.Curvature },
        Recipe.For(Range) with { Confidence = Confidence.LeftRight },
        Recipe.For(Range) with { Filters = [Filter.PlainTexture(7, 2.5), Filter.WeightedMedian(11, 8), Filter.Fill] },
        Recipe.For(Range) with { Cost = Cost.Rank(5) },
        Recipe.For(Range) with { Cost = Cost.AbsoluteDifference(25.5) },
        Recipe.For(Range) with { Cost = Cost.AbsoluteDifference() },
        Recipe.For(Range) with { Cost = Cost.SamplingInsensitiveDifference(20) },
        Recipe.For(Range) with { Cost = Cost.ZeroMeanSad(9) },
        Recipe.For(Range) with { Cost = Cost.Ssd(3) },
        Recipe.For(Range) with { Cost = Cost.Ncc(13) },
        Recipe.For(Range) with { Cost = Cost.Gradient(8) },
        Recipe.For(Range) with { Cost = Cost.DifferenceAndGradient(0.8, 9, 3) },
        Recipe.For(Range) with { Cost = Cost.AdCensus(20, 12) },
        Recipe.For(Range) with { Filters = [Filter.Median, Filter.Speckle(12, 0.7), Filter.Median] },
    ];

    public static TheoryData<int> Indices => [.. Enumerable.Range(0, Recipes.Length)];

    [Theory]
    [MemberData(nameof(Indices))]
    public void A_recipe_comes_back_equal(int index)
    {
        using var folder = new TestFolder();
        var recipe = Recipes[index];
        RecipeFile.Write(recipe, folder.Path("recipe.yaml"));
        var back = RecipeFile.Read(folder.Path("recipe.yaml"));
        Assert.Equal(recipe, back);
        Assert.Equal(recipe.Id, back.Id);
        Assert.Empty(recipe.DifferenceTo(back));
    }

    [Fact]
    public void Every_built_in_stage_is_among_the_recipes_that_come_back()
    {
        var tried = Recipes.SelectMany(recipe => recipe.Stages).Select(stage => stage.GetType()).ToHashSet();
        var builtIn = typeof(Stage).Assembly.GetTypes()
            .Where(type => type.IsSubclassOf(typeof(Stage)) && !type.IsAbstract)
            .Where(type => !type.GetConstructors().SelectMany(maker => maker.GetParameters()).Any(parameter => parameter.ParameterType.IsSubclassOf(typeof(Delegate))));
        Assert.Empty(builtIn.Where(type => !tried.Contains(type)).Select(type => type.Name));
    }

    [Fact]
    public void A_file_without_a_range_takes_the_range_of_whoever_reads_it()
    {
        using var folder = new TestFolder();
        RecipeFile.Write(Recipes[1], folder.Path("recipe.yaml"), withRange: false);
        Assert.Equal(Recipes[1] with { Range = new(5, 9) }, RecipeFile.Read(folder.Path("recipe.yaml"), new DisparityRange(5, 9)));
        Assert.Contains("no search range", Refusal(() => RecipeFile.Read(folder.Path("recipe.yaml"))));
    }

    [Fact]
    public void A_file_reads_as_a_person_would_type_it()
    {
        using var folder = new TestFolder();
        var path = folder.Write(
            "typed.yaml",
            """
            kind: pairwright-recipe
            version: 1
            range: [0, 63]
            cost: {method: census, width: 7, height: 7}
            aggregation: {method: none}
            optimisation: {method: semi-global}
            sub-pixel: {method: parabola}
            checks: [{method: uniqueness, margin: 0.05}, {method: left-right, tolerance-px: 1}]
            filters: [{method: speckle, smallest-px: 100, step-px: 1}, {method: median}, {method: least squares, window: 13}]
            """);
        Assert.Equal(Recipe.For(new DisparityRange(0, 63)) with { Cost = Cost.Census(7, 7) }, RecipeFile.Read(path));
    }

    [Fact]
    public void A_stage_from_a_cell_is_named_by_the_file_and_given_again_on_reading()
    {
        using var folder = new TestFolder();
        var path = folder.Path("own.yaml");
        var recipe = Recipe.For(Range) with { Cost = new OwnCost(30) };
        RecipeFile.Write(recipe, path);
        Assert.Equal(recipe, RecipeFile.Read(path, ownStages: [new OwnCost(30)]));
        Assert.Contains("unknown cost 'own difference'", Refusal(() => RecipeFile.Read(path)));
        Assert.Contains("'limit 30'", Refusal(() => RecipeFile.Read(path, ownStages: [new OwnCost(20)])));
    }

    [Fact]
    public void A_delegate_is_known_by_its_text_even_over_several_lines()
    {
        using var folder = new TestFolder();
        var path = folder.Path("own.yaml");
        var cost = Cost.FromPixels((l, r) =>
        {
            var difference = "\\".Length * Math.Abs(l - r);
            return Math.Min(difference, 20);
        });
        var recipe = Recipe.For(Range) with { Cost = cost };
        RecipeFile.Write(recipe, path);
        Assert.Equal(recipe, RecipeFile.Read(path, ownStages: [cost]));
        Assert.Contains("Math.Min(difference, 20)", cost.ToString());
    }

    [Theory]
    [InlineData("version: 1", "version: 2", "newer")]
    [InlineData("kind: pairwright-recipe", "kind: pairwright-rig", "pairwright-recipe")]
    [InlineData("method: census", "method: sensus", "line 6: the entry 'cost' names an unknown cost 'sensus'")]
    [InlineData("method: speckle", "method: left-right", "unknown filter 'left-right'")]
    [InlineData("width: 9", "width: 8", "odd")]
    [InlineData("width: 9", "width: nine", "'nine'")]
    [InlineData("  width: 9\n", "", "lacks the entry 'width'")]
    [InlineData("height: 7", "hight: 7", "unknown entry 'hight'")]
    [InlineData("margin: 0.05", "margin: .nan", "not a finite number")]
    [InlineData("range: [-3, 40]", "range: [40, -3]", "reversed")]
    [InlineData("range: [-3, 40]", "range: [40]", "parts")]
    [InlineData("checks:\n", "cheques:\n", "unknown entry 'cheques'")]
    [InlineData("cost:\n", "cost: [\n", "not valid YAML")]
    public void What_is_wrong_with_a_file_is_said_in_a_sentence(string right, string wrong, string reason)
    {
        using var folder = new TestFolder();
        var text = RecipeFile.Text(Recipes[0], withRange: true);
        Assert.Contains(right, text);
        var path = folder.Write("recipe.yaml", text.Replace(right, wrong));
        var sentence = Refusal(() => RecipeFile.Read(path));
        Assert.StartsWith($"'{path}'", sentence);
        Assert.Contains(reason, sentence);
    }

    [Fact]
    public void A_missing_file_is_named() => Assert.Contains("none.yaml", Refusal(() => RecipeFile.Read("none.yaml")));

    [Fact]
    public void Two_recipes_differ_by_what_was_changed()
    {
        var recipe = Recipe.For(Range);
        var other = recipe with { Cost = Cost.Zncc(7), Range = new(0, 40) };
        Assert.Equal(["range: -3:40 → 0:40", "cost: census (width 9, height 7) → zncc (window 7)"], recipe.DifferenceTo(other));
        Assert.NotEqual(recipe.Id, other.Id);
        Assert.Matches("^[0-9a-f]{8}$", recipe.Id);
    }

    [Fact]
    public void The_range_of_a_rig_holds_every_disparity_of_the_working_distance()
    {
        var rig = TarnHollow.Rig;
        var recipe = Recipe.For(rig, nearestMm: 900, farthestMm: 1300);
        var geometry = Rectification.Of(rig).Geometry;

        // Z = f·b / (d + offset): the two ends, by the formula and with two pixels to spare.
        double At(double depthMm) => geometry.FocalPixels * geometry.BaselineMm / depthMm - geometry.OffsetPixels;
        Assert.Equal(Math.Floor(At(1300)) - 2, recipe.Range.Least);
        Assert.Equal(Math.Ceiling(At(900)) + 2, recipe.Range.Most);
    }

    [Theory]
    [InlineData(0, 1000)]
    [InlineData(1300, 900)]
    [InlineData(double.NaN, 900)]
    public void Working_distances_that_are_not_in_order_are_refused(double nearest, double farthest) =>
        Assert.Contains("not in order", Refusal(() => Recipe.For(TarnHollow.Rig, nearest, farthest)));

    private static string Refusal(Action action) => Assert.Throws<UserErrorException>(action).Message;
}
