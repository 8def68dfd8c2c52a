using CloudStruct.Formats.Crs;
using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using ProjNet.CoordinateSystems;

namespace CloudStruct.Tests.Formats.Crs;

public class CrsTextTests
{
    private const double UsFoot = 1200.0 / 3937.0;

    private static readonly CrsSample[] Samples = CrsSample.All();

    // Kinds and units as the EPSG registry has them, from texts that an open projection library wrote.
    [Theory]
    [InlineData("25832", CrsKind.Projected, 1.0, 1.0, "")]
    [InlineData("2229", CrsKind.Projected, UsFoot, UsFoot, "")]
    [InlineData("2222", CrsKind.Projected, 0.3048, 0.3048, "")]
    [InlineData("32632+5773", CrsKind.Projected, 1.0, 1.0, "EGM96 height")]
    [InlineData("2903+6360", CrsKind.Projected, UsFoot, UsFoot, "NAVD88 height (ftUS)")]
    [InlineData("2229+5703", CrsKind.Projected, UsFoot, 1.0, "NAVD88 height")]
    [InlineData("26910+8228", CrsKind.Projected, 1.0, 0.3048, "NAVD88 height (ft)")]
    [InlineData("4326", CrsKind.Geographic, 1.0, 1.0, "")]
    [InlineData("4979", CrsKind.Geographic, 1.0, 1.0, "")]
    [InlineData("4978", CrsKind.Geographic, 1.0, 1.0, "")]
    [InlineData("3035", CrsKind.Projected, 1.0, 1.0, "")]
    public void Kind_units_and_vertical_part_are_read_from_every_generation_of_text(
        string code, CrsKind kind, double horizontalM, double verticalM, string vertical)
    {
        CrsSample[] texts = [.. Samples.Where(s => s.Code == code)];
        Assert.True(texts.Length >= 2);
        foreach (CrsSample text in texts)
        {
            CrsInfo crs = CrsText.Parse(text.Text);
            Assert.Equal(kind, crs.Kind);
            Assert.Equal(horizontalM, crs.HorizontalUnitM, 1e-15);
            Assert.Equal(verticalM, crs.VerticalUnitM, 1e-15);
            if (text.Kind == "WKT1_ESRI") continue;   // writes no codes and its own names
            Assert.Equal(vertical, crs.VerticalName);
            if (!(code == "4978" && text.Kind == "WKT1_GDAL")) Assert.Equal(int.Parse(code.Split('+')[0], System.Globalization.CultureInfo.InvariantCulture), crs.Epsg);
        }
    }

    [Fact]
    public void Systems_known_by_code_equal_their_texts()
    {
        int compared = 0;
        foreach (CrsSample text in Samples.Where(s => s.Kind == "WKT2:2019" && !s.Code.Contains('+', StringComparison.Ordinal)))
        {
            CrsInfo coded = CrsText.Parse("EPSG:" + text.Code), read = CrsText.Parse(text.Text);
            Assert.Equal(read.Kind, coded.Kind);
            if (coded.HorizontalUnitM != 1) Assert.Equal(read.HorizontalUnitM, coded.HorizontalUnitM);
            if (coded.Parameters.Length == 0) continue;
            compared++;
            Assert.Equal(read.Name, coded.Name);
            Assert.Equal(read.Method, coded.Method);
            Assert.Equal(read.SemiMajorM, coded.SemiMajorM);
            Assert.Equal(read.InverseFlattening, coded.InverseFlattening, 1e-8);
            foreach (CrsParameter p in coded.Parameters)
                Assert.True(read.Parameters.Any(q => q.Name == p.Name && Math.Abs(q.Value - p.Value) < 1e-9), $"{text.Code} {p}: {string.Join(' ', read.Parameters.Select(q => q.ToString()))}");
        }
        Assert.True(compared >= 24, $"{compared}");
    }

    [Fact]
    public void Utm_codes_follow_their_rule()
    {
        Assert.Equal("WGS 84 / UTM zone 32N", CrsText.Parse("EPSG:32632").Name);
        Assert.Equal("WGS 84 / UTM zone 1S", CrsText.Parse("32701").Name);
        Assert.Equal(-177, CrsText.Parse("epsg:32701").Parameters.Single(p => p.Name == "central_meridian_deg").Value);
        Assert.Equal(10000000, CrsText.Parse("EPSG:32760").Parameters.Single(p => p.Name == "false_northing_m").Value);
        Assert.Equal("ETRS89 / UTM zone 38N", CrsText.Parse("EPSG:25838").Name);
        Assert.Equal("NAD83 / UTM zone 23N", CrsText.Parse("EPSG:26923").Name);
        Assert.Equal("GDA94 / MGA zone 50", CrsText.Parse("EPSG:28350").Name);
    }

    [Fact]
    public void Unknown_codes_keep_their_number_and_run_on_grid_north()
    {
        CrsInfo crs = CrsText.Parse("EPSG:2056");
        Assert.Equal((CrsKind.Projected, "EPSG:2056", 0, ""), (crs.Kind, crs.Name, crs.Parameters.Length, crs.Wkt));
        Assert.Equal(UsFoot, CrsText.Parse("EPSG:2229").HorizontalUnitM);
    }

    [Theory]
    [InlineData("UTM 32")]
    [InlineData("EPSG:x")]
    [InlineData("+proj=utm +zone=32")]
    [InlineData("PROJCS[\"a\"")]
    [InlineData("PROJCS[\"a\"]]")]
    [InlineData("FOO[\"a\"]")]
    [InlineData("VERT_CS[\"a\",UNIT[\"metre\",1]]")]
    [InlineData("EPSG:32632+x")]
    [InlineData("")]
    public void What_is_not_understood_is_refused(string text) => Assert.Throws<InputException>(() => CrsText.Parse(text));

    [Fact]
    public void Deeply_nested_text_is_refused_not_recursed_into() =>
        Assert.Throws<InputException>(() => CrsText.Parse(string.Concat(Enumerable.Repeat("PROJCS[", 100000))));

    [Fact]
    public void None_and_local_are_words()
    {
        Assert.Equal(CrsKind.Unknown, CrsText.Parse("none").Kind);
        Assert.Equal(CrsKind.Local, CrsText.Parse("Local").Kind);
        Assert.Equal(CrsKind.Local, CrsText.Parse("LOCAL_CS[\"mine\",UNIT[\"metre\",1]]").Kind);
        Assert.Equal(CrsKind.Local, CrsText.Parse("ENGCRS[\"mine\",EDATUM[\"d\"],CS[Cartesian,2],AXIS[\"x\",east],AXIS[\"y\",north],LENGTHUNIT[\"foot\",0.3048]]").Kind);
    }

    // The text we give on is what an independent library reads: plain WKT1 with the same grid.
    [Fact]
    public void Composed_text_is_read_by_the_projection_package_and_by_ourselves()
    {
        var factory = new CoordinateSystemFactory();
        int read = 0;
        foreach (CrsSample text in Samples.Where(s => s.Kind is "WKT2:2019" or "WKT1_GDAL"))
        {
            CrsInfo crs = CrsText.Parse(text.Text);
            if (crs.Wkt.Length == 0) continue;
            Assert.DoesNotContain("COMPD", crs.Wkt, StringComparison.Ordinal);
            CrsInfo again = CrsText.Parse(crs.Wkt);
            Assert.Equal((crs.Kind, crs.Name, crs.Epsg, crs.Method), (again.Kind, again.Name, again.Epsg, again.Method));
            Assert.Equal(crs.HorizontalUnitM, again.HorizontalUnitM, 1e-12);
            foreach (CrsParameter p in crs.Parameters.Where(p => p.Name != "standard_parallel_1_deg" || crs.Method != "Polar Stereographic"))
                Assert.Equal(p.Value, again.Parameters.Single(q => q.Name == p.Name).Value, Math.Abs(p.Value) * 1e-12);
            if (crs.Kind != CrsKind.Projected || crs.Method is not "Transverse Mercator") continue;
            var package = (ProjectedCoordinateSystem)factory.CreateFromWkt(crs.Wkt);
            Assert.Equal(crs.HorizontalUnitM, package.LinearUnit.MetersPerUnit, 1e-9);
            read++;
        }
        Assert.True(read >= 30, $"{read}");
    }

    [Fact]
    public void A_unit_named_foot_with_the_factor_of_the_metre_is_a_foot()
    {
        // Seen in files of 2014 (las/pd_test1_4.las).
        CrsInfo crs = CrsText.Parse("COMPD_CS[\"c\",LOCAL_CS[\"l\",UNIT[\"metre\",1]],VERT_CS[\"v\",VERT_DATUM[\"d\",2005],UNIT[\"US survey foot\",1.0]]]");
        Assert.Equal(UsFoot, crs.VerticalUnitM);
    }

    [Fact]
    public void Axes_that_point_south_give_no_convergence()
    {
        CrsInfo crs = CrsText.Parse("PROJCS[\"Lo29\",GEOGCS[\"g\",DATUM[\"d\",SPHEROID[\"WGS 84\",6378137,298.257223563]],PRIMEM[\"Greenwich\",0],UNIT[\"degree\",0.0174532925199433]],PROJECTION[\"Transverse_Mercator\"],PARAMETER[\"central_meridian\",29],UNIT[\"metre\",1],AXIS[\"Y\",WEST],AXIS[\"X\",SOUTH]]");
        Assert.Equal(CrsKind.Projected, crs.Kind);
        Assert.Null(Convergence.At(crs, 0, 0));
    }
}
