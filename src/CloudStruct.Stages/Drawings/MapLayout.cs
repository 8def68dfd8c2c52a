using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Lays out the structural map at a round scale: which symbols and labels have room there, and where.</summary>
internal static class MapLayout
{
    /// <summary>Room for the map on a page of 174 mm with its coordinates at the edges [m of paper].</summary>
    private const double PaperWidthM = 0.156, PaperHeightM = 0.190;

    private const double GridPaperM = 0.030;

    /// <summary>The map.</summary>
    /// <param name="input">At least one point.</param>
    public static MapDrawing Of(Findings input)
    {
        WorkingCloud cloud = input.Described.Cloud;
        PictureFrame frame = PictureFrame.OnGrid(cloud, 1000);
        double width = frame.Width * frame.PixelM, height = frame.Height * frame.PixelM;
        double scale = Round(Math.Max(width / PaperWidthM, height / PaperHeightM), [1, 2, 2.5, 3, 4, 5, 7.5, 10]);
        var room = new MapRoom(frame.Left, frame.Top - height, frame.Left + width, frame.Top, scale);
        MapStation[] stations = MapMarks.Stations(input, room);
        MapSymbol[] symbols = MapMarks.Symbols(input, room, out int leftOut);
        SurveyFrame survey = cloud.Frame;
        double grid = Round(GridPaperM * scale, [1, 2, 5, 10]);
        return new MapDrawing
        {
            Title = input.SurveyName.Length > 0 ? "Structural map of " + input.SurveyName : "Structural map",
            LeftM = room.Left,
            BottomM = room.Bottom,
            RightM = room.Right,
            TopM = room.Top,
            Scale = scale,
            GridM = grid,
            Symbols = symbols,
            SymbolsLeftOut = leftOut,
            Lines = MapLines.Contacts(input),
            DikeAreas = MapLines.Areas(input),
            Stations = stations,
            UpAzimuthDeg = survey.North == North.Model ? null : survey.TurnDeg,
            NorthIsTrue = survey.North == North.True,
            Sentence = Sentence(input, scale, grid, symbols, leftOut, survey),
        };
    }

    private static string Sentence(Findings input, double scale, double grid, MapSymbol[] symbols, int leftOut, SurveyFrame survey)
    {
        var text = new List<string> { Invariant($"Scale 1:{scale:0.#} at full size; grid lines every {grid:0.###} m ({Coordinates(survey)}).") };
        int faces = symbols.Count(s => s.Domain != "contact"), contacts = symbols.Length - faces;
        if (faces > 0)
        {
            string more = leftOut > 0 ? Invariant($", the largest where symbols would overlap; {Words.Count(leftOut, "face has", "faces have")} no room at this scale") : "";
            text.Add(Invariant($"Strike and dip of {Words.Count(faces, "face", "faces")}{more}."));
        }

        if (contacts > 0) text.Add(Invariant($"Heavy symbols: {Words.Count(contacts, "attitude", "attitudes")} of contacts."));
        if (input.Contacts.Traces.Length > 0) text.Add("Contacts are drawn full where they were traced, dotted where they are concealed and only joined straight.");
        text.Add("Symbols after the FGDC Digital Cartographic Standard for Geologic Map Symbolization.");
        text.Add(Words.North(survey));
        return string.Join(" ", text);
    }

    private static string Coordinates(SurveyFrame survey) =>
        survey.Crs.Kind == CrsKind.Projected && survey.Crs.Name.Length > 0 ? survey.Crs.Name : "coordinates of the survey";

    private static double Round(double least, double[] steps)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(least)));
        return steps.First(s => s * power >= least * (1 - 1e-9)) * power;
    }
}
