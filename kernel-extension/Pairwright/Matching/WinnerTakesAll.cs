namespace Pairwright.Matching;

/// <summary>The lowest cost wins; see <see cref="Optimisation.WinnerTakesAll"/>.</summary>
internal sealed class WinnerTakesAll : Optimisation
{
    public override string Name => "winner-take-all";
}
