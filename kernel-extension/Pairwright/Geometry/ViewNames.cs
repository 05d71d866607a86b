namespace Pairwright.Geometry;

/// <summary>Names and opposites of the two views.</summary>
public static class ViewNames
{
    /// <summary>"left" or "right".</summary>
    public static string Name(this View view) => view == View.Left ? "left" : "right";

    /// <summary>The other view.</summary>
    public static View Other(this View view) => view == View.Left ? View.Right : View.Left;
}
