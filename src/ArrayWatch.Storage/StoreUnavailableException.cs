namespace ArrayWatch.Storage;

/// <summary>The store's file cannot be used; the message says why in one line.</summary>
public sealed class StoreUnavailableException : Exception
{
    public StoreUnavailableException() { }

    public StoreUnavailableException(string message) : base(message) { }

    public StoreUnavailableException(string message, Exception innerException) : base(message, innerException) { }
}
