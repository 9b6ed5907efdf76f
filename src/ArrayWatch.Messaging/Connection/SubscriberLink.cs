using System.Buffers.Binary;
using System.Net.Security;
using System.Net.Sockets;
using MQTTnet.Formatter;
using MQTTnet.Packets;

namespace ArrayWatch.Messaging.Connection;

/// <summary>
/// One connection to the broker that subscribes and acknowledges. Nothing is read ahead of what has been dealt with,
/// so that a slow receiver holds the broker back by TCP, at QoS 0 too; messages lie in the connection's own buffer.
/// </summary>
/// <remarks>
/// One thread at a time receives and acknowledges. MQTTnet's client reads on without bound and copies each body twice,
/// which is why only its packet encoding is used here.
/// </remarks>
internal sealed class SubscriberLink : IAsyncDisposable
{
    /// <summary>Acknowledgements wait for one another up to this many, and only while the next message is here already.</summary>
    private const int MostPendingAcknowledgements = 8;

    private readonly Stream _stream;
    private readonly PacketReader _reader;
    private readonly MqttProtocolVersion _version;
    private readonly TimeSpan _keepAlive;
    private readonly TimeProvider _time;
    private readonly SemaphoreSlim _writing = new(1, 1);
    private readonly byte[] _acknowledgements = new byte[4 * MostPendingAcknowledgements];
    private readonly CancellationTokenSource _closed = new();
    private IReadOnlyList<MqttTopicFilter> _filters = [];
    private int _acknowledgementBytes;
    private Task _keepAliveLoop = Task.CompletedTask;

    private SubscriberLink(Stream stream, MqttOptions options, MqttProtocolVersion version, TimeProvider time)
    {
        _stream = stream;
        _version = version;
        _keepAlive = options.KeepAlive;
        _time = time;
        _reader = new PacketReader(stream, options.MaxMessageBytes + PacketReader.HeadBytes, time);
    }

    /// <summary>True when the broker has kept what came since the last connection.</summary>
    public bool SessionPresent { get; private set; }

    private bool HasProperties => _version == MqttProtocolVersion.V500;

    /// <summary>Connects; the caller limits the time by the token.</summary>
    /// <exception cref="BrokerRefusedException">The broker refuses.</exception>
    public static async Task<SubscriberLink> ConnectAsync(
        MqttOptions options, string clientId, string? password, MqttProtocolVersion version, TimeProvider time, CancellationToken cancellation)
    {
        Stream stream = await OpenAsync(options, cancellation).ConfigureAwait(false);
        SubscriberLink link = new(stream, options, version, time);
        try
        {
            await stream.WriteAsync(ConnectPackets.Connect(options, clientId, password, version), cancellation).ConfigureAwait(false);
            if (!await link._reader.ReadAsync(cancellation).ConfigureAwait(false))
                throw new BrokerRefusedException("The broker closed the connection before it answered; check its log.", refusesVersion: true);
            link.SessionPresent = ConnectPackets.ReadConnectAcknowledgement(link._reader.Flags, link._reader.Body.Span, version);
            link._keepAliveLoop = link.KeepAliveAsync();
            return link;
        }
        catch
        {
            await link.DisposeAsync().ConfigureAwait(false);
            throw;
        }
    }

    /// <summary>Asks for topics; a refusal comes out of <see cref="ReceiveAsync"/>, since kept messages may come before the answer.</summary>
    public async Task SubscribeAsync(IReadOnlyList<MqttTopicFilter> filters, CancellationToken cancellation)
    {
        _filters = filters;
        await WriteAsync(ConnectPackets.Subscribe(filters, _version), cancellation).ConfigureAwait(false);
    }

    /// <summary>The next message, valid until the next call; null when the broker has closed the connection.</summary>
    /// <exception cref="BrokerRefusedException">The broker refuses a subscription or ends the connection with a reason.</exception>
    /// <exception cref="MqttProtocolException">The broker breaks the protocol.</exception>
    public async ValueTask<ReceivedMessage?> ReceiveAsync(CancellationToken cancellation)
    {
        while (true)
        {
            if (_acknowledgementBytes > 0 && !_reader.HasPacket) await FlushAsync(cancellation).ConfigureAwait(false);
            if (!await _reader.ReadAsync(cancellation).ConfigureAwait(false)) return null;
            switch (_reader.Flags >> 4)
            {
                case ConnectPackets.Publish:
                    return PublishPacket.Read(_reader.Flags, _reader.Body, _reader.BodyBytes, HasProperties);
                case ConnectPackets.SubscribeAcknowledgement:
                    ConnectPackets.CheckSubscribeAcknowledgement(_reader.Body.Span, HasProperties, _filters);
                    break;
                case ConnectPackets.PingResponse:
                    break;
                case ConnectPackets.Disconnect:
                    byte reason = _reader.Body.IsEmpty ? (byte)0 : _reader.Body.Span[0];
                    throw new BrokerRefusedException(
                        $"The broker ended the connection ({(MQTTnet.Protocol.MqttDisconnectReasonCode)reason}, 0x{reason:X2}); {(reason == 0x8E ? "another client uses the same id" : "check its log")}.",
                        refusesVersion: false);
                default:
                    throw new MqttProtocolException($"The broker sent packet type {_reader.Flags >> 4}, which a subscriber does not expect.");
            }
        }
    }

    /// <summary>Says that a QoS 1 message has been dealt with; in the order of receipt.</summary>
    public async ValueTask AcknowledgeAsync(ushort packetIdentifier, CancellationToken cancellation)
    {
        Span<byte> packet = _acknowledgements.AsSpan(_acknowledgementBytes, 4);
        ConnectPackets.PublishAcknowledgement.CopyTo(packet);
        BinaryPrimitives.WriteUInt16BigEndian(packet[2..], packetIdentifier);
        _acknowledgementBytes += packet.Length;
        if (_acknowledgementBytes == _acknowledgements.Length) await FlushAsync(cancellation).ConfigureAwait(false);
    }

    /// <summary>Sends what acknowledgements wait and a DISCONNECT; the broker keeps the session.</summary>
    public async Task DisconnectAsync(CancellationToken cancellation)
    {
        await FlushAsync(cancellation).ConfigureAwait(false);
        await WriteAsync(ConnectPackets.NormalDisconnect, cancellation).ConfigureAwait(false);
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await _closed.CancelAsync().ConfigureAwait(false);
        await _stream.DisposeAsync().ConfigureAwait(false);
        await _keepAliveLoop.ConfigureAwait(false);
        _closed.Dispose();
        _writing.Dispose();
    }

    private static async Task<Stream> OpenAsync(MqttOptions options, CancellationToken cancellation)
    {
        Socket socket = new(SocketType.Stream, ProtocolType.Tcp) { NoDelay = true };
        Stream? stream = null;
        try
        {
            await socket.ConnectAsync(options.Embedded ? "127.0.0.1" : options.Host, options.Port, cancellation).ConfigureAwait(false);
            stream = new NetworkStream(socket, ownsSocket: true);
            if (!options.UseTls || options.Embedded) return stream;
            SslStream secure = new(stream);
            stream = secure;
            await secure.AuthenticateAsClientAsync(new SslClientAuthenticationOptions { TargetHost = options.Host }, cancellation).ConfigureAwait(false);
            return secure;
        }
        catch
        {
            if (stream is not null) await stream.DisposeAsync().ConfigureAwait(false);
            socket.Dispose();
            throw;
        }
    }

    private async ValueTask FlushAsync(CancellationToken cancellation)
    {
        if (_acknowledgementBytes == 0) return;
        await WriteAsync(_acknowledgements.AsMemory(0, _acknowledgementBytes), cancellation).ConfigureAwait(false);
        _acknowledgementBytes = 0;
    }

    private async ValueTask WriteAsync(ReadOnlyMemory<byte> bytes, CancellationToken cancellation)
    {
        await _writing.WaitAsync(cancellation).ConfigureAwait(false);
        try
        {
            await _stream.WriteAsync(bytes, cancellation).ConfigureAwait(false);
        }
        finally
        {
            _writing.Release();
        }
    }

    /// <summary>
    /// Shows the broker that this end lives, and closes the connection when the broker, asked, stays silent for one and
    /// a half keep-alive times. A receiver that is busy is no silence: then nobody is listening.
    /// </summary>
    private async Task KeepAliveAsync()
    {
        using PeriodicTimer timer = new(_keepAlive / 2, _time);
        try
        {
            while (await timer.WaitForNextTickAsync(_closed.Token).ConfigureAwait(false))
            {
                if (_reader.Quiet > 1.5 * _keepAlive)
                {
                    await _stream.DisposeAsync().ConfigureAwait(false);
                    return;
                }
                await WriteAsync(ConnectPackets.PingRequest, _closed.Token).ConfigureAwait(false);
            }
        }
        catch (Exception exception) when (exception is OperationCanceledException or IOException or ObjectDisposedException)
        {
            // The link is closed, or broken, which the receiver learns from its read.
        }
    }
}
