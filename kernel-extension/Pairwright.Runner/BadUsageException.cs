namespace Pairwright.Runner;

/// <summary>The command line or the notebook file makes no sense: one sentence, nothing was run, exit code 64.</summary>
internal sealed class BadUsageException(string sentence) : Exception(sentence);
