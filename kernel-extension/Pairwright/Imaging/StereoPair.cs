using Pairwright.Geometry;

namespace Pairwright.Imaging;

/// <summary>Two pictures of one scene, taken at one time by the two cameras of a rig, as the lenses formed them.</summary>
public sealed partial class StereoPair
{
    /// <summary>Makes a pair.</summary>
    /// <param name="left">The reference picture.</param>
    /// <param name="right">The other picture; its size may differ from the left one's.</param>
    /// <param name="rig">The rig that took it, where it is known.</param>
    /// <param name="name">A short name for lists and sentences, such as the files' shared name; empty when left out.</param>
    /// <exception cref="UserErrorException">A picture's size is not that of its camera.</exception>
    public StereoPair(Picture left, Picture right, Rig? rig = null, string name = "")
    {
        ArgumentNullException.ThrowIfNull(left);
        ArgumentNullException.ThrowIfNull(right);
        ArgumentNullException.ThrowIfNull(name);
        (Left, Right, Rig, Name) = (left, right, rig, name);
        foreach (var view in rig is null ? [] : Enum.GetValues<View>())
        {
            RequireSize(rig!, view);
        }
    }

    /// <summary>The reference picture.</summary>
    public Picture Left { get; }

    /// <summary>The other picture.</summary>
    public Picture Right { get; }

    /// <summary>The rig that took the pair, where it is known.</summary>
    public Rig? Rig { get; }

    /// <summary>A short name for lists and sentences, such as the files' shared name; may be empty.</summary>
    public string Name { get; }

    /// <summary>Where the pair came from.</summary>
    public Provenance Provenance => Left.Provenance.With(Right.Provenance);

    /// <summary>The picture of a view.</summary>
    public Picture this[View view] => view == View.Left ? Left : Right;

    /// <summary>The name and both pictures in a line.</summary>
    public override string ToString() => $"Stereo pair{Quoted}: left {Left}; right {Right}; {(Rig is null ? "no rig" : "with rig")}";

    private string Quoted => Name.Length == 0 ? "" : $" '{Name}'";

    private void RequireSize(Rig rig, View view)
    {
        if (rig[view].Size != this[view].Size)
        {
            var which = $"{view.ToString().ToLowerInvariant()} picture{(Name.Length == 0 ? "" : $" of{Quoted}")}";
            throw new UserErrorException($"The {which} is {this[view].Size} px, but the rig's camera takes {rig[view].Size} px; use the rig that took the pictures.");
        }
    }
}
