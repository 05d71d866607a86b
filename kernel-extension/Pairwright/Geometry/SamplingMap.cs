namespace Pairwright.Geometry;

/// <summary>For each rectified pixel the raw position at which a remapping looks the level up; NaN where no camera saw it.</summary>
/// <remarks>Single precision: below 2⁻¹² px of rounding up to column 4,096.</remarks>
public sealed class SamplingMap
{
    private readonly float[] columns;
    private readonly float[] rows;

    internal SamplingMap(View view, PictureSize size, float[] columns, float[] rows) =>
        (View, Size, this.columns, this.rows) = (view, size, columns, rows);

    /// <summary>The view whose raw picture the positions lie in.</summary>
    public View View { get; }

    /// <summary>The size of the rectified picture.</summary>
    public PictureSize Size { get; }

    /// <summary>Raw columns, row after row of the rectified picture, in pixels.</summary>
    public ReadOnlyMemory<float> Columns => columns;

    /// <summary>Raw rows, row after row of the rectified picture, in pixels.</summary>
    public ReadOnlyMemory<float> Rows => rows;
}
