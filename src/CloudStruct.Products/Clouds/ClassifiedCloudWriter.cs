using CloudStruct.Formats.Las;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;

namespace CloudStruct.Products.Clouds;

/// <summary>Writes classified.las or classified.laz: what was found, point by point, in map coordinates in metres.</summary>
/// <remarks>Input points are streamed once more and each is given what its nearest working point has, so memory holds one
/// block whatever the size of the survey. Map coordinates are local plus origin: in files that store millimetres they come
/// back as they were, because the step of a float within a kilometre is 0.06 mm.</remarks>
internal static class ClassifiedCloudWriter
{
    /// <summary>Name below the folder of results.</summary>
    public static string NameOf(ProductSettings settings) => settings.Clouds == "laz" ? "clouds/classified.laz" : "clouds/classified.las";

    private static readonly LasExtra[] Extras =
    [
        new("face_id", LasExtraType.UInt32, "number in faces.csv, 0 none"),
        new("roughness_m", LasExtraType.Float32, "rms about own plane [m]"),
        new("dike_probability", LasExtraType.UInt8, "0 to 255"),
        new("source_class", LasExtraType.UInt8, "class in the input file"),
    ];

    /// <summary>Farthest that the working point of an input point can lie, in spacings: the diagonal of a thinning cell
    /// is 1.74 of them. What is farther from every working point was dropped as stray.</summary>
    private const double ReachSpacings = 1.75;

    /// <summary>Writes every input point that the intake kept.</summary>
    /// <param name="stream">Allows seeking; left open.</param>
    /// <param name="findings">What was found.</param>
    /// <param name="pieces">The input points.</param>
    /// <param name="facts">About the run.</param>
    /// <param name="context">Progress, cancellation and the number of threads.</param>
    /// <param name="compressed">As LAZ; points and columns are the same.</param>
    public static void WriteAll(Stream stream, Findings findings, IPieces pieces, RunFacts facts, StageContext context, bool compressed = false)
    {
        using var writer = new LasWriter(stream, Layout(findings, facts) with { Compressed = compressed }, context.Threads);
        var columns = new CloudColumns(SourceBlock.Capacity);
        long total = Math.Max(1, pieces.Record.Points), done = 0;
        foreach (PointBlock block in pieces.Read(context.Stop))
        {
            using (block)
            {
                context.Stop.ThrowIfCancellationRequested();
                Label(block, findings, columns, context.Threads);
                writer.Write(columns.Batch(block.Count));
                done += block.Count;
                context.Progress(Math.Min(1, (double)done / total));
            }
        }
    }

    /// <summary>Writes the working points alone.</summary>
    public static void WriteThinned(Stream stream, Findings findings, RunFacts facts)
    {
        using var writer = new LasWriter(stream, Layout(findings, facts));
        WorkingCloud cloud = findings.Described.Cloud;
        var columns = new CloudColumns(SourceBlock.Capacity);
        Vec3 origin = findings.Intake.Frame.Origin;
        for (int from = 0; from < cloud.Count; from += SourceBlock.Capacity)
        {
            int n = Math.Min(SourceBlock.Capacity, cloud.Count - from);
            for (int i = 0; i < n; i++)
            {
                int p = from + i;
                columns.Place(i, cloud.X[p] + origin.X, cloud.Y[p] + origin.Y, cloud.Z[p] + origin.Z);
                if (cloud.HasColour) columns.Colour(i, cloud.Red[p], cloud.Green[p], cloud.Blue[p]);
                else columns.Colour(i, 0, 0, 0);
                columns.SourceClass[i] = cloud.SourceClass.Length > p ? cloud.SourceClass[p] : (byte)0;
                Take(columns, i, findings, p);
            }
            writer.Write(columns.Batch(n));
        }
    }

    // A system in feet would put coordinates in metres elsewhere: then none is written.
    private static LasLayout Layout(Findings findings, RunFacts facts)
    {
        SurveyFrame frame = findings.Intake.Frame;
        bool metres = frame.Crs is { HorizontalUnitM: 1, VerticalUnitM: 1 };
        return new LasLayout
        {
            Date = facts.InputDate,
            Wkt = metres ? frame.Crs.Wkt : "",
            SystemIdentifier = "MODIFICATION",
            Extras = Extras,
        }.Around(frame.ToMap(findings.Intake.BoxMin), frame.ToMap(findings.Intake.BoxMax));
    }

    // Each point writes its own places only, so the number of workers changes nothing.
    private static void Label(PointBlock block, Findings findings, CloudColumns columns, int threads)
    {
        const int slice = 4096;
        WorkingCloud cloud = findings.Described.Cloud;
        Vec3 origin = findings.Intake.Frame.Origin;
        double reach = ReachSpacings * cloud.SpacingM;
        int count = block.Count;
        Parallel.For(0, (count + slice - 1) / slice, new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) }, s =>
        {
            Span<float> x = block.X, y = block.Y, z = block.Z;
            Span<byte> red = block.Red, green = block.Green, blue = block.Blue, source = block.Class;
            for (int i = s * slice; i < Math.Min(count, (s + 1) * slice); i++)
            {
                columns.Place(i, x[i] + origin.X, y[i] + origin.Y, z[i] + origin.Z);
                columns.Colour(i, red[i], green[i], blue[i]);
                columns.SourceClass[i] = source[i];
                Take(columns, i, findings, SortedGridLookup.Nearest(cloud, x[i], y[i], z[i], reach));
            }
        });
    }

    private static void Take(CloudColumns columns, int i, Findings f, int point)
    {
        // A stage that did not run has no column; what it would have said is then not known.
        bool In<T>(T[] column) => point >= 0 && point < column.Length;
        columns.Class[i] = In(f.Classes.Class) ? f.Classes.Class[point] : (byte)RockClass.Unknown;
        columns.DikeProbability[i] = In(f.Classes.DikeProbability) ? f.Classes.DikeProbability[point] : (byte)0;
        int face = In(f.Faces.FaceOfPoint) ? f.Faces.FaceOfPoint[point] : 0;
        columns.FaceId[i] = face > 0 ? (uint)f.Faces.Faces[face - 1].FaceId : 0;
        columns.RoughnessM[i] = In(f.Described.RoughnessM) ? f.Described.RoughnessM[point] : float.NaN;
    }
}
