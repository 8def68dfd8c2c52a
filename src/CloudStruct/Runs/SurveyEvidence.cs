using System.Globalization;
using CloudStruct.Formats;
using CloudStruct.Formats.Crs;
using CloudStruct.Products;
using CloudStruct.Recipes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;

namespace CloudStruct.Runs;

/// <summary>The files of a survey opened: headers and small tables read, points not.</summary>
internal sealed record SurveyEvidence
{
    /// <summary>What the intake takes.</summary>
    public required SurveyInput Input { get; init; }

    /// <summary>Hand labels.</summary>
    public required HandLabels Labels { get; init; }

    /// <summary>Compass readings, map coordinates.</summary>
    public required FieldReading[] Readings { get; init; }

    /// <summary>The line that fixes chainage, map coordinates; empty when there is none.</summary>
    public required Vec3[] Baseline { get; init; }

    /// <summary>Zones that the user drew, map coordinates, in order of files and features.</summary>
    public Zone[] Zones { get; init; } = [];

    /// <summary>What a geologist decided by hand; empty without decisions.csv.</summary>
    public Decision[] Decisions { get; init; } = [];

    /// <summary>Damaged files that the recipe allowed to leave out, with the reason.</summary>
    public required string[] LeftOut { get; init; }

    /// <summary>What is to be said before the stages speak.</summary>
    public required Remark[] Remarks { get; init; }

    /// <summary>Flight date, else the date of the first file that has one.</summary>
    public required DateOnly? Date { get; init; }

    private string[] LeftOutFiles { get; init; } = [];

    /// <summary>Opens everything.</summary>
    /// <exception cref="InputException">A file cannot be used, and the recipe does not allow to leave it out.</exception>
    public static SurveyEvidence Open(SurveyFolder survey, Recipe recipe, CancellationToken stop)
    {
        var sources = new List<IPointSource>();
        List<string> leftOut = [], leftFiles = [];
        foreach (string file in survey.Clouds)
        {
            try
            {
                IPointSource source = CloudFiles.Open(file);
                if (recipe.SkipBadFiles) ReadThrough(source, stop);
                sources.Add(source);
            }
            catch (InputException e) when (recipe.SkipBadFiles)
            {
                leftOut.Add(e.Message);
                leftFiles.Add(file);
            }
        }

        if (sources.Count == 0) throw new InputException(survey.Name, "no cloud is left to measure", string.Join(" ", leftOut), "Mend or replace the damaged files");
        CrsInfo crs = survey.Notes.Crs is { } text ? CrsText.Parse(text) : sources.Select(s => s.Header.Crs).FirstOrDefault(c => c.Kind != CrsKind.Unknown) ?? CrsInfo.None;
        var input = new SurveyInput
        {
            Name = survey.Name,
            Sources = [.. sources],
            Crs = crs,
            Convergence = Convergence.Of(crs),
            North = recipe.North == NorthWanted.True ? North.True : North.Grid,
            UnitM = survey.Notes.UnitM,
            OffsetM = survey.Notes.OffsetM,
            Axes = survey.Notes.Axes,
            Reference = survey.Notes.Reference,
            Control = survey.Checkpoints is { } c ? EvidenceFiles.ReadControl(c) : [],
        };
        string date = survey.Notes.FlightDate ?? sources.Select(s => s.Header.Date).FirstOrDefault(d => d.Length > 0) ?? "";
        DateOnly? flown = DateOnly.TryParseExact(date, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly day) ? day : null;
        return new SurveyEvidence
        {
            Input = input,
            Labels = EvidenceFiles.ReadLabels(survey.Labels),
            Readings = survey.Readings is { } r ? EvidenceFiles.ReadReadings(r, new Declination(survey.Notes.Declination, crs, flown), survey.Notes.Notation) : [],
            Baseline = survey.Baseline is { } b ? EvidenceFiles.ReadBaseline(b) : [],
            Zones = [.. survey.Zones.SelectMany(EvidenceFiles.ReadZones)],
            Decisions = survey.Decisions is { } d ? EvidenceFiles.ReadDecisions(d) : [],
            LeftOut = [.. leftOut],
            LeftOutFiles = [.. leftFiles],
            Remarks = [.. survey.PassedOver.Concat(sources.SelectMany(s => s.Header.Problems.Select(p => $"{s.Header.Name}: {p}"))).Select(p => new Remark("files", p, false)), .. leftOut.Select(l => new Remark("files", "Left out: " + l, true))],
            Date = flown,
        };
    }

    /// <summary>Size and hash of every file that the run uses, in order.</summary>
    public InputFile[] Hash(SurveyFolder survey, CancellationToken stop)
    {
        var files = new List<InputFile>();
        foreach (string file in survey.Files.Where(f => !LeftOutFiles.Contains(f, StringComparer.Ordinal)))
        {
            stop.ThrowIfCancellationRequested();
            files.Add(new InputFile(survey.Relative(file), new FileInfo(file).Length, Fingerprint.OfFile(file)));
        }

        return [.. files];
    }

    // Damage can lie anywhere in a file; a run that may leave files out must know before the stages start.
    private static void ReadThrough(IPointSource source, CancellationToken stop)
    {
        foreach (SourceBlock block in source.Read(stop)) block.Dispose();
        if (source.Header is { Points: 0, Triangles: 0 })
        {
            throw new InputException(source.Header.Name, "the file holds no points", "0 points", "Leave it out, or export it again");
        }
    }
}
