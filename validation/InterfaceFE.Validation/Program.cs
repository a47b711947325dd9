using System.Reflection;
using InterfaceFE.Decks;
using InterfaceFE.Validation.Framework;
using InterfaceFE.Validation.Replays;

const string Usage = """
    Published and computed cases against the program's answers.
      all [--quick]   all cases, or those that together take about a minute; all of them write validation/REPORT.md
      list            names and groups of the cases
      NAME…           the cases of these names
      record DIR [--deep]   runs all shipped decks and keeps their tables below DIR; --deep converges each point to rounding
      replay DIR            makes the points of all runs below DIR again and compares their tables: at most 1e-9 apart
    """;

IReadOnlyList<ICase> cases = CaseFinder.In(Assembly.GetExecutingAssembly());
if (args.Length == 0 || args[0] is "--help" or "-h")
{
    Console.WriteLine(Usage);
    return args.Length == 0 ? 1 : 0;
}
if (args is ["list"])
{
    int widest = cases.Max(c => c.Name.Length);
    foreach (ICase one in cases)
        Console.WriteLine($"{one.Name.PadRight(widest)}  {(one.Quick ? "quick" : "     ")}  {one.Group}");
    return 0;
}
if (args is ["record" or "replay", ..])
{
    bool isDeep = args is ["record", _, "--deep"];
    if (args.Length != (isDeep ? 3 : 2) || Repository.RootAbove(Directory.GetCurrentDirectory()) is not { } top)
    {
        Console.Error.WriteLine($"`{args[0]}` takes one folder, and is run inside the repository");
        return 1;
    }
    var verbs = new ReplayVerbs(Console.Out, Console.Error);
    return args[0] == "record" ? verbs.Record(top, args[1], isDeep) : verbs.Replay(args[1]);
}
bool isAll = args[0] == "all", isQuick = args.Contains("--quick");
string[] names = [.. args.Where(a => a != "--quick")];
string[] unknown = isAll ? names[1..] : [.. names.Where(n => cases.All(c => c.Name != n))];
if (unknown.Length > 0 || names.Length == 0)
{
    Console.Error.WriteLine(names.Length == 0 ? Usage : $"no case is called {string.Join(", ", unknown)}; `list` gives the names");
    return 1;
}
if (Repository.RootAbove(Directory.GetCurrentDirectory()) is not { } root)
{
    Console.Error.WriteLine("InterfaceFE.sln was not found here or in a folder above: run this inside the repository");
    return 1;
}
CaseRunner runner = new(Console.Out, Console.Error, root, isQuick);
foreach (ICase one in cases.Where(c => isAll ? !isQuick || c.Quick : names.Contains(c.Name)))
    runner.Run(one);
if (isAll && !isQuick)
{
    Report.Write(root, runner.Outcomes, typeof(Deck).Assembly.GetName().Version?.ToString(3) ?? "", DateOnly.FromDateTime(DateTime.Today));
    Console.Error.WriteLine("written: " + Path.Combine("validation", "REPORT.md"));
}
Console.WriteLine($"{runner.Holding} hold, {runner.NotHolding} do not");
return runner.NotHolding == 0 && runner.Holding > 0 ? 0 : 2;
