using System.ComponentModel;
using Spectre.Console.Cli;

namespace Pairwright.Runner.Commands;

/// <summary>The command line of <c>match</c>.</summary>
internal sealed class MatchSettings : CommandSettings
{
    [CommandArgument(0, "<LEFT>")]
    [Description("The left picture; or a pattern in quotation marks, in which one * stands for what differs from pair to pair.")]
    public string Left { get; init; } = "";

    [CommandArgument(1, "<RIGHT>")]
    [Description("The right picture or pattern.")]
    public string Right { get; init; } = "";

    [CommandOption("--out <FILE>", isRequired: true)]
    [Description("The disparity map to write (.pfm, .tif or .png): measured values only, unless --fill is given. A .json file beside it says how it was made and how it came out.")]
    public string Out { get; init; } = "";

    [CommandOption("--recipe <FILE>")]
    [Description("How to match; the usual recipe unless given.")]
    public string? Recipe { get; init; }

    [CommandOption("--range <RANGE>")]
    [Description("MIN:MAX, the disparities to search in pixels, both ends included; either may be negative.")]
    public string? Range { get; init; }

    [CommandOption("--depths <DEPTHS>")]
    [Description("NEAREST:FARTHEST in millimetres, in place of --range.")]
    public string? Depths { get; init; }

    [CommandOption("--rig <FILE>")]
    [Description("The rig that took the pictures, which are rectified by it first; without a rig they count as rectified.")]
    public string? Rig { get; init; }

    [CommandOption("--geometry <FILE>")]
    [Description("Focal length, baseline and offset of pictures that are rectified already.")]
    public string? Geometry { get; init; }

    [CommandOption("--fill")]
    [Description("Fill the gaps of the map from their surroundings; a picture beside the map, .filled.png, is white where a value was filled and not measured.")]
    public bool Fill { get; init; }

    [CommandOption("--sigma <FILE>")]
    [Description("Also write the standard uncertainty of each measured disparity, in pixels.")]
    public string? Sigma { get; init; }

    [CommandOption("--depth <FILE>")]
    [Description("Also write the measured depth along the rectified left axis, in millimetres.")]
    public string? Depth { get; init; }

    [CommandOption("--cloud <FILE>")]
    [Description("Also write the measured points in the left camera's frame, in millimetres (.ply).")]
    public string? Cloud { get; init; }

    [CommandOption("--truth <FILE>")]
    [Description("The true disparities of the rectified left picture (.pfm, .tif or .png), to judge the map by.")]
    public string? Truth { get; init; }

    [CommandOption("--truth-scale <LEVELS>")]
    [Description("How many levels of a PNG of true disparities make one pixel; 256 in 16 bits unless given.")]
    public double? TruthScale { get; init; }

    [CommandOption("--memory <MB>")]
    [Description("The most memory that matching a pair may take beside the pictures; a large pair then goes in strips, with the same result.")]
    public int? Memory { get; init; }
}
