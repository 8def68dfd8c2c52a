using CloudStruct.Formats;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Formats.Tables;

public sealed class DecisionTableTests : IDisposable
{
    private const string Header = "action,face_id,x_m,y_m,z_m,strike_deg,dip_deg,north,domain,set,other_set,other_strike_deg,other_dip_deg,dike,margin,note,decided_by,decided_on\n";

    private readonly string path = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".csv");

    public void Dispose() => File.Delete(path);

    [Fact]
    public void Every_action_is_read_with_what_it_is_about()
    {
        Decision[] all = Read(Header
            + "drop,12,341870.5,6231460,3.25,45,60,true,,,,,,,,,R. Field,2026-05-31\n"
            + "domain,13,1,2,3,0,0,,margin,,,,,,,,,\n"
            + "join_sets,,,,,10,80,grid,host,host-1,host-3,20,70,,,,,\n"
            + "split_set,,,,,10,80,,dike,dike-2,,200,70,,,,,\n"
            + "confirm_contact,,1,2,3,,,,,,,,,1,B,,,\n"
            + "note,,1,2,3,,,,,,,,,,,\"wet, and slippery\",,\n"
            + "note,,,,,10,80,,host,host-1,,,,,,two of them,,\n");
        Assert.Equal(
            [DecisionAction.Drop, DecisionAction.Domain, DecisionAction.JoinSets, DecisionAction.SplitSet, DecisionAction.ConfirmContact, DecisionAction.Note, DecisionAction.Note],
            all.Select(d => d.Action));
        Assert.Equal(
            [DecisionTarget.Face, DecisionTarget.Face, DecisionTarget.Set, DecisionTarget.Set, DecisionTarget.Contact, DecisionTarget.Place, DecisionTarget.Set],
            all.Select(d => d.Target));
        Assert.Equal((12, new Vec3(341870.5, 6231460, 3.25), 45.0, North.True, "R. Field", 2), (all[0].FaceId, all[0].Place!.Value, all[0].Attitude!.Value.StrikeDeg, all[0].North!.Value, all[0].By, all[0].Line));
        Assert.Equal(FaceDomain.Margin, all[1].Domain);
        Assert.Equal(("host-3", 70.0), (all[2].OtherSet, all[2].Other!.Value.DipDeg));
        Assert.Equal((1, Margin.B), (all[4].Dike, all[4].Margin!.Value));
        Assert.Equal("wet, and slippery", all[5].Note);
    }

    [Theory]
    [InlineData("delete,1,1,2,3,4,5,,,,,,,,,,,", "action")]
    [InlineData(",1,1,2,3,4,5,,,,,,,,,,,", "action")]
    [InlineData("drop,1,1,,3,4,5,,,,,,,,,,,", "y_m")]
    [InlineData("drop,1,1,2,3,,,,,,,,,,,,,", "strike_deg")]
    [InlineData("drop,1,1,2,3,4,95,,,,,,,,,,,", "dip_deg")]
    [InlineData("drop,1,1,2,3,4,5,south,,,,,,,,,,", "north")]
    [InlineData("domain,1,1,2,3,4,5,,,,,,,,,,,", "domain")]
    [InlineData("domain,1,1,2,3,4,5,,cover,,,,,,,,,", "domain")]
    [InlineData("join_sets,,,,,4,5,,host,host-1,host-2,,,,,,,", "other_strike_deg")]
    [InlineData("confirm_contact,,1,2,3,4,5,,,,,,,1,C,,,", "margin")]
    [InlineData("note,,1,2,3,,,,,,,,,,,,,", "note")]
    [InlineData("drop,1.5,1,2,3,4,5,,,,,,,,,,,", "face_id")]
    [InlineData("drop,1,1,2,3,4,5,,,,,,,,,,,31.5.2026", "decided_on")]
    public void A_bad_row_is_refused_with_line_and_column(string row, string column)
    {
        InputException e = Assert.Throws<InputException>(() => Read(Header + row + "\n"));
        Assert.Contains("line 2", e.Where);
        Assert.Contains("column " + column, e.Where);
        Assert.DoesNotContain('\n', e.Message);
    }

    [Fact]
    public void A_table_without_actions_is_refused() => Assert.Contains("action", Assert.Throws<InputException>(() => Read("x_m,y_m\n1,2\n")).Message);

    private Decision[] Read(string text)
    {
        File.WriteAllText(path, text);
        return EvidenceFiles.ReadDecisions(path);
    }
}
