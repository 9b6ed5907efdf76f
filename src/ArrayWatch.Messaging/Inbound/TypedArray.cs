using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>
/// The typed arrays of RFC 8746 (2020), section 2: tags 64 to 87 are 0b010_f_s_e_ll, with f for floating
/// point, s for signed, e for little-endian and elements of 2^(f+ll) bytes.
/// </summary>
internal readonly struct TypedArray
{
    private const ulong Reserved = 76;

    private TypedArray(ulong tag)
    {
        Tag = tag;
        IsFloat = (tag & 0x10) != 0;
        IsSigned = (tag & 0x08) != 0;
        IsLittleEndian = (tag & 0x04) != 0;
        ElementBytes = 1 << ((IsFloat ? 1 : 0) + (int)(tag & 0x03));
    }

    public ulong Tag { get; }

    public bool IsFloat { get; }

    public bool IsSigned { get; }

    public bool IsLittleEndian { get; }

    /// <summary>Bytes of one element.</summary>
    public int ElementBytes { get; }

    /// <summary>True when the span can be viewed as the machine's own float32 without conversion.</summary>
    public bool IsNativeSingle => IsFloat && ElementBytes == 4 && IsLittleEndian == BitConverter.IsLittleEndian;

    /// <summary>The typed array of a tag; false when the tag means none, or one that no number type here holds.</summary>
    public static bool TryFromTag(ulong tag, out TypedArray array)
    {
        array = default;
        // 64..79 are integers, 80..87 floating point, of which 83 and 87 have 128 bits.
        if (tag is < 64 or > 87 or Reserved or 83 or 87) return false;
        array = new TypedArray(tag);
        return true;
    }

    /// <summary>Converts float32 or float64 elements to the machine's float32; the destination has one element for each.</summary>
    public void ToSingles(ReadOnlySpan<byte> bytes, Span<float> destination)
    {
        if (ElementBytes == 4)
        {
            ReadOnlySpan<uint> words = MemoryMarshal.Cast<byte, uint>(bytes);
            Span<uint> target = MemoryMarshal.Cast<float, uint>(destination);
            if (IsLittleEndian == BitConverter.IsLittleEndian) words.CopyTo(target);
            else BinaryPrimitives.ReverseEndianness(words, target);
        }
        else if (IsLittleEndian == BitConverter.IsLittleEndian)
        {
            Narrow(MemoryMarshal.Cast<byte, double>(bytes), destination);
        }
        else
        {
            for (int i = 0; i < destination.Length; i++) destination[i] = (float)ToDouble(bytes.Slice(i * 8, 8));
        }
    }

    /// <summary>Converts elements of any kind to doubles; the destination has one element for each.</summary>
    public void ToDoubles(ReadOnlySpan<byte> bytes, Span<double> destination)
    {
        for (int i = 0; i < destination.Length; i++) destination[i] = ToDouble(bytes.Slice(i * ElementBytes, ElementBytes));
    }

    private double ToDouble(ReadOnlySpan<byte> element)
    {
        ulong bits = 0;
        for (int i = 0; i < element.Length; i++) bits = (bits << 8) | element[IsLittleEndian ? element.Length - 1 - i : i];
        if (IsFloat)
        {
            return ElementBytes switch
            {
                2 => (double)BitConverter.UInt16BitsToHalf((ushort)bits),
                4 => BitConverter.UInt32BitsToSingle((uint)bits),
                _ => BitConverter.UInt64BitsToDouble(bits),
            };
        }
        if (!IsSigned) return bits;
        int unused = 64 - 8 * ElementBytes;
        return (long)(bits << unused) >> unused;
    }

    private static void Narrow(ReadOnlySpan<double> source, Span<float> destination)
    {
        int i = 0;
        // Two vectors of doubles make one of floats, rounded to nearest as the scalar cast does.
        for (int step = Vector256<float>.Count; Vector256.IsHardwareAccelerated && i <= destination.Length - step; i += step)
            Vector256.Narrow(Vector256.Create(source[i..]), Vector256.Create(source[(i + step / 2)..])).CopyTo(destination[i..]);
        for (; i < destination.Length; i++) destination[i] = (float)source[i];
    }
}
