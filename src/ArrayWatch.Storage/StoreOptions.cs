namespace ArrayWatch.Storage;

/// <summary>Where the store is and how long it keeps.</summary>
/// <param name="Path">The database file; its folder is made when it is not there.</param>
/// <param name="RetentionDays">Event-time days kept, 1 or more.</param>
/// <param name="KeepsOutbox">True when a copy of everything waits to be sent on.</param>
public sealed record StoreOptions(string Path, int RetentionDays = 400, bool KeepsOutbox = false);
