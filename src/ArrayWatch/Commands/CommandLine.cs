using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Parsing;

namespace ArrayWatch.Commands;

/// <summary>The commands, their help, and what each does.</summary>
internal static class CommandLine
{
    /// <summary>Carries out a command line and answers the exit code.</summary>
    public static async Task<int> RunAsync(string[] arguments)
    {
        RootCommand root = Create();
        ParseResult parsed = root.Parse(arguments);
        if (parsed.Errors.Count > 0 && parsed.Action is not HelpWithExamples)
        {
            foreach (ParseError error in parsed.Errors) await Console.Error.WriteLineAsync(error.Message);
            await Console.Error.WriteLineAsync("Say --help after a command to see what it takes.");
            return ExitCode.BadConfiguration;
        }

        // The host answers SIGTERM and Ctrl-C itself and needs longer than the default.
        return await parsed.InvokeAsync(new InvocationConfiguration { ProcessTerminationTimeout = null, EnableDefaultExceptionHandler = false });
    }

    private static RootCommand Create()
    {
        Option<string> configuration = new("--config", "-c")
        {
            Description = "The configuration file (JSON). Relative paths inside it start from its folder.",
            HelpName = "FILE",
            Required = true,
        };
        Command demo = new("demo", "Shows two invented arrays in which one fault after another appears. Needs nothing else: broker, store and pages run in this process.");
        demo.SetAction(static (_, cancellation) => DemoCommand.RunAsync(cancellation));
        Command run = new("run", "Runs the service until it is told to stop (SIGTERM or Ctrl-C).") { configuration };
        run.SetAction((parsed, cancellation) => RunCommand.RunAsync(parsed.GetValue(configuration)!, cancellation));
        Command check = new("check", "Checks a configuration, prints every error at once, and otherwise what each array is like. Starts nothing.") { configuration };
        check.SetAction(parsed => CheckCommand.Run(parsed.GetValue(configuration)!, Console.Out, Console.Error));
        RootCommand root = new("ArrayWatch watches the channels of a sensor array: it takes snapshots from an MQTT broker, compares their covariance with the noise field's, and tells which channels are wrong, how, since when, and what to do.")
        {
            demo, run, check,
        };
        Dictionary<Command, string> examples = new()
        {
            [root] = """
                Examples:
                  ArrayWatch demo                                  see it work
                  ArrayWatch check --config /etc/arraywatch/arraywatch.json
                  ArrayWatch run --config /etc/arraywatch/arraywatch.json

                Exit codes:
                  0 all well, or stopped as asked   2 bad configuration   3 a port or a file cannot be had
                """,
            [demo] = """
                Example:
                  ArrayWatch demo        then open the address that it prints; Ctrl-C ends it
                """,
            [run] = """
                Examples:
                  ArrayWatch run --config /etc/arraywatch/arraywatch.json
                  ARRAYWATCH__broker__port=1884 ArrayWatch run --config arraywatch.json
                                         any value can be overridden: ARRAYWATCH__section__key,
                                         array elements by number: ARRAYWATCH__arrays__0__id

                Exit codes:
                  0 stopped as asked   2 bad configuration   3 a port or a file cannot be had
                """,
            [check] = """
                Example:
                  ArrayWatch check --config arraywatch.json

                Exit codes:
                  0 the configuration is good   2 it is not; each line on standard error is one cause
                """,
        };
        foreach (HelpOption help in root.Options.OfType<HelpOption>()) help.Action = new HelpWithExamples((HelpAction)help.Action!, examples);
        return root;
    }
}
