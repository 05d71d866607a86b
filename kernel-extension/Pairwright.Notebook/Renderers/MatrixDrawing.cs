using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Three rows of three numbers between brackets.</summary>
internal static class MatrixDrawing
{
    public static Markup Of(Matrix3x3 matrix)
    {
        double[][] rows = [[matrix.M11, matrix.M12, matrix.M13], [matrix.M21, matrix.M22, matrix.M23], [matrix.M31, matrix.M32, matrix.M33]];
        var cells = rows.Select(row =>
            "<tr>" + string.Concat(row.Select(entry => $"<td class=\"pw-n\" style=\"border:0;padding:2px 10px\">{Markup.Escape(Numbers.Scientific(entry, 6))}</td>")) + "</tr>");
        return new($"<table style=\"border-left:2px solid {Ink.Text};border-right:2px solid {Ink.Text};border-radius:6px\"><tbody>{string.Concat(cells)}</tbody></table>");
    }
}
