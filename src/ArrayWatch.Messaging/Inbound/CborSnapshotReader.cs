using System.Formats.Cbor;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Reads the fields of a CBOR snapshot message. For one thread at a time.</summary>
internal sealed class CborSnapshotReader
{
    /// <summary>Complex numbers as real and imaginary parts by turns: the IANA registry's tag 43001, around a typed array.</summary>
    private const CborTag ComplexArray = (CborTag)43001;

    private readonly CborReader _reader = new(ReadOnlyMemory<byte>.Empty, CborConformanceMode.Lax);

    /// <summary>Bytes of the last body that were not read.</summary>
    public int BytesRemaining => _reader.BytesRemaining;

    public void Read(ReadOnlyMemory<byte> body, SnapshotFields fields)
    {
        _reader.Reset(body);
        CborValues.EnterMap(_reader);
        while (_reader.PeekState() != CborReaderState.EndMap)
        {
            SnapshotKeys key = SnapshotKeyNames.Parse(CborValues.ReadKey(_reader).Span);
            fields.Meet(key);
            switch (key)
            {
                case SnapshotKeys.Time: fields.TimeSeconds = CborValues.ReadTime(_reader, "time"); break;
                case SnapshotKeys.Sequence: fields.Sequence = CborValues.ReadUnsigned(_reader, "sequence"); break;
                case SnapshotKeys.Interval: fields.IntervalSeconds = CborValues.ReadNumber(_reader, "interval"); break;
                case SnapshotKeys.Overlap: fields.Overlap = CborValues.ReadNumber(_reader, "overlap"); break;
                case SnapshotKeys.Frequencies: ReadFrequencies(fields); break;
                case SnapshotKeys.Shape: ReadShape(fields); break;
                case SnapshotKeys.Data: ReadData(fields); break;
                default: CborValues.Skip(_reader); break;
            }
        }
        CborValues.LeaveMap(_reader);
    }

    private void ReadFrequencies(SnapshotFields fields)
    {
        if (_reader.PeekState() == CborReaderState.Tag)
        {
            TypedArray array = ReadTypedArrayTag("frequencies");
            ReadOnlySpan<byte> bytes = ReadElements(array, "frequencies").Span;
            array.ToDoubles(bytes, fields.TakeFrequencies(bytes.Length / array.ElementBytes));
            return;
        }
        if (_reader.PeekState() != CborReaderState.StartArray)
            MessageRefusedException.NotDecodable($"'frequencies' holds {CborValues.Describe(_reader.PeekState())}; it must be an array of numbers or an RFC 8746 typed array.");
        _reader.ReadStartArray();
        while (_reader.PeekState() != CborReaderState.EndArray) fields.AddFrequency(CborValues.ReadNumber(_reader, "frequencies"));
        _reader.ReadEndArray();
    }

    private void ReadShape(SnapshotFields fields)
    {
        if (_reader.PeekState() != CborReaderState.StartArray)
            MessageRefusedException.WrongShape($"'shape' holds {CborValues.Describe(_reader.PeekState())}; it must be [snapshots, bins, channels].");
        Span<long> shape = stackalloc long[3];
        int count = 0;
        _reader.ReadStartArray();
        for (; _reader.PeekState() != CborReaderState.EndArray; count++)
        {
            ulong length = CborValues.ReadUnsigned(_reader, "shape");
            if (count < shape.Length) shape[count] = (long)Math.Min(length, long.MaxValue);
        }
        _reader.ReadEndArray();
        if (count != shape.Length)
            MessageRefusedException.WrongShape($"'shape' has {count} numbers; it must have three: [snapshots, bins, channels].");
        fields.SetShape(shape);
    }

    private void ReadData(SnapshotFields fields)
    {
        if (_reader.PeekState() == CborReaderState.Tag && _reader.PeekTag() == ComplexArray) _reader.ReadTag();
        if (_reader.PeekState() != CborReaderState.Tag)
            MessageRefusedException.NotDecodable($"'data' holds {CborValues.Describe(_reader.PeekState())}; it must be an RFC 8746 typed array, tag 81, 82, 85 or 86.");
        TypedArray array = ReadTypedArrayTag("data");
        if (!array.IsFloat || array.ElementBytes < sizeof(float))
            MessageRefusedException.NotDecodable($"'data' has CBOR tag {array.Tag}; use float32 (81, 85) or float64 (82, 86).");
        ReadOnlyMemory<byte> bytes = ReadElements(array, "data");
        if (array.IsNativeSingle) fields.UseInPlace(bytes);
        else array.ToSingles(bytes.Span, fields.TakeValues(bytes.Length / array.ElementBytes));
    }

    private TypedArray ReadTypedArrayTag(string key)
    {
        ulong tag = (ulong)_reader.ReadTag();
        if (!TypedArray.TryFromTag(tag, out TypedArray array))
            MessageRefusedException.NotDecodable($"'{key}' has CBOR tag {tag}, which is no typed array of RFC 8746 that this service reads; use float32 (81, 85) or float64 (82, 86).");
        return array;
    }

    private ReadOnlyMemory<byte> ReadElements(TypedArray array, string key)
    {
        if (_reader.PeekState() != CborReaderState.ByteString)
            MessageRefusedException.NotDecodable($"'{key}' has tag {array.Tag} around {CborValues.Describe(_reader.PeekState())}; a typed array is one byte string of stated length.");
        ReadOnlyMemory<byte> bytes = _reader.ReadDefiniteLengthByteString();
        if (bytes.Length % array.ElementBytes != 0)
            MessageRefusedException.WrongShape($"'{key}' has {bytes.Length} bytes, no multiple of its {array.ElementBytes}-byte elements; send whole elements.");
        return bytes;
    }
}
