using System.Globalization;
using System.Runtime.InteropServices;
using System.Text;
using InterfaceFE.Cli;

CultureInfo.DefaultThreadCurrentCulture = CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
CultureInfo.DefaultThreadCurrentUICulture = CultureInfo.CurrentUICulture = CultureInfo.InvariantCulture;
Console.OutputEncoding = new UTF8Encoding(encoderShouldEmitUTF8Identifier: false);

// The first signal asks for an orderly end; a second one ends the process at once.
using var stop = new CancellationTokenSource();
void Ask(PosixSignalContext signal)
{
    if (stop.IsCancellationRequested)
        return;
    signal.Cancel = true;
    Console.Error.WriteLine("stopping: what was found so far is being written (once more ends at once)");
    stop.Cancel();
}

using PosixSignalRegistration interrupt = PosixSignalRegistration.Create(PosixSignal.SIGINT, Ask);
using PosixSignalRegistration terminate = PosixSignalRegistration.Create(PosixSignal.SIGTERM, Ask);
using PosixSignalRegistration hangUp = PosixSignalRegistration.Create(PosixSignal.SIGHUP, Ask);
return CommandLine.Run(args, Console.Out, Console.Error, stop.Token);
