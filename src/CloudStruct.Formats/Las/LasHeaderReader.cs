using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using CloudStruct.Formats.Bytes;
using CloudStruct.Formats.Laz;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

/// <summary>Reads and checks everything of a LAS file but its points.</summary>
/// <remarks>LAS 1.4 R16, public header block. What makes the points unreadable is an <see cref="InputException"/>; what is
/// merely wrong becomes a sentence in <see cref="LasHeader.Problems"/>.</remarks>
internal sealed partial class LasHeaderReader
{
    private const int LeastHeaderBytes = 227;

    // Version 1.5 keeps the fields of 1.4 in their places and appends others.
    private const int LastMinor = 5;

    private readonly FileBytes file;
    private readonly byte[] head;
    private readonly List<string> problems = [];
    private readonly List<HeaderFact> facts = [];

    private LasHeaderReader(FileBytes file)
    {
        this.file = file;
        head = file.Take(0, Math.Min(file.Length, 375), "the header");
    }

    /// <summary>Reads the header of an open file that starts with "LASF".</summary>
    public static LasHeader Read(FileBytes file) => new LasHeaderReader(file).Read();

    private LasHeader Read()
    {
        if (head.Length < LeastHeaderBytes)
            throw Fault(0, "the file is too short for a LAS header", Invariant($"{file.Length} bytes where {LeastHeaderBytes} are the least"),
                "The copy is incomplete; copy the file again and compare sizes");
        int major = head[24], minor = head[25];
        if (major != 1 || minor > LastMinor)
            throw Fault(24, "this LAS version is not known", Invariant($"version {major}.{minor}; 1.0 to 1.4 are read"),
                "Export the cloud again as LAS 1.2 or 1.4");
        if (minor == 5) problems.Add("It is LAS 1.5, which is newer than this reader: the parts that LAS 1.4 knows are read.");
        int encoding = minor >= 2 ? U16(6) : 0;
        int headerBytes = HeaderBytes(minor);
        long pointsAt = U32(96);
        (int format, int recordBytes, bool compressed) = PointFormat();
        if (pointsAt < headerBytes || pointsAt > file.Length)
            throw Fault(96, "the points are said to start outside the file", Invariant($"byte {pointsAt} in a file of {file.Length} bytes with a header of {headerBytes}"),
                pointsAt == 0 ? "The header was never completed by the program that wrote it; export the cloud again"
                    : "The copy is incomplete; copy the file again and compare sizes");
        long declared = DeclaredPoints(minor, headerBytes);
        Vec3 scale = Triple(131), offset = Triple(155);
        CheckScale(scale, offset);
        AddFacts(minor, encoding, format, recordBytes, headerBytes, pointsAt, scale, offset);
        List<LasVariable> records = Variables(headerBytes, pointsAt);
        long pointsEnd = file.Length;
        if (minor >= 4 && headerBytes >= 375) pointsEnd = Extended(records, pointsAt);
        LazLayout? laz = Compression(records, compressed, format, recordBytes);
        long present = laz is null ? Present(pointsAt, pointsEnd, declared, recordBytes, records) : declared;
        (Vec3? min, Vec3? max) = Bounds(declared, scale, offset);
        DescribeExtras(records, recordBytes - LasRecord.MinimumBytes(format));
        return new LasHeader
        {
            Name = file.Name, FileBytes = file.Length, Minor = minor, Encoding = encoding, PointFormat = format,
            RecordBytes = recordBytes, PointsAt = pointsAt, Declared = declared, Present = present, Scale = scale, Offset = offset,
            Min = min, Max = max, Date = Date(), Projection = Projection(records, minor >= 4 && (encoding & (1 << 4)) != 0),
            Laz = laz, Facts = [.. facts], Problems = [.. problems],
        };
    }

    private int HeaderBytes(int minor)
    {
        int stated = U16(94), expected = minor switch { <= 2 => 227, 3 => 235, _ => 375 };
        if (stated < LeastHeaderBytes || stated > file.Length)
            throw Fault(94, "the header has an impossible length", Invariant($"{stated} bytes; LAS 1.{minor} has {expected}, the file {file.Length}"),
                stated == 0 ? "The header was never completed by the program that wrote it; export the cloud again"
                    : "The header is damaged; copy or export the file again");
        if (stated < expected) problems.Add(Invariant($"The header is {stated} bytes long, LAS 1.{minor} asks for {expected}."));
        return stated;
    }

    private (int Format, int RecordBytes, bool Compressed) PointFormat()
    {
        int stated = head[104], recordBytes = U16(105);
        // Compressed points raise the format by 128; both upper bits together meant a scheme that was given up.
        if ((stated & 0xC0) == 0xC0)
            throw Fault(104, "the points are compressed in a way that was given up long ago", Invariant($"point format byte {stated}"), "Export the cloud again as LAS or LAZ");
        bool compressed = (stated & 0xC0) != 0;
        stated &= 0x3F;
        if (stated > LasRecord.LastFormat)
            throw Fault(104, "this point format does not exist", Invariant($"format {stated}; LAS has 0 to {LasRecord.LastFormat}"),
                "The header is damaged; copy or export the file again");
        if (recordBytes < LasRecord.MinimumBytes(stated))
            throw Fault(105, "a point record is too short for its format", Invariant($"{recordBytes} bytes; format {stated} needs {LasRecord.MinimumBytes(stated)}"),
                "The header is damaged; copy or export the file again");
        return (stated, recordBytes, compressed);
    }

    private long DeclaredPoints(int minor, int headerBytes)
    {
        long legacy = U32(107);
        if (minor < 4 || headerBytes < 375) return legacy;
        ulong wide = BinaryPrimitives.ReadUInt64LittleEndian(head.AsSpan(247));
        if (wide > long.MaxValue / ushort.MaxValue)
            throw Fault(247, "the number of points is impossible", Invariant($"{wide} points in a file of {file.Length} bytes"),
                "The header is damaged; copy or export the file again");
        if (wide == 0 && legacy > 0) problems.Add("Only the old 32-bit number of points is filled in; it is used.");
        else if (legacy > 0 && (ulong)legacy != wide) problems.Add(Invariant($"The two numbers of points disagree ({wide} and {legacy}); the 64-bit one is used."));
        return wide > 0 ? (long)wide : legacy;
    }

    private void CheckScale(Vec3 scale, Vec3 offset)
    {
        static bool Usable(double s) => double.IsFinite(s) && s != 0 && Math.Abs(s) is > 1e-12 and < 1e9;
        if (!Usable(scale.X) || !Usable(scale.Y) || !Usable(scale.Z))
            throw Fault(131, "the coordinate scale is unusable", scale.ToString(), "The header is damaged; export the cloud again");
        if (!double.IsFinite(offset.X) || !double.IsFinite(offset.Y) || !double.IsFinite(offset.Z))
            throw Fault(155, "the coordinate offset is not a number", offset.ToString(), "The header is damaged; export the cloud again");
        if (scale.X < 0 || scale.Y < 0 || scale.Z < 0) problems.Add("A coordinate scale is negative, which turns an axis round.");
        double coarsest = Math.Max(Math.Abs(scale.X), Math.Max(Math.Abs(scale.Y), Math.Abs(scale.Z)));
        if (coarsest > 0.05) problems.Add(Invariant($"Coordinates are stored in steps of {coarsest} units, too coarse for fracture faces."));
    }

    private long Present(long pointsAt, long pointsEnd, long declared, int recordBytes, List<LasVariable> records)
    {
        long room = (pointsEnd - pointsAt) / recordBytes;
        if (room < declared)
        {
            // Extended records may be misplaced in a file whose points are whole: the end of the file decides.
            room = (file.Length - pointsAt) / recordBytes;
        }
        if (room < declared)
            problems.Add(Invariant($"The file is cut short: {declared} points are declared, {room} are there. Measuring refuses it."));
        long unused = pointsEnd - pointsAt - (Math.Min(declared, room) * recordBytes);
        if (declared == 0 && unused >= recordBytes)
            problems.Add(Invariant($"The header declares no points, though {unused} bytes follow: it was never completed by the program that wrote it."));
        else if (declared > 0 && room >= declared && unused >= recordBytes && !records.Any(r => r.IsExtended) && (U16(6) & 0b110) == 0)
            problems.Add(Invariant($"{unused} bytes after the last declared point are not accounted for."));
        return Math.Min(declared, room);
    }

    private (Vec3? Min, Vec3? Max) Bounds(long declared, Vec3 scale, Vec3 offset)
    {
        Vec3 max = new(F64(179), F64(195), F64(211)), min = new(F64(187), F64(203), F64(219));
        if (declared == 0) return (null, null);
        static bool Finite(Vec3 v) => double.IsFinite(v.X) && double.IsFinite(v.Y) && double.IsFinite(v.Z);
        if (!Finite(min) || !Finite(max))
        {
            problems.Add("The declared bounds are not numbers; they are ignored.");
            return (null, null);
        }
        if (min.X > max.X || min.Y > max.Y || min.Z > max.Z)
        {
            problems.Add(Invariant($"The declared bounds are nonsense: lowest {min}, highest {max}."));
            return (null, null);
        }
        // What 32-bit records can reach at all, with a step to spare for rounding.
        static bool Reachable(double v, double scale, double offset) => Math.Abs((v - offset) / scale) <= 2147483650.0;
        if (!Reachable(min.X, scale.X, offset.X) || !Reachable(max.X, scale.X, offset.X) || !Reachable(min.Y, scale.Y, offset.Y)
            || !Reachable(max.Y, scale.Y, offset.Y) || !Reachable(min.Z, scale.Z, offset.Z) || !Reachable(max.Z, scale.Z, offset.Z))
        {
            problems.Add(Invariant($"The declared bounds lie where no point of the file can lie: lowest {min}, highest {max}."));
            return (null, null);
        }
        return (min, max);
    }

    private string Date()
    {
        int day = U16(90), year = U16(92);
        if (day is < 1 or > 366 || year is < 1900 or > 2200) return "";
        DateOnly date = new DateOnly(year, 1, 1).AddDays(day - 1);
        return date.Year == year ? date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) : "";
    }

    private void AddFacts(
        int minor, int encoding, int format, int recordBytes, int headerBytes, long pointsAt, Vec3 scale, Vec3 offset)
    {
        Fact("version", Invariant($"1.{minor}"));
        Fact("point_format", Invariant($"{format}"));
        Fact("record_bytes", Invariant($"{recordBytes}"));
        Fact("header_bytes", Invariant($"{headerBytes}"));
        Fact("points_at_byte", Invariant($"{pointsAt}"));
        Fact("global_encoding", Invariant($"{encoding}"));
        Fact("system", Text(26, 32));
        Fact("written_by", Text(58, 32));
        Fact("scale", scale.ToString());
        Fact("offset", offset.ToString());
    }

    private void Fact(string name, string value)
    {
        if (value.Length > 0) facts.Add(new HeaderFact(name, value));
    }

    private InputException Fault(long at, string what, string found, string mend) =>
        new(Invariant($"{file.Name}, byte {at}"), what, found, mend);

    private int U16(int at) => BinaryPrimitives.ReadUInt16LittleEndian(head.AsSpan(at));

    private uint U32(int at) => BinaryPrimitives.ReadUInt32LittleEndian(head.AsSpan(at));

    private double F64(int at) => BinaryPrimitives.ReadDoubleLittleEndian(head.AsSpan(at));

    private Vec3 Triple(int at) => new(F64(at), F64(at + 8), F64(at + 16));

    private string Text(int at, int length) => Text(head.AsSpan(at, length));

    // Fixed-width text ends at its first NUL; control characters would disturb a terminal.
    private static string Text(ReadOnlySpan<byte> bytes)
    {
        int end = bytes.IndexOf((byte)0);
        string text = Encoding.UTF8.GetString(end < 0 ? bytes : bytes[..end]);
        return string.Concat(text.Where(c => !char.IsControl(c))).Trim();
    }
}
