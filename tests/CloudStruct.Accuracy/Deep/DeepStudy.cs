using System.Collections.Concurrent;
using CloudStruct.Simulate;
using static System.FormattableString;

namespace CloudStruct.Accuracy.Deep;

/// <summary>Every figure of the accuracy page on families of fresh outcrops, with its interval and its floor.</summary>
/// <remarks>deep --out docs/accuracy-tables.md makes the tables of the accuracy page anew. --plan, --seeds and --points choose less or other.</remarks>
public sealed class DeepStudy : IStudy
{
    /// <inheritdoc/>
    public void Run(StudyOptions options)
    {
        string[] plans = options.Plans.Length > 0 ? options.Plans : [.. Family.All.Select(f => f.Plan)];
        foreach (string plan in plans)
        {
            Family family = Family.Of(plan);
            StudyOptions own = options with
            {
                Seeds = options.SeedsGiven ? options.Seeds : [.. Enumerable.Range(0, family.Outcrops).Select(i => Family.FirstSeed + (ulong)i)],
                Points = options.Points ?? family.Points,
            };
            FamilyScore score = Score(plan, own);
            string table = AccuracyTable.Of(score, own);
            Console.WriteLine(table);
            if (options.Out is { } file) File.AppendAllText(file, table + "\n");
        }
    }

    /// <summary>All seeds of one plan.</summary>
    public static FamilyScore Score(string plan, StudyOptions options)
    {
        var score = new FamilyScore(Family.Of(plan));
        var waiting = new ConcurrentDictionary<int, WholeScene>();
        int next = 0;
        var gate = new Lock();
        Parallel.For(0, options.Seeds.Length, new ParallelOptions { MaxDegreeOfParallelism = options.Workers }, i =>
        {
            waiting[i] = new WholeScene(OutcropPlan.ByName(plan), options.Seeds[i], options.Points, threads: 1);
            lock (gate)
            {
                // In the order of the seeds, whoever is ready first; a scene is let go once it is counted.
                while (waiting.TryRemove(next, out WholeScene? ready))
                {
                    Console.Error.WriteLine(WholeStudy.Line(plan, options.Seeds[next], ready));
                    score.Add(ready);
                    next++;
                }
            }
        });
        return score;
    }
}
