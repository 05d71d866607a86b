using Pairwright.Geometry;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>The matrix, its singular values, and the four poses that share it.</summary>
internal sealed class EssentialMatrixRenderer : Renderer<EssentialMatrix>
{
    public override string Plain(EssentialMatrix e) => Lines(
        "Essential matrix E = [t]× · R with |t| = 1",
        $"singular values as given over their mean: {string.Join(", ", e.GivenSingularValues.Select(s => Numbers.Significant(s, 4)))} (1, 1, 0 for a true one)");

    public override Card Draw(EssentialMatrix e) => new Card("Essential matrix", "y_rightᵀ · E · y_left = 0 for directions y = K⁻¹·x; E = [t]× · R with |t| = 1")
        .Raw(MatrixDrawing.Of(e.Matrix))
        .Facts(("singular values as given, over the mean of the first two", $"{string.Join(", ", e.GivenSingularValues.Select(s => Numbers.Significant(s, 4)))}; 1, 1, 0 for a true one"))
        .Details("The four poses that share it (one has the scene in front of both cameras)", new(Card.TableOf(
            ["pose", "turn", "direction of t"],
            e.Poses().Index().Select(entry => new[]
            {
                $"{entry.Index + 1}",
                Numbers.Text(Rotation.ToVector(entry.Item.Rotation).Norm * 180 / Math.PI, 3) + "°",
                $"({Numbers.Fixed(entry.Item.Translation.X, 4)}, {Numbers.Fixed(entry.Item.Translation.Y, 4)}, {Numbers.Fixed(entry.Item.Translation.Z, 4)})",
            }))));
}
