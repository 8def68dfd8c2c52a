using System.Diagnostics;
using CloudStruct.Recipes;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Runs.Board;
using CloudStruct.Runs.Store;
using CloudStruct.Stages.Intake;
using static System.FormattableString;

namespace CloudStruct.Runs;

/// <summary>Runs stages one after another: from the store where it holds the result, with progress, times and remarks.</summary>
internal sealed class StageRunner(StageStore store, IBoard board, ulong seed, int threads, CancellationToken stop)
{
    private readonly List<Remark> remarks = [];
    private readonly List<StageTime> times = [];

    /// <summary>All remarks so far, in order of stages.</summary>
    public Remark[] Remarks => [.. remarks];

    /// <summary>Times of the stages so far.</summary>
    public StageTime[] Times => [.. times];

    /// <summary>Adds a remark that no stage made.</summary>
    public void Say(Remark remark) => remarks.Add(remark);

    /// <summary>A stage whose record is kept in the store.</summary>
    /// <param name="stage">The stage.</param>
    /// <param name="input">What it takes.</param>
    /// <param name="settings">Its settings.</param>
    /// <param name="inputKey">Content hash of the input; becomes that of the record.</param>
    /// <param name="points">Points it works on, for the progress line; 0 says nothing.</param>
    /// <param name="lean">Takes out of the record what the input holds already, before it is kept.</param>
    /// <param name="whole">Puts it back.</param>
    public TOut Run<TIn, TSettings, TOut>(
        IStage<TIn, TSettings, TOut> stage,
        TIn input,
        TSettings settings,
        ref string inputKey,
        long points = 0,
        Func<TOut, TOut>? lean = null,
        Func<TOut, TOut>? whole = null)
        where TSettings : IStageSettings
    {
        string key = Fingerprint.OfText(stage.Name, inputKey, RecipeJson.Of(settings).ToJsonString(), Invariant($"{seed}"), Fingerprint.Code);
        inputKey = key;
        return Timed(stage.Name, points, report =>
        {
            if (store.Find<TOut>(stage.Name, key) is { } found)
            {
                remarks.AddRange(found.Remarks);
                return (whole is null ? found.Record : whole(found.Record), true);
            }

            List<Remark> said = [];
            TOut record = stage.Run(input, settings, new StageContext(seed, threads, said.Add, report, stop));
            remarks.AddRange(said);
            store.Keep(stage.Name, key, new Stored<TOut>(lean is null ? record : lean(record), [.. said]));
            return (record, false);
        });
    }

    /// <summary>The intake: its findings are kept, its stream of points is opened again.</summary>
    public IPieces RunIntake(SurveyInput input, IntakeSettings settings, ref string inputKey, long points)
    {
        var stage = new IntakeStage();
        string key = Fingerprint.OfText(stage.Name, inputKey, RecipeJson.Of(settings).ToJsonString(), Fingerprint.Code);
        inputKey = key;
        return Timed<IPieces>(stage.Name, points, report =>
        {
            if (store.Find<IntakeRecord>(stage.Name, key) is { } found)
            {
                remarks.AddRange(found.Remarks);
                return (new Pieces(input, found.Record), true);
            }

            List<Remark> said = [];
            IPieces pieces = stage.Run(input, settings, new StageContext(seed, threads, said.Add, report, stop));
            remarks.AddRange(said);
            store.Keep(stage.Name, key, new Stored<IntakeRecord>(pieces.Record, [.. said]));
            return (pieces, false);
        });
    }

    /// <summary>Work that is not kept, timed and shown like a stage.</summary>
    public T Timed<T>(string name, long points, Func<Action<double>, (T Result, bool Cached)> work)
    {
        stop.ThrowIfCancellationRequested();
        Action<double> report = board.Begin(name, points);
        var clock = Stopwatch.StartNew();
        (T result, bool cached) = work(report);
        // What a stage left behind would otherwise lie beneath the next one's peak: 1.55 GiB became less for 2 M points.
        GC.Collect(2, GCCollectionMode.Aggressive, blocking: true, compacting: true);
        double seconds = clock.Elapsed.TotalSeconds;
        times.Add(new StageTime(name, seconds, cached));
        board.End(name, seconds, cached ? "from the store" : points > 0 && seconds > 0.05 ? Invariant($"{points / seconds / 1e6:0.00} M points/s") : "");
        return result;
    }

    /// <summary>A context for work that is not a stage but takes one.</summary>
    public StageContext Context(Action<double> report) => new(seed, threads, remarks.Add, report, stop);
}
