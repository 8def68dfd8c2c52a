using System.Buffers.Binary;
using System.Text;
using CloudStruct.Formats.Laz;
using CloudStruct.Records.Complaints;
using static System.FormattableString;

namespace CloudStruct.Formats.Las;

internal sealed partial class LasHeaderReader
{
    private const int VariableHeaderBytes = 54;
    private const int ExtendedHeaderBytes = 60;
    private const int ExtraDescriptorBytes = 192;
    private const string ProjectionUser = "LASF_Projection";

    // No real system needs more; a damaged length must not cost memory.
    private const long MostWktBytes = 1 << 20;

    // Enough for any eye; pd_lots_of_vlr has hundreds.
    private const int MostListed = 40;

    private List<LasVariable> Variables(int headerBytes, long pointsAt)
    {
        long declared = U32(100), at = headerBytes;
        var records = new List<LasVariable>();
        Span<byte> h = stackalloc byte[VariableHeaderBytes];
        for (long i = 0; i < declared; i++)
        {
            if (pointsAt - at < VariableHeaderBytes || file.Read(at, h) < VariableHeaderBytes)
            {
                problems.Add(Invariant($"{declared} variable length records are declared, only {i} fit before the points."));
                break;
            }
            int bytes = BinaryPrimitives.ReadUInt16LittleEndian(h[20..]);
            at += VariableHeaderBytes;
            if (bytes > pointsAt - at)
            {
                problems.Add(Invariant($"Variable length record {i + 1} of {declared} reaches into the points; it and those after it are ignored."));
                break;
            }
            records.Add(new LasVariable(Text(h.Slice(2, 16)), BinaryPrimitives.ReadUInt16LittleEndian(h[18..]), Text(h.Slice(22, 32)), at, bytes, false));
            at += bytes;
        }
        ListRecords(records, "record");
        return records;
    }

    /// <summary>Adds the records after the points.</summary>
    /// <returns>Where the points end at the latest.</returns>
    private long Extended(List<LasVariable> records, long pointsAt)
    {
        ulong first = BinaryPrimitives.ReadUInt64LittleEndian(head.AsSpan(235));
        uint declared = U32(243);
        if (declared == 0) return file.Length;
        if (first < (ulong)pointsAt || first > (ulong)file.Length)
        {
            problems.Add(Invariant($"{declared} extended records are said to start at byte {first}, outside the file; they are ignored."));
            return file.Length;
        }
        var extended = new List<LasVariable>();
        Span<byte> h = stackalloc byte[ExtendedHeaderBytes];
        long at = (long)first;
        for (uint i = 0; i < declared; i++)
        {
            if (file.Length - at < ExtendedHeaderBytes || file.Read(at, h) < ExtendedHeaderBytes)
            {
                problems.Add(Invariant($"{declared} extended records are declared, only {i} are there."));
                break;
            }
            ulong bytes = BinaryPrimitives.ReadUInt64LittleEndian(h[20..]);
            at += ExtendedHeaderBytes;
            if (bytes > (ulong)(file.Length - at))
            {
                problems.Add(Invariant($"Extended record {i + 1} of {declared} reaches past the end of the file; it and those after it are ignored."));
                break;
            }
            extended.Add(new LasVariable(Text(h.Slice(2, 16)), BinaryPrimitives.ReadUInt16LittleEndian(h[18..]), Text(h.Slice(28, 32)), at, (long)bytes, true));
            at += (long)bytes;
        }
        ListRecords(extended, "extended_record");
        records.AddRange(extended);
        return (long)first;
    }

    private void ListRecords(List<LasVariable> records, string name)
    {
        foreach (LasVariable r in records.Take(MostListed))
            Fact(name, Invariant($"{r.User} {r.Id}, {r.Bytes} bytes{(r.Description.Length > 0 ? ": " : "")}{r.Description}"));
        if (records.Count > MostListed) Fact(name, Invariant($"and {records.Count - MostListed} more"));
    }

    private LazLayout? Compression(List<LasVariable> records, bool compressed, int format, int recordBytes)
    {
        LasVariable? record = records.FirstOrDefault(r => r.User == LazLayout.User && r.Id == LazLayout.Id);
        if (record is null && !compressed) return null;
        if (record is null)
            throw Fault(104, "the points are compressed, but nothing says how", "no record of compression items", "The header is damaged; copy the file again, or export it again");
        try
        {
            var layout = LazLayout.Read(file.Take(record.At, record.Bytes, "the compression record"), format, recordBytes);
            if (layout.Compressor == 0) return null;
            if (!compressed) throw new LazDamageException("the header says that points are plain, the compression record says that they are not");
            Fact("compression", Invariant($"compressor {layout.Compressor}, {(layout.ChunkPoints == 0 ? "chunks of differing size" : Invariant($"chunks of {layout.ChunkPoints} points"))}, items {string.Join(", ", layout.Items.Select(i => Invariant($"{i.Type} version {i.Version}")))}"));
            return layout;
        }
        catch (LazDamageException e)
        {
            throw new InputException(Invariant($"{file.Name}, byte {record.At}"), "the compression of the points is not one that is read", e.Message,
                "Export the cloud again as LAS or LAZ", e);
        }
    }

    // Descriptors only name what follows the standard fields: the points can be read without them.
    private void DescribeExtras(List<LasVariable> records, int spareBytes)
    {
        LasVariable? record = records.FirstOrDefault(r => r is { User: "LASF_Spec", Id: 4 });
        int described = 0;
        if (record != null)
        {
            int n = (int)Math.Min(record.Bytes / ExtraDescriptorBytes, ushort.MaxValue / ExtraDescriptorBytes);
            byte[] all = file.Take(record.At, n * (long)ExtraDescriptorBytes, "the extra bytes record");
            for (int i = 0; i < n; i++)
            {
                ReadOnlySpan<byte> d = all.AsSpan(i * ExtraDescriptorBytes, ExtraDescriptorBytes);
                (string type, int bytes) = ExtraType(d[2], d[3]);
                described += bytes;
                string text = Text(d.Slice(160, 32));
                Fact("extra_column", Invariant($"{Text(d.Slice(4, 32))}: {type}{(text.Length > 0 ? ", " : "")}{text}"));
            }
        }
        if (described > spareBytes)
            problems.Add(Invariant($"The extra columns described need {described} bytes a point, the records have {spareBytes}."));
        else if (described < spareBytes)
            Fact("extra_bytes_undescribed", Invariant($"{spareBytes - described} a point"));
    }

    // Types 11 to 30 are pairs and triples of the first ten, deprecated since revision 14 of the standard. Type 0 keeps
    // its number of bytes in the field of options.
    private static (string Name, int Bytes) ExtraType(byte type, byte options)
    {
        if (type == 0) return ("undocumented", options);
        if (type > 30) return (Invariant($"unknown type {type}"), 0);
        var one = (LasExtraType)(((type - 1) % 10) + 1);
        int many = ((type - 1) / 10) + 1;
        string name = one.ToString().ToLowerInvariant();
        return (many == 1 ? name : Invariant($"{many} x {name}"), many * LasExtra.BytesOf(one));
    }

    private LasProjection Projection(List<LasVariable> records, bool saysWkt)
    {
        byte[] Content(int id)
        {
            LasVariable? r = records.FirstOrDefault(r => r.Id == id && r.User == ProjectionUser && r.Bytes > 0);
            if (r == null) return [];
            if (r.Bytes <= MostWktBytes) return file.Take(r.At, r.Bytes, "a coordinate system record");
            problems.Add(Invariant($"Coordinate system record {id} is {r.Bytes} bytes long and is ignored."));
            return [];
        }
        string wkt = Encoding.UTF8.GetString(Content(2112)).Trim('\0', ' ', '\r', '\n', '\t');
        var projection = new LasProjection(saysWkt, wkt, Content(34735), Content(34736), Content(34737));
        if (saysWkt && wkt.Length == 0 && projection.KeyDirectory.Length == 0)
            Fact("crs_record", "none, though the header announces WKT");
        return projection;
    }
}
