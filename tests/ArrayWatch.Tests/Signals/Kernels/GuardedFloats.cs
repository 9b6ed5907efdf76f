using System.Runtime.InteropServices;

namespace ArrayWatch.Tests.Signals.Kernels;

/// <summary>Aligned memory between two stretches of canaries, to tell a write beyond either end.</summary>
internal sealed unsafe class GuardedFloats : IDisposable
{
    private const int Guard = 1024;
    private const float Canary = -12345.678f;
    private readonly float* _all;
    private readonly int _length;

    public GuardedFloats(int length, float fill)
    {
        _length = length;
        _all = (float*)NativeMemory.AlignedAlloc((nuint)((length + (2 * Guard)) * sizeof(float)), 64);
        new Span<float>(_all, length + (2 * Guard)).Fill(Canary);
        Values.Fill(fill);
    }

    public float* Start => _all + Guard;

    public Span<float> Values => new(Start, _length);

    public void CheckGuards()
    {
        Assert.Equal(-1, new ReadOnlySpan<float>(_all, Guard).IndexOfAnyExcept(Canary));
        Assert.Equal(-1, new ReadOnlySpan<float>(Start + _length, Guard).IndexOfAnyExcept(Canary));
    }

    public void Dispose() => NativeMemory.AlignedFree(_all);
}
