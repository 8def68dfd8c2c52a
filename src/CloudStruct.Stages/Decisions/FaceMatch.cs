using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Stages.Decisions;

/// <summary>Knows a face again by place and attitude.</summary>
/// <remarks>The middle of a face wanders within its plane when settings or the cloud change, hardly across it. So a step beside a
/// face, parallel to it and a hand's breadth away, is not taken for it, whatever number it has now.</remarks>
internal static class FaceMatch
{
    private const double FarthestDeg = 10;
    private const double LeastReachM = 0.15;
    private const double LeastAcrossM = 0.04;

    /// <summary>Index of the face meant; -1 when there is none.</summary>
    public static int Find(Decision decision, FaceSet faces, SurveyFrame frame)
    {
        Vec3 place = decision.Place!.Value - frame.Origin, normal = decision.Attitude!.Value.UpwardNormal(decision.TurnDeg(frame));
        double across = Math.Max(LeastAcrossM, 2 * faces.ToleranceM), best = double.PositiveInfinity;
        int found = -1;
        for (int f = 0; f < faces.Faces.Length; f++)
        {
            Face face = faces.Faces[f];
            Vec3 off = place - face.Middle;
            double reach = Math.Max(LeastReachM, 0.5 * Math.Sqrt(face.AreaM2)), away = off.Length;
            if (away > reach + across) continue;
            double cosine = Math.Min(1, Math.Abs(face.Normal.Dot(normal))), deg = Math.Acos(cosine) * 180 / Math.PI;
            double step = Math.Abs(off.Dot(face.Normal));
            if (deg > FarthestDeg || step > across) continue;
            double score = (away / reach) + (deg / FarthestDeg) + (step / across) - (face.FaceId == decision.FaceId ? 0.5 : 0);
            if (score < best) (best, found) = (score, f);
        }

        return found;
    }
}
