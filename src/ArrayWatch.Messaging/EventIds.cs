namespace ArrayWatch.Messaging;

/// <summary>Numbers of messaging's log events: 3000 to 3099.</summary>
internal static class EventIds
{
    public const int MessageRefused = 3000;
    public const int MessageFailed = 3001;
    public const int RetainedIgnored = 3002;
    public const int SubscriberConnected = 3010;
    public const int SubscriberDisconnected = 3011;
    public const int SubscriberFallsBack = 3012;
    public const int SubscriberFailed = 3013;
    public const int PublisherConnected = 3020;
    public const int PublisherDisconnected = 3021;
    public const int PublisherFallsBack = 3022;
    public const int PublishRefused = 3023;
    public const int AlertLeftOut = 3024;
    public const int GoodbyeFailed = 3025;
    public const int PublisherFailed = 3026;
    public const int BrokerStarted = 3030;
}
