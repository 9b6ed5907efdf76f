using System.Collections.Concurrent;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>An inbox that notes what it gets and can be held up.</summary>
internal sealed class FakeInbox(string id = "aft") : IArrayInbox
{
    private readonly object _gate = new();
    private bool _isHeld;
    private int _inside;

    public string Id { get; } = id;

    public int ChannelCount => 2;

    public ConcurrentQueue<ulong> Sequences { get; } = new();

    public ConcurrentQueue<Refusal> Refusals { get; } = new();

    public ConcurrentQueue<EnvironmentReading> Readings { get; } = new();

    /// <summary>True when it was ever called by two threads at a time.</summary>
    public bool Overlapped { get; private set; }

    /// <summary>Frames that have entered, held up or not.</summary>
    public int Entered { get; private set; }

    /// <summary>What to do with each frame once it is let in.</summary>
    public Action<ulong>? OnFrame { get; set; }

    public void Hold()
    {
        lock (_gate) _isHeld = true;
    }

    public void LetGo()
    {
        lock (_gate)
        {
            _isHeld = false;
            Monitor.PulseAll(_gate);
        }
    }

    public Refusal? Accept(in SnapshotFrame frame)
    {
        try
        {
            return Take(frame.Sequence);
        }
        finally
        {
            Interlocked.Decrement(ref _inside);
        }
    }

    public void Accept(EnvironmentReading reading) => Readings.Enqueue(reading);

    public void Refuse(Refusal refusal) => Refusals.Enqueue(refusal);

    private Refusal? Take(ulong sequence)
    {
        if (Interlocked.Increment(ref _inside) != 1) Overlapped = true;
        Entered++;
        lock (_gate)
        {
            while (_isHeld) Monitor.Wait(_gate);
        }
        OnFrame?.Invoke(sequence);
        Sequences.Enqueue(sequence);
        return null;
    }
}

/// <summary>A directory of fake inboxes.</summary>
internal sealed class FakeDirectory(params FakeInbox[] inboxes) : IArrayDirectory
{
    public IReadOnlyCollection<IArrayInbox> Inboxes { get; } = inboxes;

    public IArrayInbox? Find(string arrayId) => Inboxes.FirstOrDefault(i => i.Id == arrayId);
}
