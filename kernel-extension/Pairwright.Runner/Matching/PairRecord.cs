using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using Pairwright.Trials;

namespace Pairwright.Runner.Matching;

/// <summary>The file beside a map that says what it was made from and how it came out. It is written last: where it stands, the pair is done.</summary>
internal static class PairRecord
{
    /// <summary>Raised when a reader of an earlier version would misread the file.</summary>
    private const int SchemaVersion = 1;

    private const string Made = "madeFrom";

    private static readonly double[] Bounds = [0.5, 1, 2, 4];

    private static readonly JsonSerializerOptions Written = new() { WriteIndented = true, Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>All that the outcome depends on: equal for equal outcomes.</summary>
    public static JsonObject MadeFrom(PairFiles files, MatchJob job) => new()
    {
        ["left"] = Hash(files.Left),
        ["right"] = Hash(files.Right),
        ["geometry"] = job.GeometryFile is { } geometry ? Hash(geometry) : null,
        ["truth"] = files.Truth is { } truth ? Hash(truth) : null,
        ["truthScale"] = job.TruthScale,
        ["recipe"] = job.Recipe.ToString(),
        ["recipeId"] = job.Recipe.Id,
        ["writes"] = new JsonArray([.. files.Written.Select(path => (JsonNode)Path.GetFileName(path))]),
        ["toolVersion"] = Provenance.Version,
    };

    /// <summary>Whether an earlier run has done the pair, from the same files in the same way.</summary>
    public static bool IsDone(PairFiles files, JsonObject madeFrom)
    {
        if (!File.Exists(files.Record) || !files.Written.All(File.Exists))
        {
            return false;
        }

        try
        {
            return JsonNode.DeepEquals(JsonNode.Parse(File.ReadAllText(files.Record))?[Made], madeFrom);
        }
        catch (Exception broken) when (broken is JsonException or InvalidOperationException)
        {
            return false;
        }
    }

    public static void Write(PairFiles files, JsonObject madeFrom, PairResult result) =>
        AtomicFile.WriteText(files.Record, new JsonObject
        {
            ["schema"] = "pairwright match",
            ["schemaVersion"] = SchemaVersion,
            [Made] = madeFrom,
            ["width"] = result.Map.Size.Width,
            ["height"] = result.Map.Size.Height,
            ["measuredShare"] = Number(result.Map.MatchedShare),
            ["rangeEndShare"] = Number(result.Map.RangeEndShare),
            ["seconds"] = result.Map.Elapsed.TotalSeconds,
            ["warnings"] = new JsonArray([.. result.Map.Pair.Warnings.Select(warning => (JsonNode)warning)]),
            ["accuracy"] = result.Accuracy is { } measured ? Accuracy(measured) : null,
            ["accuracyWithFilled"] = result.AccuracyWithFilled is { } all ? Accuracy(all) : null,
        }.ToJsonString(Written) + "\n");

    private static JsonObject Accuracy(DisparityAccuracy accuracy)
    {
        var curve = accuracy.DensityCurve(Math.Max(1, accuracy.Truth.ResolutionPx));
        return new JsonObject
        {
            ["truthResolutionPx"] = accuracy.Truth.ResolutionPx,
            ["regions"] = new JsonArray([.. accuracy.Regions.Select(Region)]),
            ["errorAgainstDensity"] = new JsonObject { ["boundPx"] = curve.BoundPx, ["area"] = Number(curve.Area), ["leastArea"] = Number(curve.OptimalArea) },
        };
    }

    private static JsonNode Region(RegionAccuracy region) => new JsonObject
    {
        ["region"] = region.Region switch
        {
            TruthRegion.All => "all",
            TruthRegion.Unoccluded => "seen by both",
            TruthRegion.NearDepthEdges => "near depth edges",
            _ => "plain",
        },
        ["pixels"] = region.Pixels,
        ["measuredShare"] = Number(region.MatchedShare),
        ["meanPx"] = Number(region.MeanPx),
        ["meanAbsolutePx"] = Number(region.MeanAbsolutePx),
        ["rmsPx"] = Number(region.RmsPx),
        ["medianAbsolutePx"] = Number(region.Quantile(0.5)),
        ["shareBeyondPx"] = Shares(region.ShareBeyond),
        ["shareBeyondPxOrMissing"] = Shares(region.ShareBeyondOrMissing),
    };

    private static JsonObject Shares(Func<double, double> share)
    {
        var shares = new JsonObject();
        foreach (var bound in Bounds)
        {
            shares[FormattableString.Invariant($"{bound}")] = Number(share(bound));
        }

        return shares;
    }

    private static JsonObject Hash(string path)
    {
        var input = Provenance.OfFile(path).Inputs[0];
        return new JsonObject { ["file"] = input.Name, ["sha256"] = input.Sha256 };
    }

    /// <summary>JSON has no NaN; what is not known is null.</summary>
    private static JsonNode? Number(double value) => double.IsFinite(value) ? value : null;
}
