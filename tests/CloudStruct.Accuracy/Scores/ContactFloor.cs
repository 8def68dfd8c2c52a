using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Accuracy.Scores;

/// <summary>What plain least squares reaches on contacts when the margin is known exactly: the trace points of a row are moved onto
/// the true margin and one plane is laid through them. What is left is the shape of the trace and the wander of the margin itself.</summary>
public static class ContactFloor
{
    /// <summary>Angles between that plane and the plane nearest to the true margin (as in <see cref="WidthScore.ContactErrorsDeg"/>), of the rows that state a plane [deg].</summary>
    public static IEnumerable<double> ErrorsDeg(SimulatedOutcrop truth, Vec3 origin, ContactsRecord contacts)
    {
        foreach (Contact c in contacts.Contacts)
        {
            if (c.Normal is not { } normal) continue;
            SimulatedDike? dike = truth.Dikes.MinBy(d => Math.Abs(d.Normal.Dot(normal)) < 0.5 ? double.PositiveInfinity : contacts.Traces.Where(t => t.Dike == c.Dike && t.Margin == c.Margin)
                .SelectMany(t => t.Points).Take(50).Sum(p => Math.Min(Math.Abs(d.SignedFromA(p + origin)), Math.Abs(d.SignedFromB(p + origin)))));
            if (dike is null) continue;
            int side = (c.Margin == Margin.A) == (Chainward(contacts, c).Dot(dike.Normal) > 0) ? 0 : 1;
            var moments = new Moments(default);
            var own = new List<Vec3>();
            foreach (MarginTrace t in contacts.Traces.Where(t => t.Dike == c.Dike && t.Margin == c.Margin))
            {
                for (int i = 0; i < t.Points.Length; i++)
                {
                    if (t.ChainageM[i] < c.ChainageFromM || t.ChainageM[i] > c.ChainageToM) continue;
                    Vec3 p = t.Points[i] + origin, n = dike.MarginNormalAt(side, p);
                    Vec3 on = t.Points[i] - (n * (side == 0 ? dike.SignedFromA(p) : dike.SignedFromB(p)));
                    moments.Add(on.X, on.Y, on.Z);
                    own.Add(p);
                }
            }

            if (moments.Weight < 3 || WidthScore.PatchPlane(dike, side, [.. own]) is not { } patch) continue;
            yield return Math.Acos(Math.Min(1, Math.Abs(PlaneFit.From(moments).Normal.Dot(patch)))) * 180 / Math.PI;
        }
    }

    private static Vec3 Chainward(ContactsRecord contacts, Contact c)
    {
        DikeFrame frame = Array.Find(contacts.Dikes, d => d.Dike == c.Dike)!;
        return frame.Normal[frame.Normal.Length / 2];
    }
}
