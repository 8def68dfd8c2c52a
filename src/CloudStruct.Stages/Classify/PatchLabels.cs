using CloudStruct.Maths.Planar;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Classify;

/// <summary>Hand labels carried to working points and patches.</summary>
internal sealed class PatchLabels
{
    /// <summary>A label stands for the patches whose middle lies this near [m].</summary>
    private const double ReachM = 0.15;

    /// <summary>Train labels per patch: 0 none, else the class.</summary>
    public byte[] Train { get; private init; } = [];

    /// <summary>Check labels per working point: 0 none, else the class.</summary>
    public byte[] Check { get; private init; } = [];

    /// <summary>Working points taken out by hand.</summary>
    public bool[] Ignored { get; private init; } = [];

    /// <summary>Whether any label trains.</summary>
    public bool Trains => Array.Exists(Train, t => t != 0);

    /// <summary>Whether any label checks.</summary>
    public bool Checks => Array.Exists(Check, t => t != 0);

    public static PatchLabels Of(DescribedCloud described, Patches patches, HandLabels labels)
    {
        WorkingCloud cloud = described.Cloud;
        byte[] train = new byte[patches.Count], check = new byte[cloud.Count];
        var ignored = new bool[cloud.Count];
        Vec3 origin = cloud.Frame.Origin;
        double reach = Math.Max(ReachM, 2 * patches.SizeM);
        int rings = (int)Math.Ceiling(reach / patches.SizeM);
        foreach (LabelPoint label in labels.Points)
        {
            Vec3 at = label.Place - origin;
            int near = SortedGridLookup.Nearest(cloud, (float)at.X, (float)at.Y, (float)at.Z, Math.Max(0.3, 4 * cloud.SpacingM));
            if (near < 0) continue;
            if (label.Use == LabelUse.Check) check[near] = (byte)label.Class;
            int own = patches.OfPoint[near];
            if (label.Use == LabelUse.Ignore)
            {
                ignored[near] = true;
                continue;
            }

            if (label.Use != LabelUse.Train) continue;
            for (int dz = -rings; dz <= rings; dz++)
            {
                for (int dy = -rings; dy <= rings; dy++)
                {
                    for (int dx = -rings; dx <= rings; dx++)
                    {
                        int j = patches.Map.Find(patches.Cell[3 * own] + dx, patches.Cell[(3 * own) + 1] + dy, patches.Cell[(3 * own) + 2] + dz);
                        if (j >= 0 && (patches.Place(j) - patches.Place(own)).Length() <= reach) train[j] = (byte)label.Class;
                    }
                }
            }
        }

        foreach (LabelPolygon polygon in labels.Polygons)
        {
            double xMin = polygon.Rings.Min(r => r.Min(p => p.X)), xMax = polygon.Rings.Max(r => r.Max(p => p.X));
            double yMin = polygon.Rings.Min(r => r.Min(p => p.Y)), yMax = polygon.Rings.Max(r => r.Max(p => p.Y));
            for (int i = 0; i < cloud.Count; i++)
            {
                double x = cloud.X[i] + origin.X, y = cloud.Y[i] + origin.Y, z = cloud.Z[i] + origin.Z;
                if (x < xMin || x > xMax || y < yMin || y > yMax || z < polygon.ZMinM || z > polygon.ZMaxM || !Ring.Holds(polygon.Rings, x, y)) continue;
                if (polygon.Use == LabelUse.Check) check[i] = (byte)polygon.Class;
                else if (polygon.Use == LabelUse.Ignore) ignored[i] = true;
                else train[patches.OfPoint[i]] = (byte)polygon.Class;
            }
        }

        return new PatchLabels { Train = train, Check = check, Ignored = ignored };
    }

    /// <summary>What the train labels say of a sheet: true when most dike labels near it lie inside and most host labels
    /// outside, false when they say the opposite, null when they say nothing of it.</summary>
    public bool? Verdict(Patches patches, Sheet sheet)
    {
        int dikeIn = 0, dikeBeside = 0, hostIn = 0, hostOut = 0;
        double width = sheet.WidthM;
        for (int i = 0; i < Train.Length; i++)
        {
            if (Train[i] is not ((byte)RockClass.Dike or (byte)RockClass.Host)) continue;
            double depth = sheet.Depth(patches.X[i], patches.Y[i], patches.Z[i]);
            bool inside = depth > 0;
            if (Train[i] == (byte)RockClass.Host) (hostIn, hostOut) = (hostIn + (inside ? 1 : 0), hostOut + (inside ? 0 : 1));
            else if (inside) dikeIn++;
            else if (depth > -width) dikeBeside++;
        }

        // Labels that touch the sheet on one side only leave the decision to its shape.
        if (dikeIn + hostIn < 5 || hostIn + hostOut < 5) return null;
        return dikeIn > 4 * Math.Max(hostIn, dikeBeside) ? true : hostIn > 4 * dikeIn ? false : null;
    }
}
