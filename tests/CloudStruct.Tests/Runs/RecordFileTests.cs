using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using CloudStruct.Runs.Store;

namespace CloudStruct.Tests.Runs;

public sealed class RecordFileTests : IDisposable
{
    private readonly string path = Path.GetTempFileName();

    public void Dispose() => File.Delete(path);

    [Fact]
    public void A_record_comes_back_as_it_went()
    {
        var cloud = new WorkingCloud
        {
            Frame = new SurveyFrame { Origin = new Vec3(1, 2, 3.5), North = North.True, ConvergenceDeg = 1.25 },
            X = [.. Enumerable.Range(0, 300_000).Select(i => i * 0.5f)],
            Red = [1, 2, 3],
            Neighbours = [5, -1],
            SpacingM = 0.02,
            Grid = new SortedGrid { Keys = [1, 2L << 40], Starts = [0, 1, 2], NX = 7 },
        };
        RecordFile.Write(path, new Stored<WorkingCloud>(cloud, [new Remark("thin", "said", true)]));
        Stored<WorkingCloud> back = RecordFile.Read<Stored<WorkingCloud>>(path)!;
        Assert.Equal(cloud.X, back.Record.X);
        Assert.Equal(cloud.Red, back.Record.Red);
        Assert.Equal(cloud.Neighbours, back.Record.Neighbours);
        Assert.Equal(cloud.Grid.Keys, back.Record.Grid.Keys);
        Assert.Equal(cloud.Frame, back.Record.Frame);
        Assert.Equal(new Remark("thin", "said", true), back.Remarks.Single());
    }

    [Fact]
    public void Vectors_enums_and_what_is_null_come_back()
    {
        var contacts = new ContactsRecord
        {
            Contacts = [new Contact { Dike = 1, Margin = Margin.B, Constraint = Constraint.Line, Middle = new Vec3(1, 2, 3) }, new Contact { Attitude = new Attitude(120, 70), Region = new PoleRegion { Cone95Deg = 2 }, Normal = Vec3.Up }],
            DomainOfFace = [FaceDomain.Margin, FaceDomain.Host],
            Traces = [new MarginTrace(1, Margin.A, [new Vec3(0, 1, 2)], [3], [0.1])],
        };
        RecordFile.Write(path, contacts);
        ContactsRecord back = RecordFile.Read<ContactsRecord>(path)!;
        Assert.Equal(contacts.Contacts, back.Contacts);
        Assert.Equal(contacts.DomainOfFace, back.DomainOfFace);
        Assert.Equal(contacts.Traces[0].Points, back.Traces[0].Points);
    }

    [Fact]
    public void A_damaged_file_is_no_record()
    {
        RecordFile.Write(path, new Stored<WorkingCloud>(new WorkingCloud { X = new float[1000] }, []));
        byte[] whole = File.ReadAllBytes(path);
        foreach (int length in new[] { 0, 7, 20, whole.Length / 2, whole.Length - 1 })
        {
            File.WriteAllBytes(path, whole[..length]);
            Assert.Null(RecordFile.Read<Stored<WorkingCloud>>(path));
        }
    }
}
