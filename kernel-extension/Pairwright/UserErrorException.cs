namespace Pairwright;

/// <summary>A mistake that the user can mend: the message is one sentence that names the file, cell or value, and what to do.</summary>
/// <remarks>Notebooks and the command line show the message alone, without a stack trace.</remarks>
public sealed class UserErrorException : Exception
{
    /// <summary>Makes the error from its one sentence.</summary>
    public UserErrorException(string message)
        : base(message)
    {
    }

    /// <summary>Makes the error from its one sentence and the fault that was met underneath.</summary>
    public UserErrorException(string message, Exception innerException)
        : base(message, innerException)
    {
    }
}
