namespace ArrayWatch.Monitoring.Streams;

/// <summary>What can be wrong with a stream: the cause that a stream alert names.</summary>
internal static class StreamCauses
{
    public const string Missing = "frames missing";
    public const string Late = "frames late";
    public const string Repeated = "frames repeated";
    public const string Refused = "messages refused";
    public const string NotFinite = "values not finite";
    public const string Silence = "nothing arriving";
}
