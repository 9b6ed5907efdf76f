using System.Collections.Concurrent;
using System.CommandLine;
using ArrayWatch.Simulation;
using ArrayWatch.Trials;

Option<int> number = new("--number", "-n") { Description = "Trials of each kind", DefaultValueFactory = _ => 20 };
Option<string> kinds = new("--kinds", "-k") { Description = "Names, separated by commas; 'faults', 'healthy' or 'all'", DefaultValueFactory = _ => "all" };
Option<double> warmUp = new("--warm-up") { Description = "Seconds of event time before a fault", DefaultValueFactory = _ => 1200 };
Option<double> watch = new("--watch") { Description = "Seconds of event time after a fault", DefaultValueFactory = _ => 600 };
Option<double> hours = new("--hours") { Description = "Hours of event time of each healthy scene", DefaultValueFactory = _ => 2 };
Option<double> size = new("--size") { Description = "Size of faults, times tolerance", DefaultValueFactory = _ => 2 };
Option<ulong> start = new("--start-value", "-s") { Description = "Start value of the generator", DefaultValueFactory = _ => 1 };
Option<int> threads = new("--threads") { Description = "Trials side by side", DefaultValueFactory = _ => 2 };
Option<bool> verbose = new("--verbose", "-v") { Description = "List every trial that did not go as it should" };
Option<ulong?> replay = new("--replay") { Description = "Start value of one trial of the one kind named, told decision by decision" };
Option<bool> demo = new("--demo") { Description = "Play the demonstration's scenes instead and tell what is raised beside what is wrong" };
RootCommand root = new("Draws arrays, fields, nuisances and faults, runs the diagnosis on them, and prints how it did.")
{
    number, kinds, warmUp, watch, hours, size, start, threads, verbose, replay, demo,
};
root.SetAction(result =>
{
    TrialOptions options = new()
    {
        Number = result.GetValue(number),
        Kinds = Names(result.GetValue(kinds) ?? "all"),
        WarmUpSeconds = result.GetValue(warmUp),
        WatchSeconds = result.GetValue(watch),
        HealthyHours = result.GetValue(hours),
        Size = result.GetValue(size),
        StartValue = result.GetValue(start),
        Threads = result.GetValue(threads),
        Verbose = result.GetValue(verbose),
        Replay = result.GetValue(replay),
    };
    if (result.GetValue(demo))
    {
        foreach (DemoScene scene in DemoScenes.All()) Telling.Schedule(TrialRun.Run(TrialDraw.Demonstration(scene), options with { WarmUpSeconds = 0, HealthyHours = 0.24 }), Console.Out);
        return 0;
    }

    string[] unknown = [.. options.Kinds.Where(k => !FaultKinds.Has(k) && !Nuisances.Has(k))];
    if (unknown.Length > 0)
    {
        Console.Error.WriteLine($"unknown: {string.Join(", ", unknown)}; known: {string.Join(", ", FaultKinds.Names.Concat(Nuisances.Names))}");
        return 2;
    }

    if (options.Replay is { } one)
    {
        TrialCase trial = TrialDraw.Draw(options.Kinds[0], one, options);
        TrialOutcome outcome = TrialRun.Run(trial, options, (time, d) =>
        {
            if (options.Verbose || time > options.WarmUpSeconds - 60) Telling.Decision(time, d, trial, Console.Out);
        });
        Telling.Outcome(outcome, Console.Out);
        return 0;
    }

    ConcurrentDictionary<(string, int), TrialOutcome> done = new();
    (string Kind, int Index)[] work = [.. Enumerable.Range(0, options.Number).SelectMany(i => options.Kinds.Select(k => (k, i)))];
    Parallel.ForEach(
        Partitioner.Create(work, EnumerablePartitionerOptions.NoBuffering), new ParallelOptions { MaxDegreeOfParallelism = options.Threads }, w =>
        {
            // Thirty-two bits are enough to tell trials apart, and short enough to type.
            ulong own = new RandomNumbers(options.StartValue).Fork(w.Index).NextBits() >> 32;
            TrialOutcome outcome = TrialRun.Run(TrialDraw.Draw(w.Kind, own, options), options);
            done[w] = outcome;
            if (!options.Verbose || outcome.IsClean) return;
            lock (done) Telling.Outcome(outcome, Console.Out);
        });
    TrialOutcome[] outcomes = [.. options.Kinds.SelectMany(k => Enumerable.Range(0, options.Number).Select(i => done[(k, i)]))];
    if (outcomes.Any(o => o.Case.Fault is not null)) Console.WriteLine(FaultTable.Format(outcomes));
    if (outcomes.Any(o => o.Case.Fault is null)) Console.WriteLine(HealthyTable.Format(outcomes));
    return 0;
});
return root.Parse(args).Invoke();

static string[] Names(string list) => list switch
{
    "all" => [.. FaultKinds.Names, .. Nuisances.Names],
    "faults" => [.. FaultKinds.Names],
    "healthy" => [.. Nuisances.Names],
    _ => list.Split(',', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries),
};
