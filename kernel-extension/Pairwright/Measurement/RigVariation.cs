using System.Runtime.CompilerServices;
using Pairwright.Geometry;

namespace Pairwright.Measurement;

/// <summary>The rigs at plus and minus one standard deviation along each principal axis of a rig's covariance.</summary>
internal sealed class RigVariation
{
    private static readonly ConditionalWeakTable<Rig, RigVariation> Known = [];

    private RigVariation(Rig rig)
    {
        Rig = rig;
        IsKnown = rig.Covariance is not null;
        Changed = [.. rig.PrincipalChanges().Select(change => (rig.Changed(change), rig.Changed([.. change.Select(entry => -entry)])))];
    }

    /// <summary>The rig as calibrated.</summary>
    public Rig Rig { get; }

    /// <summary>Whether the rig has a covariance; without one the common part of a measurement is not known.</summary>
    public bool IsKnown { get; }

    /// <summary>A pair of rigs for each axis.</summary>
    public IReadOnlyList<(Rig Plus, Rig Minus)> Changed { get; }

    /// <summary>The variation of a rig, made once for each rig object.</summary>
    public static RigVariation Of(Rig rig) => Known.GetValue(rig, r => new(r));

    /// <summary>Whether two sources of a common part are one: the same object, or rigs equal in every parameter and covariance.</summary>
    public static bool SameSource(object? a, object? b) => ReferenceEquals(a, b) || (a is Rig first && b is Rig second && SameRig(first, second));

    private static bool SameRig(Rig a, Rig b) =>
        a.Left.Equals(b.Left) && a.Right.Equals(b.Right) && a.RightFromLeft.Equals(b.RightFromLeft) && Equals(a.Covariance, b.Covariance);
}
