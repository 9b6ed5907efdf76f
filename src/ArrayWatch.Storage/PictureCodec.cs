using System.IO.Compression;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Storage;

/// <summary>
/// Coherence pictures as one triangle: magnitude in steps of 1/254, phase in steps of 360/254 degrees, separation as
/// a half-precision number; 255 stands for NaN. The whole is Brotli-compressed.
/// </summary>
internal static class PictureCodec
{
    public static byte[] Write(CoherencePicture p)
    {
        using MemoryStream bytes = new();
        using (BrotliStream squeeze = new(bytes, CompressionLevel.Fastest))
        using (BinaryWriter w = new(squeeze))
        {
            w.Write(p.Channels);
            w.Write(p.ModelMagnitude.Length > 0);
            Triangle(p.Channels, (a, _) => w.Write(Byte(p.Magnitude[a], 0, 1)));
            Triangle(p.Channels, (a, _) => w.Write(Byte(p.PhaseDegrees[a], -180, 360)));
            Triangle(p.Channels, (a, _) => w.Write((Half)p.SeparationMetres[a]));
            if (p.ModelMagnitude.Length > 0)
            {
                Triangle(p.Channels, (a, _) => w.Write(Byte(p.ModelMagnitude[a], 0, 1)));
                Triangle(p.Channels, (a, _) => w.Write(Byte(p.ModelPhaseDegrees[a], -180, 360)));
            }
        }

        return bytes.ToArray();
    }

    public static CoherencePicture Read(byte[] body, DateTimeOffset time, double frequency, string scale)
    {
        using BinaryReader r = new(new BrotliStream(new MemoryStream(body), CompressionMode.Decompress));
        int n = r.ReadInt32();
        bool model = r.ReadBoolean();
        float[] Fill(Func<float> next, float mirrored)
        {
            float[] v = new float[n * n];
            Triangle(n, (a, b) =>
            {
                float x = next();
                v[b] = mirrored * x;
                v[a] = x;
            });
            return v;
        }

        float Magnitude() => Value(r.ReadByte(), 0, 1);
        float Phase() => Value(r.ReadByte(), -180, 360);
        float[] magnitude = Fill(Magnitude, 1), phase = Fill(Phase, -1), separation = Fill(() => (float)r.ReadHalf(), 1);
        return new()
        {
            Time = time, Frequency = frequency, Scale = scale, Channels = n,
            Magnitude = magnitude, PhaseDegrees = phase, SeparationMetres = separation,
            ModelMagnitude = model ? Fill(Magnitude, 1) : [], ModelPhaseDegrees = model ? Fill(Phase, -1) : [],
        };
    }

    /// <summary>Visits each pair l ≤ m with the places of [l, m] and [m, l].</summary>
    private static void Triangle(int n, Action<int, int> visit)
    {
        for (int l = 0; l < n; l++)
            for (int m = l; m < n; m++)
                visit((l * n) + m, (m * n) + l);
    }

    private static byte Byte(float v, float low, float span) =>
        float.IsFinite(v) ? (byte)Math.Clamp(MathF.Round((v - low) / span * 254), 0, 254) : (byte)255;

    private static float Value(byte b, float low, float span) => b == 255 ? float.NaN : low + (b * span / 254);
}
