using System.Collections.Immutable;
using Pairwright.Geometry;
using Pairwright.Imaging;

namespace Pairwright.Calibration;

/// <summary>Counts corners over a grid of the picture.</summary>
internal static class CoverageGrid
{
    private const int Columns = 8;
    private const int Rows = 6;

    // A picture's parts as ranges of cells: corners are two cells wide and high, edges lie between them.
    private static readonly (string Name, Range Across, Range Down)[] Parts =
    [
        ("top-left corner", 0..2, 0..2), ("top edge", 2..6, 0..1), ("top-right corner", 6..8, 0..2),
        ("left edge", 0..1, 2..4), ("middle", 2..6, 2..4), ("right edge", 7..8, 2..4),
        ("bottom-left corner", 0..2, 4..6), ("bottom edge", 2..6, 5..6), ("bottom-right corner", 6..8, 4..6),
    ];

    public static Coverage Of(PictureSize size, IEnumerable<ImmutableArray<RawPixel>> views)
    {
        var counts = new int[Columns * Rows];
        foreach (var corner in views.SelectMany(view => view))
        {
            var column = Math.Clamp((int)((corner.U + 0.5) * Columns / size.Width), 0, Columns - 1);
            var row = Math.Clamp((int)((corner.V + 0.5) * Rows / size.Height), 0, Rows - 1);
            counts[row * Columns + column]++;
        }

        bool IsEmpty((string Name, Range Across, Range Down) part) =>
            Enumerable.Range(0, Rows).Take(part.Down).All(row => Enumerable.Range(0, Columns).Take(part.Across).All(column => counts[row * Columns + column] == 0));

        return new(Columns, Rows, [.. counts]) { Missing = [.. Parts.Where(IsEmpty).Select(part => part.Name)] };
    }
}
