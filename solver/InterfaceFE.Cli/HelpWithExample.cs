using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace InterfaceFE.Cli;

/// <summary>A command with an example for its help.</summary>
internal sealed class ExampleCommand(string name, string description, string example) : Command(name, description)
{
    /// <summary>Lines that a person could type.</summary>
    public string Example => example;
}

/// <summary>The usual help, then an example, what exit codes mean, and the caution.</summary>
internal sealed class HelpWithExample(HelpAction usual) : SynchronousCommandLineAction
{
    public const string Caution = """
        Caution:
          A simulation is no proof of strength. Laws of layers scatter with rate, temperature, humidity,
          surface treatment and ageing. Verify by test. The design is the responsibility of a qualified
          engineer under the applicable codes.
        """;

    private const string RootExample = """
          interfacefe check inputs/coupons/peel-epoxy.yaml
          interfacefe run inputs/coupons/peel-epoxy.yaml --into results/peel-epoxy
        """;

    private const string Codes = """
        Exit codes:
          0 done   1 the deck or the call is wrong   2 a check fell short
          3 stopped early   4 an error in the program   130 interrupted
        """;

    public override int Invoke(ParseResult parseResult)
    {
        int code = usual.Invoke(parseResult);
        TextWriter output = parseResult.InvocationConfiguration.Output;
        output.WriteLine("Example:");
        output.WriteLine(parseResult.CommandResult.Command is ExampleCommand command ? command.Example : RootExample);
        output.WriteLine();
        output.WriteLine(Codes);
        output.WriteLine();
        output.WriteLine(Caution);
        return code;
    }
}
