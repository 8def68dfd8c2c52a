using CloudStruct.Records.Complaints;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Intake;

/// <summary>Which coordinate system rules a survey, in which unit, and which north its azimuths get.</summary>
internal static class CoordinateSystem
{
    private const string Stage = "intake";

    /// <summary>The system that rules: survey.yaml's, else the files'. Files that contradict each other, and degrees, are refused.</summary>
    public static CrsInfo Of(SurveyInput input, StageContext context)
    {
        CrsInfo rules = input.Crs;
        CloudHeader? first = null;
        string silent = "";
        foreach (IPointSource source in input.Sources)
        {
            CloudHeader header = source.Header;
            if (header.Crs.Kind == CrsKind.Unknown)
            {
                if (silent.Length == 0) silent = header.Name;
                continue;
            }

            if (first is null) first = header;
            else if (Contradicts(first.Crs, header.Crs) && !ByHand(rules)) throw Conflict(first, header);
        }

        if (first is not null && rules.Kind == CrsKind.Unknown) rules = first.Crs;
        if (first is not null && ByHand(rules) && Contradicts(first.Crs, rules))
        {
            context.Say(new Remark(
                Stage, $"survey.yaml says the coordinates are in {Name(rules)}, {first.Name} says {Name(first.Crs)}. survey.yaml was believed.", true));
        }
        else if (first is not null && silent.Length > 0)
        {
            context.Say(new Remark(Stage, $"{silent} states no coordinate system; it was taken to be in {Name(rules)} like the other files.", true));
        }

        if (rules.Kind == CrsKind.Geographic)
        {
            throw new InputException(
                first?.Name ?? "survey.yaml",
                "the coordinates are longitude and latitude in degrees, in which neither lengths nor angles can be measured",
                Name(rules),
                "Export or reproject the cloud to a projected coordinate system, for example the UTM zone of the place, and measure that");
        }

        return rules;
    }

    /// <summary>Metres per file unit, across and up.</summary>
    public static (double HorizontalM, double VerticalM) Units(SurveyInput input, CrsInfo crs, StageContext context)
    {
        double horizontal = input.UnitM ?? (crs.HorizontalUnitM > 0 ? crs.HorizontalUnitM : 1);
        double vertical = input.UnitM ?? (crs.VerticalUnitM > 0 ? crs.VerticalUnitM : horizontal);
        if (input.UnitM is { } unit && !(unit > 0 && double.IsFinite(unit)))
        {
            throw new InputException("survey.yaml, unit", "a unit is no positive length", Invariant($"{unit} m"), "Write metre, foot, us_survey_foot or metres per unit");
        }

        if (horizontal != 1 || vertical != 1)
        {
            string from = input.UnitM is null ? Name(crs) : "survey.yaml";
            context.Say(new Remark(
                Stage, Invariant($"Coordinates were turned into metres: {UnitName(horizontal)} across, {UnitName(vertical)} up, by {from}."), false));
        }

        return (horizontal, vertical);
    }

    /// <summary>The north of the tables, and the convergence at a place.</summary>
    /// <param name="input">The survey.</param>
    /// <param name="crs">The system that rules.</param>
    /// <param name="middle">Middle of the survey, map coordinates [m].</param>
    /// <param name="horizontalUnitM">Metres per unit.</param>
    /// <param name="context">Takes remarks.</param>
    public static (North North, double? ConvergenceDeg) NorthOf(
        SurveyInput input, CrsInfo crs, Vec3 middle, double horizontalUnitM, StageContext context)
    {
        if (input.Reference.Kind == ReferenceKind.None)
        {
            context.Say(new Remark(Stage, "Nothing ties the model to the ground (reference kind none): all angles are in the frame of the model, and its y axis stands for north.", true));
            return (North.Model, null);
        }

        double? convergence = crs.Kind == CrsKind.Projected ? input.Convergence(middle.X / horizontalUnitM, middle.Y / horizontalUnitM) : null;
        if (convergence is { } c && !double.IsFinite(c)) convergence = null;
        if (input.North == North.Model) return (North.Model, convergence);
        if (input.North == North.Grid) return (North.Grid, convergence);
        if (convergence is not null) return (North.True, convergence);
        string why = crs.Kind switch
        {
            CrsKind.Projected => $"the meridian convergence of {Name(crs)} cannot be computed",
            CrsKind.Local => $"{Name(crs)} is a local system without a stated relation to north",
            _ => "no coordinate system is stated",
        };
        context.Say(new Remark(Stage, $"Azimuths refer to grid north (the y axis), because {why}.", true));
        return (North.Grid, null);
    }

    private static bool ByHand(CrsInfo crs) => crs.Source == "survey.yaml";

    private static bool Contradicts(CrsInfo a, CrsInfo b)
    {
        if (a.Kind == CrsKind.Unknown || b.Kind == CrsKind.Unknown) return false;
        if (a.Kind != b.Kind) return true;
        if (a.Epsg != 0 && b.Epsg != 0) return a.Epsg != b.Epsg;
        if (!Near(a.HorizontalUnitM, b.HorizontalUnitM, 1e-9)) return true;
        foreach (CrsParameter p in a.Parameters)
        {
            foreach (CrsParameter q in b.Parameters)
            {
                if (p.Name == q.Name && !Near(p.Value, q.Value, 1e-6)) return true;
            }
        }

        return a.Parameters.Length == 0 && b.Parameters.Length == 0 && a.Name.Length > 0 && b.Name.Length > 0
            && !string.Equals(Plain(a.Name), Plain(b.Name), StringComparison.Ordinal);
    }

    private static bool Near(double a, double b, double relative) => Math.Abs(a - b) <= relative * Math.Max(1, Math.Abs(a));

    // "WGS 84 / UTM zone 32N" and "WGS84 UTM Zone 32N" are one system.
    private static string Plain(string name) => new([.. name.Where(char.IsLetterOrDigit).Select(char.ToLowerInvariant)]);

    private static InputException Conflict(CloudHeader a, CloudHeader b) => new(
        b.Name,
        $"the file is in another coordinate system than {a.Name}",
        $"{Name(b.Crs)} against {Name(a.Crs)}",
        "Bring all clouds of the survey into one system, or, if one label is wrong, state the right one as crs in survey.yaml");

    private static string Name(CrsInfo crs)
    {
        string name = crs.Name.Length > 0 ? crs.Name : "an unnamed system";
        return crs.Epsg != 0 ? Invariant($"{name} (EPSG:{crs.Epsg})") : name;
    }

    private static string UnitName(double unitM)
    {
        if (unitM == 1) return "metres";
        if (Near(unitM, 0.3048, 1e-9)) return "international feet (0.3048 m)";
        if (Near(unitM, 1200.0 / 3937, 1e-9)) return "US survey feet (1200/3937 m)";
        return Invariant($"units of {unitM} m");
    }
}
