using System.Globalization;
using BenchmarkDotNet.Columns;
using BenchmarkDotNet.Reports;
using BenchmarkDotNet.Running;

namespace ArrayWatch.Benchmarks;

/// <summary>How many times as fast as the baseline of the same parameters, by the minima.</summary>
internal sealed class SpeedColumn : IColumn
{
    public string Id => nameof(SpeedColumn);

    public string ColumnName => "Speed";

    public bool AlwaysShow => true;

    public ColumnCategory Category => ColumnCategory.Baseline;

    public int PriorityInCategory => 0;

    public bool IsNumeric => true;

    public UnitType UnitType => UnitType.Dimensionless;

    public string Legend => "Baseline's shortest time over this one's, same parameters";

    public string GetValue(Summary summary, BenchmarkCase benchmarkCase)
    {
        BenchmarkCase? baseline = summary.BenchmarksCases.FirstOrDefault(c => c.Descriptor.Baseline && c.Descriptor.Type == benchmarkCase.Descriptor.Type && c.Parameters.DisplayInfo == benchmarkCase.Parameters.DisplayInfo);
        double? reference = baseline is null ? null : summary[baseline]?.ResultStatistics?.Min;
        double? own = summary[benchmarkCase]?.ResultStatistics?.Min;
        return reference / own is { } ratio ? ratio.ToString("0.00", CultureInfo.InvariantCulture) : "–";
    }

    public string GetValue(Summary summary, BenchmarkCase benchmarkCase, SummaryStyle style) => GetValue(summary, benchmarkCase);

    public bool IsAvailable(Summary summary) => true;

    public bool IsDefault(Summary summary, BenchmarkCase benchmarkCase) => false;
}
