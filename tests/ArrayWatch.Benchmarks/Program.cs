using ArrayWatch.Benchmarks;
using BenchmarkDotNet.Running;

// Usage: dotnet run -c Release --project tests/ArrayWatch.Benchmarks -- [--quick] [BenchmarkDotNet's own options]
string? refusal = OpenBlas.Refusal();
if (refusal is not null)
{
    await Console.Error.WriteLineAsync(refusal);
    return 2;
}

Sizes.Quick = args.Contains("--quick");
string[] options = [.. args.Where(a => a != "--quick")];
BenchmarkSwitcher.FromAssembly(typeof(OpenBlas).Assembly).Run(options.Length > 0 ? options : ["--filter", "*"], new SuiteConfig(Sizes.Quick));
return 0;
