using System.Globalization;

namespace Pairwright.Matching;

/// <summary>One part of a recipe: a published method with its settings, or one that an engineer wrote.</summary>
/// <remarks>
/// Immutable. Two stages are equal when they are of one type and have one name, the same settings and, where they were made from a piece of
/// code, the same code.
/// </remarks>
public abstract class Stage : IEquatable<Stage>
{
    /// <summary>The method's name, as it stands in a recipe file; the type's own name where it is not overridden.</summary>
    public virtual string Name => GetType().Name;

    /// <summary>The settings, in the order in which they are read aloud; none where it is not overridden.</summary>
    public virtual IReadOnlyList<StageSetting> Settings => [];

    /// <summary>The code that the stage was made from; nothing for a class of its own.</summary>
    private protected virtual Delegate? Code => null;

    /// <summary>Whether another stage is of this type and has this name, these settings and this code.</summary>
    public bool Equals(Stage? other) =>
        other is not null && GetType() == other.GetType() && Name == other.Name && Settings.SequenceEqual(other.Settings) && Equals(Code, other.Code);

    /// <inheritdoc/>
    public sealed override bool Equals(object? obj) => Equals(obj as Stage);

    /// <inheritdoc/>
    public sealed override int GetHashCode() => Settings.Aggregate(HashCode.Combine(GetType(), Name), HashCode.Combine);

    /// <summary>The name and the settings in one line.</summary>
    public sealed override string ToString() =>
        Settings.Count == 0 ? Name : $"{Name} ({string.Join(", ", Settings.Select(setting => $"{setting.Name} {setting.Value}"))})";

    private protected static StageSetting Setting(string name, IFormattable value) => new(name, value.ToString(null, CultureInfo.InvariantCulture));

    private protected static StageSetting Setting(string name, string value) => new(name, value);
}
