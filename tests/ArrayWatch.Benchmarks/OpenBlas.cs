using System.Runtime.InteropServices;
using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Benchmarks;

/// <summary>The native library that the kernels are compared with (Debian: libopenblas0-pthread), on one thread.</summary>
internal static unsafe partial class OpenBlas
{
    public const int RowMajor = 101;
    public const int ColumnMajor = 102;
    public const int NoTranspose = 111;
    public const int Lower = 122;

    private const string Library = "libopenblas.so.0";
    private const string CoreType = "OPENBLAS_CORETYPE";

    public static bool IsPresent { get; } = Load();

    /// <summary>Why nothing should be measured here, or null.</summary>
    /// <remarks>
    /// The variable makes the library use another processor's kernels, some 20–45 % slower. It is right only when both
    /// sides are held to 256-bit vectors.
    /// </remarks>
    public static string? Refusal()
    {
        string? core = Environment.GetEnvironmentVariable(CoreType);
        if (string.IsNullOrEmpty(core)) return null;
        if (core == "Haswell" && KernelTiers.Best == KernelTier.Avx2) return null;
        return $"{CoreType}={core} slows the library that is compared with: unset it ('env -u {CoreType} dotnet run …'), or compare 256-bit kernels with DOTNET_EnableAVX512=0 {CoreType}=Haswell.";
    }

    [LibraryImport(Library, EntryPoint = "cblas_cherk")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static partial void Cherk(int order, int triangle, int transpose, int n, int k, float alpha, float* a, int lda, float beta, float* c, int ldc);

    [LibraryImport(Library, EntryPoint = "cblas_zgemm")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static partial void Zgemm(int order, int transposeA, int transposeB, int m, int n, int k, double* alpha, double* a, int lda, double* b, int ldb, double* beta, double* c, int ldc);

    [LibraryImport(Library, EntryPoint = "zpotrf_")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static partial void Zpotrf(byte* triangle, int* n, double* a, int* lda, int* info);

    [LibraryImport(Library, EntryPoint = "zpotri_")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    public static partial void Zpotri(byte* triangle, int* n, double* a, int* lda, int* info);

    [LibraryImport(Library, EntryPoint = "openblas_set_num_threads")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static partial void SetThreads(int threads);

    private static bool Load()
    {
        if (!NativeLibrary.TryLoad(Library, out _)) return false;
        SetThreads(1);
        return true;
    }

    /// <summary>Ends a benchmark that has nothing to compare with.</summary>
    public static void Require()
    {
        if (!IsPresent) throw new InvalidOperationException($"{Library} is not installed: apt-get install libopenblas0-pthread");
    }
}
