using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace ArrayWatch.Commands;

/// <summary>The usual help, and examples below it.</summary>
internal sealed class HelpWithExamples(HelpAction usual, IReadOnlyDictionary<Command, string> examples) : SynchronousCommandLineAction
{
    /// <inheritdoc/>
    public override bool ClearsParseErrors => true;

    /// <inheritdoc/>
    public override int Invoke(ParseResult parseResult)
    {
        int result = usual.Invoke(parseResult);
        if (examples.TryGetValue(parseResult.CommandResult.Command, out string? text))
            parseResult.InvocationConfiguration.Output.WriteLine(text);
        return result;
    }
}
