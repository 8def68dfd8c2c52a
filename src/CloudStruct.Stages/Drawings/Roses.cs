using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Roses of strikes, one per domain with enough faces that have one.</summary>
internal static class Roses
{
    private const double LeastDipDeg = 5, BinDeg = 10;
    private const int Fewest = 10;

    /// <summary>The roses, in order of domains.</summary>
    public static IEnumerable<RoseDrawing> Of(Findings input)
    {
        Face[] faces = input.Faces.Faces;
        foreach (FaceDomain domain in FaceNets.Order)
        {
            int[] own = FaceNets.Own(input, domain);
            int[] striking = [.. own.Where(i => faces[i].Attitude.DipDeg >= LeastDipDeg)];
            if (striking.Length < Fewest) continue;
            int[] counts = new int[(int)(180 / BinDeg)];
            foreach (int i in striking) counts[(int)(Azimuth.Wrap180(faces[i].Attitude.StrikeDeg) / BinDeg)]++;
            SurveyFrame frame = input.Described.Cloud.Frame;
            string left = own.Length > striking.Length
                ? Invariant($" {Words.Count(own.Length - striking.Length, "face dips", "faces dip")} less than 5 deg and {(own.Length - striking.Length == 1 ? "has" : "have")} no strike.") : "";
            yield return new RoseDrawing
            {
                Name = "rose-" + domain.ToString().ToLowerInvariant(),
                Title = Invariant($"Strikes of {striking.Length} faces {FaceNets.Word(domain)}"),
                BinDeg = BinDeg,
                Counts = counts,
                HasNorth = frame.North != North.Model,
                Sentence = Invariant($"Classes of {BinDeg:0} deg, each face counted once and drawn both ways; the area of a petal, not its length, goes with the number.{left} {Words.North(frame)}"),
            };
        }
    }
}
