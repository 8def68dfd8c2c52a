using CloudStruct.Formats;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Field;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Formats.Tables;

public sealed class ReadingTableTests : IDisposable
{
    private readonly string path = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".csv");

    public void Dispose() => File.Delete(path);

    [Fact]
    public void A_reading_comes_with_place_kind_use_and_true_azimuth()
    {
        FieldReading[] all = Read("id,x_m,y_m,z_m,sigma_m,kind,strike_deg,dip_deg,north,declination_deg,use\nk1,341870.5,6231460,12.5,0.3,contact,356,81,magnetic,4.5,prior\nk2,1,2,,,face,10,30,grid,,\n");
        Assert.Equal(new Vec3(341870.5, 6231460, 12.5), all[0].Place);
        Assert.Equal((0.3, ReadingKind.Contact, ReadingUse.Prior, true), (all[0].SigmaM, all[0].Kind, all[0].Use, all[0].FromTrueNorth));
        Assert.Equal(0.5, all[0].Attitude.StrikeDeg, 1e-9);
        Assert.Equal((ReadingUse.Check, false), (all[1].Use, all[1].FromTrueNorth));
        Assert.True(double.IsNaN(all[1].Place.Z));
    }

    // Right-hand rule and its other spellings, worked by hand: strike 035 dips to 125, its pole trends to 305.
    [Theory]
    [InlineData("strike_deg,dip_deg", "35,60")]
    [InlineData("dip_direction_deg,dip_deg", "125,60")]
    [InlineData("pole_trend_deg,pole_plunge_deg", "305,30")]
    [InlineData("attitude", "N35E/60SE")]
    [InlineData("attitude", "n35e 60 se")]
    [InlineData("attitude", "S35W/60E")]
    public void One_plane_in_every_way_of_writing(string columns, string cells)
    {
        Attitude a = One(columns, cells, null);
        Assert.Equal(35, a.StrikeDeg, 1e-9);
        Assert.Equal(60, a.DipDeg, 1e-9);
    }

    [Theory]
    [InlineData("N35E/60NW", 215)]
    [InlineData("N20W/45NE", 340)]
    [InlineData("N20W/45W", 160)]
    [InlineData("S70E/10S", 110)]
    public void A_quadrant_bearing_dips_to_the_side_named(string text, double strike) => Assert.Equal(strike, One("attitude", text, null).StrikeDeg, 1e-9);

    [Theory]
    [InlineData("strike/dip", 65)]
    [InlineData("dip direction/dip", 335)]
    public void Two_numbers_need_the_surveys_notation(string notation, double strike) => Assert.Equal(strike, One("attitude", "065/40", notation).StrikeDeg, 1e-9);

    [Theory]
    [InlineData("attitude", "065/40", "two numbers")]
    [InlineData("attitude", "N35E/60NE", "along its strike")]
    [InlineData("attitude", "N35E/60", "side to which")]
    [InlineData("attitude", "N95E/60SE", "out of range")]
    [InlineData("attitude", "steep", "not understood")]
    [InlineData("strike_deg,dip_direction_deg,dip_deg", "35,215,60", "contradict")]
    [InlineData("strike_deg,dip_deg", "35,95", "out of range")]
    [InlineData("strike_deg,dip_deg", "35,", "missing")]
    public void What_is_ambiguous_is_an_error(string columns, string cells, string says) =>
        Assert.Contains(says, Assert.Throws<InputException>(() => One(columns, cells, null)).Message, StringComparison.Ordinal);

    [Theory]
    [InlineData("id,x_m,y_m,kind,strike_deg,dip_deg,north\na,1,2,face,3,4,\n", "north of an azimuth is not stated")]
    [InlineData("id,x_m,y_m,kind,strike_deg,dip_deg,north\na,1,2,face,3,4,magnetic\n", "no declination")]
    [InlineData("id,x_m,y_m,kind,strike_deg,dip_deg,north\na,1,2,vein,3,4,true\n", "neither face nor contact")]
    [InlineData("id,x_m,y_m,kind,strike_deg,dip_deg,north\na,1,2,face,3,4,true\na,1,2,face,3,4,true\n", "stands twice")]
    [InlineData("id,x_m,y_m,kind,north\na,1,2,face,true\n", "lacks the column")]
    public void A_table_that_leaves_something_open_is_refused(string text, string says) =>
        Assert.Contains(says, Assert.Throws<InputException>(() => Read(text)).Message, StringComparison.Ordinal);

    // true = grid + convergence (checks.md C3): a plane that strikes 10 from true north strikes 12 from a grid that lies 2 deg west of it.
    [Fact]
    public void A_true_azimuth_is_turned_onto_the_grid()
    {
        FieldReading r = Read("id,x_m,y_m,kind,strike_deg,dip_deg,north\na,1,2,face,10,70,true\n")[0];
        Assert.Equal(12, Attitude.FromNormal(r.NormalInGrid(-2)!.Value).StrikeDeg, 1e-9);
        Assert.Null(r.NormalInGrid(null));
    }

    private Attitude One(string columns, string cells, string? notation) => Read($"id,x_m,y_m,kind,north,{columns}\na,1,2,face,true,{cells}\n", notation)[0].Attitude;

    private FieldReading[] Read(string text, string? notation = null)
    {
        File.WriteAllText(path, text);
        return EvidenceFiles.ReadReadings(path, new Declination(null, CrsInfo.None, null), notation);
    }
}
