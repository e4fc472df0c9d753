using RiskWorker.Host;
using RiskWorker.Host.Verbs;

var terminal = Terminal.OfProcess(TimeProvider.System);
using var interruption = new Interruption();
return (int)await new CommandTree(Composition.UseCases(TimeProvider.System), terminal).RunAsync(args, interruption.Token);
