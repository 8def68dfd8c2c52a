using System.Globalization;
using System.Text;
using System.Text.Json.Nodes;
using CloudStruct.Products;
using CloudStruct.Recipes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Records.Width;
using CloudStruct.Runs.Board;
using CloudStruct.Runs.Store;
using CloudStruct.Stages.Classify;
using CloudStruct.Stages.Contacts;
using CloudStruct.Stages.Decisions;
using CloudStruct.Stages.Describe;
using CloudStruct.Stages.Drawings;
using CloudStruct.Stages.Faces;
using CloudStruct.Stages.Intake;
using CloudStruct.Stages.Sets;
using CloudStruct.Stages.Thin;
using CloudStruct.Stages.Width;

namespace CloudStruct.Runs;

/// <summary>One survey from files to results: checks first, then the stages in their order, then results whole or not at all.</summary>
internal sealed class MeasureRun(MeasureRequest request, IBoard board, CancellationToken stop)
{
    private const string StoreName = ".cloudstruct-cache";
    private const string LogName = "run.log";

    // Results are dominated by classified.las (36 + 10 bytes a point); the store by the described cloud. Rounded up.
    private const long ResultBytesPerPoint = 60;
    private const long StoreBytesPerPoint = 400;

    /// <summary>Runs.</summary>
    public MeasureOutcome Run()
    {
        SurveyFolder survey = SurveyFolder.Open(request.Survey);
        string final = Path.TrimEndingDirectorySeparator(Path.GetFullPath(request.Out ?? survey.UsualOut));
        ResultFolder.CheckPlace(final);
        Recipe recipe = RecipeShelf.Compose(survey.Notes, survey.Root, request.Recipe);
        var evidence = SurveyEvidence.Open(survey, recipe, stop);
        long points = evidence.Input.Sources.Sum(s => s.Header.Points);
        (double budgetGib, double estimateGib) = MemoryBudget.Settle(request.MemoryGib, points);
        string storeFolder = Path.GetFullPath(request.Cache ?? Path.Combine(Path.GetDirectoryName(final)!, StoreName));
        DiskSpace.Check(Path.GetDirectoryName(final)!, points * ResultBytesPerPoint, "results");
        bool roomForStore = DiskSpace.Has(Path.GetDirectoryName(storeFolder)!, points * StoreBytesPerPoint);

        using var results = ResultFolder.Begin(final);
        using StageStore store = StageStore.Open(roomForStore ? storeFolder : null, request.Fresh, out string? notKept);
        var runner = new StageRunner(store, board, request.Seed, request.Threads, stop);
        try
        {
            foreach (Remark r in evidence.Remarks) runner.Say(r);
            InputFile[] inputs = runner.Timed("files", 0, _ => (evidence.Hash(survey, stop), false));
            JsonObject recipeJson = RecipeJson.Of(recipe);
            string runId = RunRecord.IdOf(inputs, recipeJson, request.Seed);
            (Findings findings, DrawingsRecord drawings, IPieces pieces) = Stages(survey, recipe, evidence, inputs, runner);

            RunFacts facts = Facts(survey, recipe, evidence, inputs, runId, findings);
            IReadOnlyList<string> written = runner.Timed("products", 0, report =>
                (new ProductsWriter().Write(results.Building, findings, drawings, pieces, facts, new ProductSettings { Clouds = Words.Snake(recipe.Clouds.ToString()), Geojson = recipe.Geojson }, runner.Context(report)), false));
            string[] files = [.. written, RunRecord.FileName, LogName];
            findings = findings with { Remarks = runner.Remarks };
            RunRecord.Write(results.Building, findings, recipe, runId, request.Seed, request.Threads, inputs, evidence.LeftOut, files, runner.Times, budgetGib, estimateGib);
            File.WriteAllText(Path.Combine(results.Building, LogName), Log(findings, runId, inputs, evidence.LeftOut, "done"));
            stop.ThrowIfCancellationRequested();
            results.Swap();
            return new MeasureOutcome(
                evidence.LeftOut.Length == 0 ? Commands.ExitCode.Done : Commands.ExitCode.InPart, final, runId, findings, files, evidence.LeftOut, runner.Times, RunRecord.PeakGib(), notKept);
        }
        catch (Exception e) when (Directory.Exists(storeFolder))
        {
            // The results folder stays as it was; what the run said until it failed lies beside the stage results.
            var seen = new Findings { SurveyName = survey.Name, Remarks = runner.Remarks };
            File.WriteAllText(Path.Combine(storeFolder, LogName), Log(seen, "", [], evidence.LeftOut, e is OperationCanceledException ? "interrupted" : "failed: " + e.Message));
            throw;
        }
    }

    private static (Findings Findings, DrawingsRecord Drawings, IPieces Pieces) Stages(
        SurveyFolder survey, Recipe recipe, SurveyEvidence evidence, InputFile[] inputs, StageRunner runner)
    {
        // What was decided by hand comes in after the faces: the heavy stages before need not run again for it.
        InputFile? decided = inputs.FirstOrDefault(i => i.Name == SurveyFolder.DecisionsName);
        string key = Fingerprint.OfText([.. inputs.Where(i => i != decided).Select(i => i.Name + i.Sha256), recipe.North.ToString(), .. evidence.LeftOut]);
        long points = evidence.Input.Sources.Sum(s => s.Header.Points);
        IPieces pieces = runner.RunIntake(evidence.Input, recipe.Intake, ref key, points);
        WorkingCloud cloud = runner.Run(new ThinStage(), pieces, recipe.Thin, ref key, points);
        DescribedCloud described = runner.Run(
            new DescribeStage(), cloud, recipe.Describe, ref key, cloud.Count, d => d with { Cloud = new WorkingCloud() }, d => d with { Cloud = cloud });
        string classKey = key, faceKey = key;
        HandLabels labels = evidence.Labels;
        ClassifiedCloud classes = runner.Run(new ClassifyStage(), new ClassifyInput(described, labels), recipe.Classify, ref classKey, cloud.Count);
        FaceSet faces = runner.Run(new FacesStage(), described, recipe.Faces, ref faceKey, cloud.Count);
        DecidedFaces byHand = DecidedFaces.Of(faces, evidence.Decisions, cloud.Frame);
        faces = byHand.Faces;
        string contactKey = decided is null ? Fingerprint.OfText(classKey, faceKey) : Fingerprint.OfText(classKey, faceKey, decided.Sha256);
        Vec3[] baseline = [.. evidence.Baseline.Select(p => p - described.Cloud.Frame.Origin)];
        FieldReading[] readings = [.. evidence.Readings.Select(r => r with { Place = r.Place - described.Cloud.Frame.Origin })];
        ContactsRecord contacts = runner.Run(new ContactsStage(), new ContactsInput(described, classes, faces, baseline) { Readings = readings, Domains = byHand.Domains }, recipe.Contacts, ref contactKey, cloud.Count);
        (faces, contacts) = CoverFaces.Drop(faces, contacts, classes, out int onCover);
        if (onCover > 0) runner.Say(new Remark("faces", FormattableString.Invariant($"{onCover} flat pieces lie on cover and were left out."), false));
        contacts = DecidedContacts.Of(contacts, evidence.Decisions, cloud.Frame, out DecisionOutcome[] confirmed);
        string widthKey = contactKey, setKey = contactKey;
        WidthRecord width = runner.Run(new WidthStage(), new WidthInput(described, classes, contacts), recipe.Width, ref widthKey, cloud.Count);
        SetsRecord sets = runner.Run(new SetsStage(), new SetsInput(cloud.Frame, faces, contacts, described) { Zones = evidence.Zones, Decisions = evidence.Decisions }, recipe.Sets, ref setKey);
        DecisionsRecord decisions = DecisionLedger.Of(evidence.Decisions, byHand.Outcomes, confirmed, faces, sets, runner.Say);
        var findings = new Findings
        {
            SurveyName = survey.Name,
            Intake = pieces.Record,
            Described = described,
            Classes = classes,
            Faces = faces,
            Contacts = contacts,
            Width = width,
            Sets = sets,
            Decisions = decisions,
            Remarks = runner.Remarks,
        };
        string drawKey = Fingerprint.OfText(widthKey, setKey, survey.Name);
        DrawingsRecord drawings = runner.Run(new DrawingsStage(), findings, recipe.Drawings, ref drawKey);
        return (findings with { Remarks = runner.Remarks }, drawings, pieces);
    }

    private RunFacts Facts(SurveyFolder survey, Recipe recipe, SurveyEvidence evidence, InputFile[] inputs, string runId, Findings findings) => new()
    {
        ToolVersion = Fingerprint.Version,
        RunId = runId,
        InputDate = evidence.Date,
        Licence = survey.Notes.Licence ?? "",
        Citation = survey.Notes.Citation ?? "",
        RecipeName = request.Recipe is { } r ? Path.GetFileNameWithoutExtension(r) : survey.Notes.Recipe ?? RecipeShelf.Usual,
        Recipe = RecipeYaml.Of(recipe),
        Inputs = inputs,
        Seed = request.Seed,
        NorthText = NorthText(findings.Intake.Frame),
        Versions = [new HeaderFact("CloudStruct", Fingerprint.Version), new HeaderFact(".NET", Environment.Version.ToString())],
    };

    private static string NorthText(SurveyFrame frame) => frame.North switch
    {
        North.True => string.Create(CultureInfo.InvariantCulture, $"Azimuths are from true north: grid azimuth plus a meridian convergence of {frame.ConvergenceDeg ?? 0:0.00} deg."),
        North.Grid => "Azimuths are from grid north; no convergence was applied.",
        _ => "Azimuths are from the model's y axis; nothing ties the model to the ground, so they are not from north.",
    };

    // No clock in the log: two runs of one input must leave the same bytes.
    private static string Log(Findings f, string runId, InputFile[] inputs, string[] leftOut, string end)
    {
        var text = new StringBuilder();
        text.Append(CultureInfo.InvariantCulture, $"CloudStruct {Fingerprint.Version}, survey {f.SurveyName}{(runId.Length > 0 ? ", run " + runId : "")}\n");
        foreach (InputFile i in inputs) text.Append(CultureInfo.InvariantCulture, $"input {i.Name}, {i.Bytes} bytes, sha256 {i.Sha256}\n");
        foreach (string l in leftOut) text.Append(CultureInfo.InvariantCulture, $"left out: {l}\n");
        foreach (Remark r in f.Remarks) text.Append(CultureInfo.InvariantCulture, $"{r.Stage}{(r.Doubtful ? " (doubtful)" : "")}: {r.Text}\n");
        return text.Append(end).Append('\n').ToString();
    }
}
