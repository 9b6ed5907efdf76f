using BenchmarkDotNet.Columns;
using BenchmarkDotNet.Configs;
using BenchmarkDotNet.Exporters;
using BenchmarkDotNet.Jobs;
using BenchmarkDotNet.Loggers;
using BenchmarkDotNet.Toolchains.InProcess.Emit;
using Perfolizer.Horology;

namespace ArrayWatch.Benchmarks;

/// <summary>
/// One process for all, so that every candidate sees the same machine, and the ratio of minima beside the
/// medians: on a shared machine the minimum is what others disturb least.
/// </summary>
internal sealed class SuiteConfig : ManualConfig
{
    public SuiteConfig(bool quick)
    {
        Job job = Job.Default.WithToolchain(InProcessEmitToolchain.Instance).WithWarmupCount(quick ? 2 : 3)
            .WithIterationCount(quick ? 5 : 9).WithIterationTime(TimeInterval.FromMilliseconds(quick ? 100 : 200));
        AddJob(job.WithId(quick ? "quick" : "full"));
        AddLogger(ConsoleLogger.Default);
        AddColumn(TargetMethodColumn.Method, StatisticColumn.Median, StatisticColumn.Min, new SpeedColumn());
        AddColumnProvider(DefaultColumnProviders.Params);
        AddExporter(MarkdownExporter.GitHub);
        WithOptions(ConfigOptions.DisableLogFile);
    }
}
