using System.CommandLine;
using RiskWorker.Benchmarks.Compare;
using RiskWorker.Benchmarks.Coverage;
using RiskWorker.Benchmarks.Kernels;
using RiskWorker.Benchmarks.Quality;
using RiskWorker.Benchmarks.WalkForward;

var record = new Option<bool>("--record") { Description = "Put the result into results/ under this processor's name", Recursive = true };
var root = new RootCommand("Measures speed against scalar twins and against NumPy, the quality of the draws, and the coverage of the intervals.") { record };
root.Subcommands.Add(KernelCommand.Create(record));
root.Subcommands.Add(CompareCommand.Create(record));
root.Subcommands.Add(WalkForwardCommand.Create(record));
root.Subcommands.Add(QualityCommand.Create(record));
root.Subcommands.Add(CoverageCommand.Create(record));
return await root.Parse(args).InvokeAsync();
