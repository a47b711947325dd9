using InterfaceFE.Decks.Reading;
using InterfaceFE.Results;
using InterfaceFE.Runs;

DeckReading reading = DeckReader.Read(args[1]);
foreach (ReadProblem p in reading.Problems) Console.Error.WriteLine(p);
foreach (ReadProblem p in reading.Warnings) Console.Error.WriteLine(p);
if (reading.Deck is null) return 1;
FolderRun.Clear(args[3]);
var r = new FolderRun(args[3], Console.Error.WriteLine).Execute(reading.Deck, [], default);
SummaryText.Write(r.Summary, Console.Out);
return 0;
