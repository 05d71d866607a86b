using System.Collections.Immutable;
using System.Reflection;
using System.Security.Cryptography;

namespace Pairwright;

/// <summary>Where a result came from: the files, the steps in order, and the version of this library.</summary>
/// <remarks>Immutable. Two results with equal provenance are equal, whatever the machine: every random step states its seed.</remarks>
public sealed record Provenance
{
    private Provenance(ImmutableArray<ProvenanceInput> inputs, ImmutableArray<ProvenanceStep> steps)
    {
        Inputs = inputs;
        Steps = steps;
    }

    /// <summary>The provenance of something that no file went into, such as a value typed in a cell.</summary>
    public static Provenance None { get; } = new([], []);

    /// <summary>The version of this library.</summary>
    public static string Version { get; } =
        typeof(Provenance).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion.Split('+')[0] ?? "unknown";

    /// <summary>The files, in the order of their use.</summary>
    public ImmutableArray<ProvenanceInput> Inputs { get; }

    /// <summary>The steps, first to last.</summary>
    public ImmutableArray<ProvenanceStep> Steps { get; }

    /// <summary>The provenance of a file's content.</summary>
    /// <param name="path">The file.</param>
    /// <exception cref="UserErrorException">The file cannot be read.</exception>
    public static Provenance OfFile(string path)
    {
        try
        {
            using var stream = File.OpenRead(path);
            return new([new(Path.GetFileName(path), Convert.ToHexStringLower(SHA256.HashData(stream)))], []);
        }
        catch (Exception fault) when (fault is IOException or UnauthorizedAccessException)
        {
            throw new UserErrorException($"'{path}' cannot be read; check the name and that you may read it.", fault);
        }
    }

    /// <summary>The provenance of a file whose content has been read already.</summary>
    /// <param name="path">The file.</param>
    /// <param name="content">All its bytes.</param>
    public static Provenance OfContent(string path, ReadOnlySpan<byte> content) =>
        new([new(Path.GetFileName(path), Convert.ToHexStringLower(SHA256.HashData(content)))], []);

    /// <summary>The same provenance with one more step.</summary>
    /// <param name="name">What was done.</param>
    /// <param name="settings">The settings, as short readable text.</param>
    public Provenance Then(string name, string settings = "") => new(Inputs, Steps.Add(new(name, settings)));

    /// <summary>The provenance of something made from this and another result; what both share is listed once.</summary>
    /// <param name="other">The other result's provenance.</param>
    public Provenance With(Provenance other)
    {
        ArgumentNullException.ThrowIfNull(other);
        return new([.. Inputs.Union(other.Inputs)], [.. Steps.Union(other.Steps)]);
    }

    /// <summary>Compares by content.</summary>
    public bool Equals(Provenance? other) => other is not null && Inputs.SequenceEqual(other.Inputs) && Steps.SequenceEqual(other.Steps);

    /// <summary>Hashes the content.</summary>
    public override int GetHashCode() => Inputs.Concat<object>(Steps).Aggregate(17, HashCode.Combine);

    /// <summary>The steps as one line.</summary>
    public override string ToString() =>
        string.Join(" → ", Inputs.Select(input => input.Name).Concat(Steps.Select(step => step.Settings.Length == 0 ? step.Name : $"{step.Name} ({step.Settings})")));
}
