using System.Net;
using System.Net.Sockets;

namespace ArrayWatch.EndToEnd.Tests.Servers;

/// <summary>A network between two programs that a test can cut, stop and listen in on.</summary>
public sealed class TcpRelay : IAsyncDisposable
{
    private readonly TcpListener _listener = new(IPAddress.Loopback, 0);
    private readonly CancellationTokenSource _stop = new();
    private readonly Lock _lock = new();
    private readonly List<Socket> _sockets = [];
    private readonly int _targetPort;
    private readonly Task _accepting;
    private int _acknowledgements;
    private volatile bool _isOpen = true;
    private volatile bool _isSilent;

    /// <summary>Relays to a loopback port.</summary>
    public TcpRelay(int targetPort)
    {
        _targetPort = targetPort;
        _listener.Start();
        Port = ((IPEndPoint)_listener.LocalEndpoint).Port;
        _accepting = AcceptAsync();
    }

    /// <summary>Port to connect to.</summary>
    public int Port { get; }

    /// <summary>MQTT PUBACK packets that clients have sent.</summary>
    public int Acknowledgements => Volatile.Read(ref _acknowledgements);

    /// <summary>Breaks all connections and refuses new ones until <see cref="Mend"/>.</summary>
    public void Cut()
    {
        _isOpen = false;
        lock (_lock)
        {
            foreach (Socket socket in _sockets) Reset(socket);
            _sockets.Clear();
        }
    }

    /// <summary>Takes connections again.</summary>
    public void Mend() => _isOpen = true;

    /// <summary>Keeps the connections but lets nothing through from the server, as a network that swallows everything.</summary>
    public void Silence() => _isSilent = true;

    /// <summary>Lets new connections through; what was silenced stays so.</summary>
    public void Speak() => _isSilent = false;

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await _stop.CancelAsync();
        _listener.Stop();
        Cut();
        await _accepting;
        _stop.Dispose();
    }

    private static void Reset(Socket socket)
    {
        try
        {
            socket.LingerState = new LingerOption(true, 0);
            socket.Dispose();
        }
        catch (Exception exception) when (exception is SocketException or ObjectDisposedException)
        {
            // Closed already.
        }
    }

    private async Task AcceptAsync()
    {
        try
        {
            while (true)
            {
                Socket client = await _listener.AcceptSocketAsync(_stop.Token);
                if (!_isOpen)
                {
                    Reset(client);
                    continue;
                }
                Socket server = new(SocketType.Stream, ProtocolType.Tcp) { NoDelay = true };
                lock (_lock) _sockets.AddRange([client, server]);
                _ = RelayAsync(client, server);
            }
        }
        catch (Exception exception) when (exception is OperationCanceledException or SocketException or ObjectDisposedException)
        {
            // Disposed.
        }
    }

    private async Task RelayAsync(Socket client, Socket server)
    {
        try
        {
            client.NoDelay = true;
            await server.ConnectAsync(IPAddress.Loopback, _targetPort);
            await Task.WhenAll(PumpAsync(client, server, new PacketCounter(this).Take), PumpAsync(server, client, null));
        }
        catch (SocketException)
        {
            // The server is away; the client learns it below.
        }
        client.Dispose();
        server.Dispose();
    }

    private async Task PumpAsync(Socket from, Socket to, Action<ReadOnlySpan<byte>>? observe)
    {
        byte[] buffer = new byte[64 * 1024];
        bool silenced = false;
        try
        {
            while (await from.ReceiveAsync(buffer) is var count and > 0)
            {
                observe?.Invoke(buffer.AsSpan(0, count));
                silenced |= observe is null && _isSilent;
                if (!silenced) await to.SendAsync(buffer.AsMemory(0, count));
            }
            to.Shutdown(SocketShutdown.Send);
        }
        catch (Exception exception) when (exception is SocketException or ObjectDisposedException)
        {
            // Cut by either end: the other learns it too.
            Reset(from);
            Reset(to);
        }
    }

    /// <summary>Counts acknowledgements in what a client sends.</summary>
    private sealed class PacketCounter(TcpRelay relay)
    {
        private int _position, _length, _left;

        public void Take(ReadOnlySpan<byte> bytes)
        {
            foreach (byte b in bytes)
            {
                if (_left > 0)
                {
                    _left--;
                }
                else if (_position++ == 0)
                {
                    if (b >> 4 == 4) Interlocked.Increment(ref relay._acknowledgements);
                    _length = 0;
                }
                else
                {
                    _length |= (b & 0x7F) << (7 * (_position - 2));
                    if (b < 0x80) (_left, _position) = (_length, 0);
                }
            }
        }
    }
}
