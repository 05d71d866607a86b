using System.Collections.Immutable;

namespace Pairwright.Calibration;

/// <summary>Where in a picture the calibration has seen board corners: the picture cut into a grid, and how many corners fell into each cell.</summary>
public sealed record Coverage
{
    internal Coverage(int columns, int rows, ImmutableArray<int> counts) => (Columns, Rows, Counts) = (columns, rows, counts);

    /// <summary>Cells across.</summary>
    public int Columns { get; }

    /// <summary>Cells down.</summary>
    public int Rows { get; }

    /// <summary>Corners per cell, row after row.</summary>
    public ImmutableArray<int> Counts { get; }

    /// <summary>The share of cells with at least one corner, 0 to 1.</summary>
    public double Share => Counts.Count(count => count > 0) / (double)Counts.Length;

    /// <summary>The parts of the picture whose cells hold no corner at all, such as "top-left corner" or "right edge".</summary>
    public ImmutableArray<string> Missing { get; init; } = [];

    /// <summary>Corners in the cell at a column and row of the grid.</summary>
    public int this[int column, int row] => Counts[row * Columns + column];
}
