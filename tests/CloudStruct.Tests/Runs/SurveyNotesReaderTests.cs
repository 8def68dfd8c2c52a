using CloudStruct.Recipes;
using CloudStruct.Records.Frame;
using CloudStruct.Runs;

namespace CloudStruct.Tests.Runs;

public class SurveyNotesReaderTests
{
    [Fact]
    public void A_full_survey_yaml_is_read()
    {
        const string text = """
            name: North cliff
            crs: EPSG:32632
            reference:
              kind: rtk
              tilt_sigma_deg: 0.15
            declination: 3.4
            notation: strike/dip
            flight_date: 2026-05-31
            licence: CC BY 4.0
            recipe: dike-survey
            offset_m: [600000, 6650000, 0]
            axes: x -z y
            unit: us-ft
            settings:
              faces:
                smallest_face_m2: 0.1
            """;
        var faults = new List<SettingFault>();
        SurveyNotes notes = new SurveyNotesReader(faults).Read(YamlText.Parse(text, "survey.yaml"));
        Assert.Empty(faults);
        Assert.Equal("North cliff", notes.Name);
        Assert.Equal(ReferenceKind.Rtk, notes.Reference.Kind);
        Assert.Equal(0.15, notes.Reference.TiltSigmaDeg);
        Assert.Equal(new Vec3(600000, 6650000, 0), notes.OffsetM);
        Assert.Equal("x -z y", notes.Axes);
        Assert.Equal(0.3048006096, notes.UnitM!.Value, 1e-10);   // US survey foot: 1200/3937 m (definition)
        Assert.NotNull(notes.Settings);
    }

    [Fact]
    public void Every_fault_has_its_line()
    {
        const string text = "nam: x\nreference:\n  kind: gps\naxes: x y\nunit: yard\nflight_date: 31.5.2026\nnotation: dips\ndeclination: east\noffset_m: 3\n";
        var faults = new List<SettingFault>();
        new SurveyNotesReader(faults).Read(YamlText.Parse(text, "survey.yaml"));
        Assert.Equal([1, 3, 4, 5, 6, 7, 8, 9], faults.Select(f => f.Line));
    }
}
