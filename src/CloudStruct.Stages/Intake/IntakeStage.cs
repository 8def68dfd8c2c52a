using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Intake;

/// <summary>Finds out what a survey holds and what is wrong with it, and how its points get into the survey frame.</summary>
/// <remarks>Two looks through the files, a third when files overlap; no points are kept but small samples. The corrections
/// are applied whenever the pieces are read.</remarks>
public sealed class IntakeStage : IStage<SurveyInput, IntakeSettings, IPieces>
{
    // A float resolves 1 mm up to 8 km from its origin.
    private const double MostExtentM = 16_000;
    private const double CoarsestStepM = 0.0025;
    private const int SampledPoints = 1 << 18;

    /// <inheritdoc/>
    public string Name => "intake";

    /// <inheritdoc/>
    public IPieces Run(SurveyInput input, IntakeSettings settings, StageContext context)
    {
        CrsInfo crs = CoordinateSystem.Of(input, context);
        (double horizontalM, double verticalM) = CoordinateSystem.Units(input, crs, context);
        var map = new PointMap(input.Axes, horizontalM, verticalM, input.OffsetM);
        if (map.Mirrors)
        {
            context.Say(new Remark("intake", $"The axes \"{input.Axes}\" turn the model into its mirror image. That is right only if its file was written in a left-handed system.", true));
        }

        (TileFacts[] tiles, List<ulong> again) = FirstLook(input, settings, map, context);
        bool[] isCopy = Copies(tiles, context);
        (Vec3 Min, Vec3 Max)[] boxes = [.. tiles.Select(t => t.Sample.Places is { Length: > 0 } s ? RobustBox.Of(s) : default)];
        Vec3 origin = Origin(tiles, map, input.OffsetM);
        (North north, double? convergence) = CoordinateSystem.NorthOf(input, crs, origin, horizontalM, context);
        var record = new IntakeRecord
        {
            Frame = new SurveyFrame { Origin = origin, Crs = crs, North = north, ConvergenceDeg = convergence, Reference = input.Reference },
            Tiles = [.. tiles.Select((t, i) => new TileFix
            {
                Name = t.Header.Name,
                PointsRead = t.Read,
                Withheld = t.Withheld,
                NotANumber = t.NotANumber,
                ColourShift = TileColour.ShiftOf(t.LargestColour),
                IsCopy = isCopy[i],
            })],
            HorizontalUnitM = horizontalM,
            VerticalUnitM = verticalM,
            Axes = input.Axes,
            OffsetM = input.OffsetM,
            HasColour = TileColour.Judge(tiles, isCopy, context),
        };
        record = settings.DropFarOutliers ? record with
        {
            BoxMin = Corner(boxes, tiles, b => b.Min, Math.Min) - origin,
            BoxMax = Corner(boxes, tiles, b => b.Max, Math.Max) - origin,
        }
        : record with { BoxMin = new Vec3(-1e12, -1e12, -1e12), BoxMax = new Vec3(1e12, 1e12, 1e12) };
        record = SecondLook(input, record, tiles, again, settings.JoinTiles, context);
        record = WithControl(input, record, context);
        SayWhatWasDropped(record, context);
        context.Progress(1);
        return new Pieces(input, record);
    }

    private static (TileFacts[] Tiles, List<ulong> Again) FirstLook(
        SurveyInput input, IntakeSettings settings, PointMap map, StageContext context)
    {
        if (input.Sources.Length == 0)
        {
            throw new InputException(input.Name, "the survey holds no cloud", "no LAS or PLY file", "Put the clouds into the folder clouds of the survey");
        }

        long announced = Math.Max(1, input.Sources.Sum(s => s.Header.Points));
        MaybeSeen? seen = settings.DropDoubled ? new MaybeSeen(announced) : null;
        int capacity = Math.Clamp(SampledPoints / input.Sources.Length, 2048, 1 << 16);
        var tiles = new TileFacts[input.Sources.Length];
        long done = 0;
        for (int i = 0; i < tiles.Length; i++)
        {
            tiles[i] = new TileFacts(input.Sources[i], capacity);
            int before = seen?.Again.Count ?? 0;
            tiles[i].Look(map, seen, n => context.Progress(Math.Min(0.5, 0.5 * (done += n) / announced)), context.Threads, context.Stop);
            CheckSteps(tiles[i], map, input.OffsetM);

            // All points of a copy have been seen before; the copy is left out as a whole, and its list would be long.
            if (seen is not null && tiles.Take(i).Any(t => t.IsCopyOf(tiles[i]))) seen.Again.RemoveRange(before, seen.Again.Count - before);
            if (tiles[i].Read > 0 && tiles[i].Read == tiles[i].NotANumber)
            {
                throw new InputException(tiles[i].Header.Name, "no point has usable coordinates", Invariant($"{tiles[i].Read} points, all with a coordinate that is not a number"), "Export the cloud again");
            }
        }

        if (tiles.All(t => t.Read == 0))
        {
            string names = string.Join(", ", tiles.Select(t => t.Header.Name).Take(3));
            throw new InputException(names, "the cloud holds no points", "0 points", "Export the cloud again");
        }

        foreach (TileFacts empty in tiles.Where(t => t.Read == 0))
        {
            context.Say(new Remark("intake", $"{empty.Header.Name} holds no points.", true));
        }

        return (tiles, seen?.Again ?? []);
    }

    // 32-bit floats far from their origin have steps that look like terraces in the rock.
    private static void CheckSteps(TileFacts tile, PointMap map, Vec3 offset)
    {
        if (!tile.Header.FloatCoordinates || tile.Sample.Places is not { Length: > 0 } places) return;
        double[] sizes = [.. places.Select(p => p - offset).Select(p => Math.Max(Math.Abs(p.X), Math.Max(Math.Abs(p.Y), Math.Abs(p.Z))) / map.UnitM)];
        Array.Sort(sizes);
        float typical = (float)sizes[sizes.Length / 2];
        double step = (MathF.BitIncrement(typical) - typical) * map.UnitM;
        if (step <= CoarsestStepM) return;
        throw new InputException(
            tile.Header.Name,
            "the coordinates are stored as 32-bit floats too far from their origin, so that fine relief is lost",
            Invariant($"coordinates about {typical:0} in steps of {step:0.####} m"),
            "Export the cloud with double precision, or shifted to a local origin with the shift given as offset_m in survey.yaml");
    }

    private static bool[] Copies(TileFacts[] tiles, StageContext context)
    {
        var isCopy = new bool[tiles.Length];
        for (int i = 0; i < tiles.Length; i++)
        {
            for (int j = 0; j < i && !isCopy[i] && tiles[i].Read > 0; j++)
            {
                if (isCopy[j] || !tiles[j].IsCopyOf(tiles[i])) continue;
                isCopy[i] = true;
                context.Say(new Remark("intake", $"{tiles[i].Header.Name} holds the same points as {tiles[j].Header.Name} and was left out.", true));
            }
        }

        return isCopy;
    }

    /// <summary>Rounded middle of the bodies of all files, so that local coordinates read easily and stay small.</summary>
    private static Vec3 Origin(TileFacts[] tiles, PointMap map, Vec3 offset)
    {
        (Vec3 Min, Vec3 Max, string Name)[] bodies = [.. tiles.Where(t => t.Sample.Places.Length > 0).Select(t => Body(t))];
        double Low(Func<Vec3, double> of) => bodies.Min(b => of(b.Min));
        double High(Func<Vec3, double> of) => bodies.Max(b => of(b.Max));
        var min = new Vec3(Low(v => v.X), Low(v => v.Y), Low(v => v.Z));
        var max = new Vec3(High(v => v.X), High(v => v.Y), High(v => v.Z));
        Vec3 size = max - min;
        if (Math.Max(size.X, Math.Max(size.Y, size.Z)) > MostExtentM)
        {
            throw TooWide(size, bodies.MinBy(b => b.Min.X + b.Min.Y).Name, bodies.MaxBy(b => b.Max.X + b.Max.Y).Name);
        }

        Vec3 middle = (min + max) * 0.5;
        return new Vec3(Math.Round(middle.X), Math.Round(middle.Y), Math.Round(middle.Z));
    }

    private static (Vec3 Min, Vec3 Max, string Name) Body(TileFacts tile)
    {
        Vec3[] places = tile.Sample.Places;
        (double Low, double High) Range(Func<Vec3, double> of)
        {
            double[] values = [.. places.Select(of)];
            int tail = values.Length / 50;
            return (OrderStatistic.Nth<double>(values, tail), OrderStatistic.Nth<double>(values, values.Length - 1 - tail));
        }

        var (x, y, z) = (Range(p => p.X), Range(p => p.Y), Range(p => p.Z));
        return (new Vec3(x.Low, y.Low, z.Low), new Vec3(x.High, y.High, z.High), tile.Header.Name);
    }

    private static InputException TooWide(Vec3 size, string first, string last) => new(
        first == last ? first : $"{first}, {last}",
        "the survey is too wide for one frame",
        Invariant($"{size.X:0} m by {size.Y:0} m by {size.Z:0} m; at most {MostExtentM:0} m"),
        "Check the unit and the coordinates of the files, or measure distant outcrops as separate surveys");

    private static Vec3 Corner(
        (Vec3 Min, Vec3 Max)[] boxes, TileFacts[] tiles, Func<(Vec3 Min, Vec3 Max), Vec3> of, Func<double, double, double> fold)
    {
        Vec3[] corners = [.. boxes.Where((_, i) => tiles[i].Sample.Places.Length > 0).Select(of)];
        return corners.Aggregate((a, b) => new Vec3(fold(a.X, b.X), fold(a.Y, b.Y), fold(a.Z, b.Z)));
    }

    private static IntakeRecord SecondLook(
        SurveyInput input, IntakeRecord record, TileFacts[] tiles, List<ulong> again, bool join, StageContext context)
    {
        (Vec3[] seeds, double guess, bool whole) = Guess(record, tiles, context.Threads, context.Stop);
        var cubes = whole || guess <= 0 ? null : new LocalCubes(seeds, guess);
        var counts = new TileCounts[tiles.Length];
        var dropped = new List<ulong>();
        var box = new Extent();
        long total = Math.Max(1, tiles.Sum(t => t.Read)), done = 0;
        bool several = record.Tiles.Count(t => !t.IsCopy && t.PointsRead > 0) > 1;
        SharedGround? ground = join && several ? new SharedGround(ColumnEdge(guess, seeds)) : null;
        foreach (PointBlock block in ReadAhead.Of(new Pieces(input, record).Read(counts, new DoubledPlaces(again), dropped, context.Stop), context.Threads))
        {
            using (block)
            {
                box.Add(block);
                cubes?.Add(block);
                ground?.Add(block);
                done += block.Count;
                context.Progress(0.5 + (0.4 * done / total));
            }
        }

        if (counts.Sum(c => c.Kept) == 0)
        {
            throw new InputException(input.Name, "no usable point is left", Invariant($"{total} points read"), "Export the cloud again");
        }

        Vec3 size = box.Max - box.Min;
        if (Math.Max(size.X, Math.Max(size.Y, size.Z)) > MostExtentM) throw TooWide(size, tiles[0].Header.Name, tiles[^1].Header.Name);
        double spacing = cubes?.SpacingM(context.Threads, context.Stop) ?? guess;
        record = WithCounts(record, counts) with
        {
            DoubledKeys = [.. dropped.Distinct().Select(p => unchecked((long)p)).Order()],
            BoxMin = box.Min,
            BoxMax = box.Max,
            InputSpacingM = spacing > 0 ? spacing : guess,
        };
        return ground is null || record.InputSpacingM <= 0 ? record : Joined(input, record, tiles, ground, context);
    }

    // What is left when each shared column is taken from one file has to be counted once more.
    private static IntakeRecord Joined(
        SurveyInput input, IntakeRecord record, TileFacts[] tiles, SharedGround ground, StageContext context)
    {
        Vec3[] middles = [.. tiles.Select(t => t.Sample.Places.Length == 0 ? default : ((Body(t).Min + Body(t).Max) * 0.5) - record.Frame.Origin)];
        record = TileJoin.Join(input, record, ground, middles, context);
        if (record.OwnerKeys.Length == 0) return record;
        var counts = new TileCounts[tiles.Length];
        var places = new DoubledPlaces(Array.ConvertAll(record.DoubledKeys, k => unchecked((ulong)k)));
        foreach (PointBlock block in new Pieces(input, record).Read(counts, places, [], context.Stop)) block.Dispose();
        return WithCounts(record, counts);
    }

    private static IntakeRecord WithControl(SurveyInput input, IntakeRecord record, StageContext context)
    {
        if (input.Control.Length == 0) return record;
        var control = new ControlFit(input.Control, record.Frame.Origin, record.InputSpacingM);
        if (control.NeedsSurface)
        {
            foreach (PointBlock block in new Pieces(input, record).Read(context.Stop))
            {
                using (block) control.Add(block);
            }
        }

        return record with
        {
            Control = control.Residuals(),
            Frame = record.Frame with { Reference = ControlFit.Estimate(input.Control, record.Frame.Reference, context) },
        };
    }

    // Columns of some thirty spacings, wider when the survey is so wide that there would be too many.
    private static double ColumnEdge(double guess, Vec3[] seeds)
    {
        double wide = seeds.Max(p => Math.Max(Math.Abs(p.X), Math.Abs(p.Y)));
        return Math.Max(30 * guess, Math.Max(1e-3, wide / 1000));
    }

    private static IntakeRecord WithCounts(IntakeRecord record, TileCounts[] counts) => record with
    {
        Points = counts.Sum(c => c.Kept),
        Tiles = [.. record.Tiles.Select((t, i) => t with
        {
            FarOutliers = counts[i].FarOutliers,
            Doubled = counts[i].Doubled,
            Overlapped = counts[i].Overlapped,
        })],
    };

    /// <summary>Sampled places (local) and the spacing they suggest at full density.</summary>
    private static (Vec3[] Seeds, double GuessM, bool Whole) Guess(IntakeRecord record, TileFacts[] tiles, int threads, CancellationToken stop)
    {
        var seeds = new List<Vec3>();
        var guesses = new List<(double GuessM, long Points)>();
        bool whole = true;
        for (int i = 0; i < tiles.Length; i++)
        {
            if (record.Tiles[i].IsCopy) continue;
            Vec3[] local = [.. tiles[i].Sample.Places.Select(p => p - record.Frame.Origin).Where(p => RobustBox.Inside(p, record.BoxMin, record.BoxMax))];
            seeds.AddRange(local);
            double spacing = InputSpacing.OfAny([.. local.Distinct()], threads, stop);
            if (spacing > 0) guesses.Add((spacing * Math.Sqrt(tiles[i].Sample.Share), tiles[i].Read));
            whole &= tiles[i].Sample.Share >= 1;
        }

        guesses.Sort();
        long half = guesses.Sum(g => g.Points) / 2, sum = 0;
        foreach ((double guess, long points) in guesses)
        {
            sum += points;
            if (sum >= half) return ([.. seeds], guess, whole);
        }

        return ([.. seeds], 0, true);
    }

    private static void SayWhatWasDropped(IntakeRecord record, StageContext context)
    {
        long read = Math.Max(1, record.Tiles.Sum(t => t.PointsRead));
        void Say(long n, string why)
        {
            double percent = 100.0 * n / read;
            if (n > 0) context.Say(new Remark("intake", Invariant($"{n} points ({percent:0.###} %) were dropped: {why}"), percent > 1));
        }

        Say(record.Tiles.Sum(t => t.Withheld), "the file marks them as deleted.");
        Say(record.Tiles.Sum(t => t.NotANumber), "a coordinate is not a number.");
        Say(record.Tiles.Sum(t => t.FarOutliers), "they lie far outside the body of the cloud.");
        Say(record.Tiles.Sum(t => t.Doubled), "another point lies at the very same place.");
    }
}
