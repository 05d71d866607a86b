using Pairwright.Calibration;
using Pairwright.Notebook.Drawing;

namespace Pairwright.Notebook.Renderers;

/// <summary>Whether a calibration still holds: the turn about each axis against its uncertainty.</summary>
internal sealed class RigCheckRenderer : Renderer<RigCheck>
{
    public override string Plain(RigCheck check) => Lines(
    [
        $"{Title(check)}: {Outcome(check)}",
        .. check.Turns.Select(turn => $"{turn.Name} {Numbers.WithSigma(turn.Degrees, turn.StandardUncertainty, "°")}"),
        $"residuals {Numbers.Text(check.AsCalibratedRmsPx, 3, "px")} as calibrated, {Numbers.Text(check.TurnedRmsPx, 3, "px")} with the turn",
    ]);

    public override Card Draw(RigCheck check)
    {
        var card = new Card(Title(check), "turn of the right camera about its own axes since the calibration; ± is one standard uncertainty, random and the calibration's own together");
        card = check.Holds ? card.Note("✓ " + Outcome(check)) : card.Warning(Outcome(check));
        return card
            .Table(
                ["axis", "turn", "random", "calibration's own", "turn over its uncertainty"],
                check.Turns.Select(turn => new[]
                {
                    Axis(turn.Name),
                    Numbers.WithSigma(turn.Degrees, turn.StandardUncertainty, "°"),
                    Numbers.Significant(turn.RandomSigma, 2, "°"),
                    Numbers.Significant(turn.CommonSigma, 2, "°"),
                    Numbers.Text(Math.Abs(turn.Degrees) / turn.StandardUncertainty, 1),
                }))
            .Facts(
                ("residuals with the rig as calibrated", Numbers.Text(check.AsCalibratedRmsPx, 3, "px")),
                ("residuals with the turn", Numbers.Text(check.TurnedRmsPx, 3, "px")))
            .Caption("The calibration is doubted when a turn exceeds three times its standard uncertainty. Residuals that stay large with the turn mean that something else changed: focus, zoom, or the board.")
            .From(check.Rig.Provenance);
    }

    private static string Title(RigCheck check) => check.Name.Length == 0 ? "Does the calibration hold?" : $"Does the calibration hold? Capture {check.Name}";

    private static string Outcome(RigCheck check) => check.Holds
        ? "the calibration holds: no turn exceeds three times its standard uncertainty."
        : $"the calibration does not hold: {string.Join(" and ", check.Turns.Where(turn => Math.Abs(turn.Degrees) > 3 * turn.StandardUncertainty).Select(turn => $"{turn.Name} by {Numbers.WithSigma(turn.Degrees, turn.StandardUncertainty, "°")}"))}. Calibrate again, and look for what moved.";

    private static string Axis(string name) => name switch { "pitch" => "pitch (about X)", "yaw" => "yaw (about Y)", _ => "roll (about Z)" };
}
