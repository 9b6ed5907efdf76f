using System.Diagnostics.CodeAnalysis;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Carries a refusal from deep inside a decoder to its door, where it becomes a value again; never leaves a decoder.</summary>
[SuppressMessage("Design", "CA1032", Justification = "Made only by the helpers below, always with a refusal.")]
[SuppressMessage("Design", "CA1064", Justification = "Caught in this assembly; callers get a Refusal.")]
internal sealed class MessageRefusedException : Exception
{
    private MessageRefusedException(Refusal refusal)
        : base(refusal.Detail) => Refusal = refusal;

    public Refusal Refusal { get; }

    [DoesNotReturn]
    public static void Throw(RefusalReason reason, string detail) =>
        throw new MessageRefusedException(new Refusal(reason, detail));

    [DoesNotReturn]
    public static void NotDecodable(string detail) => Throw(RefusalReason.NotDecodable, detail);

    [DoesNotReturn]
    public static void WrongShape(string detail) => Throw(RefusalReason.WrongShape, detail);
}
