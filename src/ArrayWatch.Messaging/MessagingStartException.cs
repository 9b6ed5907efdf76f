namespace ArrayWatch.Messaging;

/// <summary>A port or a file that messaging needs cannot be had; the message is one line for the user, and the program exits 3.</summary>
public sealed class MessagingStartException : Exception
{
    /// <summary>Without a cause.</summary>
    public MessagingStartException()
    {
    }

    /// <summary>With one line for the user.</summary>
    public MessagingStartException(string message)
        : base(message)
    {
    }

    /// <summary>With one line for the user and what caused it.</summary>
    public MessagingStartException(string message, Exception innerException)
        : base(message, innerException)
    {
    }
}
