using CloudStruct.Maths.Blocks;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Drawings;

/// <summary>Pictures of the cloud: natural colour, classes and faces by set, each in plan and from the front.</summary>
internal static class Pictures
{
    private const double Degree = Math.PI / 180;

    // Rock lower than this part of its extent is looked at from above: its front would be a line.
    private const double FlatRelief = 0.12;
    private const double ObliqueDeg = 40;

    /// <summary>All pictures, and the raster of the surface that the plan shows.</summary>
    public static (ViewImage[] Views, SurfaceRaster Surface) Of(Findings input, DrawingSettings settings, StageContext context)
    {
        WorkingCloud cloud = input.Described.Cloud;
        var views = new List<ViewImage>();

        // Plan: grid north is up, as on the map and in the rasters, so that one pass over the points serves all three.
        string upward = cloud.Frame.North switch
        {
            North.True => "grid north is up, the arrow points to true north",
            North.Model => "the y axis of the model is up",
            _ => "grid north is up",
        };
        (PictureFrame frame, int[] seen, float[] shade) = Look(
            "plan", "from above", $"Seen from above, {upward}", PictureFrame.OnGrid(cloud, settings.PictureSizePx), cloud.Frame.TurnDeg);
        SurfaceRaster surface = Surfaces.Of(input.Described, frame, seen, shade, context);
        context.Progress(0.6);

        (Vec3 into, double down) = Facing(input);
        Vec3 level = into.Cross(Vec3.Up).Unit();
        Vec3 look = (into * Math.Cos(down * Degree)) - (Vec3.Up * Math.Sin(down * Degree));
        string how = Invariant($"Seen looking toward {Words.Azimuth(Azimuth.Of(into, cloud.Frame.TurnDeg))}")
            + (down > 0 ? Invariant($" and {down:0} deg down") : ", level");
        Look("front", "from the front", how, PictureFrame.Around(cloud, level, level.Cross(look), settings.PictureSizePx), null);
        return ([.. views], surface);

        (PictureFrame Frame, int[] Seen, float[] Shade) Look(string name, string title, string how, PictureFrame frame, double? upAzimuth)
        {
            int[] seen = PicturePoints.Seen(cloud, frame, context.Threads, context.Stop);
            float[] shade = Shade(input.Described, seen, frame, context);
            foreach (Paint paint in Paints(input))
            {
                byte[] rgba = Develop(seen, shade, paint, context);
                views.Add(new ViewImage(
                    $"view-{paint.Name}-{name}", $"{paint.Title} {title}", frame.Width, frame.Height, frame.PixelM, rgba, $"{how}. {paint.Sentence}", upAzimuth)
                { Key = paint.Key });
            }

            return (frame, seen, shade);
        }
    }

    /// <summary>Which way to look for the front, level, and how far down [deg]: square to the rock walls, into the outcrop; over
    /// flat rock square to the first dike, from above.</summary>
    private static (Vec3 Into, double DownDeg) Facing(Findings input)
    {
        DescribedCloud d = input.Described;
        double wall = 0, all = 0, x = 0, y = 0;
        float low = float.PositiveInfinity, high = float.NegativeInfinity, minX = low, maxX = high, minY = low, maxY = high;
        for (int i = 0; i < d.Cloud.Count; i++)
        {
            (minX, maxX, minY, maxY) = (Math.Min(minX, d.Cloud.X[i]), Math.Max(maxX, d.Cloud.X[i]), Math.Min(minY, d.Cloud.Y[i]), Math.Max(maxY, d.Cloud.Y[i]));
            (low, high) = (Math.Min(low, d.Cloud.Z[i]), Math.Max(high, d.Cloud.Z[i]));
            double area = i < d.AreaM2.Length ? d.AreaM2[i] : 1;
            all += area;
            if (i >= d.NormalX.Length || !(Math.Abs(d.NormalZ[i]) < 0.8)) continue;
            wall += area;
            x += area * d.NormalX[i];
            y += area * d.NormalY[i];
        }

        bool flat = high - low < FlatRelief * Math.Max(maxX - minX, maxY - minY);
        double outward = Math.Sqrt((x * x) + (y * y));
        Vec3? dike = input.Contacts.Dikes.Length > 0 && input.Contacts.Dikes[0].Normal.Length > 0
            ? input.Contacts.Dikes[0].Normal[input.Contacts.Dikes[0].Normal.Length / 2]
            : null;
        Vec3? across = dike is { } n && Math.Sqrt((n.X * n.X) + (n.Y * n.Y)) > 0.2 ? new Vec3(n.X, n.Y, 0).Unit() : null;

        // Walls count when they face one way: an eighth of all rock, a fifth of the walls left after opposite ones cancel.
        Vec3 into = outward > 0.2 * wall && wall > all / 8
            ? new Vec3(-x / outward, -y / outward, 0)
            : across ?? (maxX - minX > maxY - minY ? new Vec3(0, 1, 0) : new Vec3(1, 0, 0));
        return (into, flat ? ObliqueDeg : 0);
    }

    private static IEnumerable<Paint> Paints(Findings input)
    {
        WorkingCloud cloud = input.Described.Cloud;
        if (cloud.HasColour)
        {
            yield return new Paint("colour", "The outcrop", "Colours of the photographs.", [], i => (cloud.Red[i], cloud.Green[i], cloud.Blue[i]), 0.35f);
        }
        else
        {
            yield return new Paint("colour", "The outcrop", "The cloud has no colour; only its relief is shown, lit from the upper left.", [], _ => (205, 205, 200), 1);
        }

        byte[] classes = input.Classes.Class;
        if (classes.Length == cloud.Count && cloud.Count > 0)
        {
            (byte R, byte G, byte B)[] colours = [.. Enumerable.Range(0, 256).Select(c => PictureColours.Of((RockClass)c))];
            yield return new Paint(
                "classes", "Rock, cover and loose blocks", "Colours are classes, shaded as if lit from the upper left.", ClassKey(input), i => colours[classes[i]], 0.8f);
        }

        int[] faceOf = input.Faces.FaceOfPoint;
        if (faceOf.Length == cloud.Count && input.Faces.Faces.Length > 0) yield return SetPaint(input);
    }

    private static ViewKey[] ClassKey(Findings input)
    {
        double[] area = new double[256];
        for (int i = 0; i < input.Classes.Class.Length; i++) area[input.Classes.Class[i]] += i < input.Described.AreaM2.Length ? input.Described.AreaM2[i] : 1;
        double all = area.Sum();
        RockClass[] order = [RockClass.Host, RockClass.Dike, RockClass.Inclusion, RockClass.Cover, RockClass.Loose, RockClass.Unknown];
        return [.. order.Where(c => area[(byte)c] > 0).Select(c =>
            PictureColours.Key(PictureColours.Of(c), Invariant($"{c.ToString().ToLowerInvariant()} {Share(area[(byte)c] / all)}")))];
    }

    private static string Share(double share) => share < 0.005 ? "below 1 %" : Invariant($"{100 * share:0} %");

    private static Paint SetPaint(Findings input)
    {
        Face[] faces = input.Faces.Faces;
        int[] faceOf = input.Faces.FaceOfPoint;
        string[] setOf = input.Sets.SetOfFace;
        Dictionary<string, (byte R, byte G, byte B)> ofSet = PictureColours.OfSets(input.Sets.Sets);
        (byte R, byte G, byte B) noSet = (228, 216, 176), noFace = PictureColours.Grey;
        var colours = new (byte R, byte G, byte B)[faces.Length + 1];
        colours[0] = noFace;
        bool anyOutside = false;
        for (int f = 0; f < faces.Length; f++)
        {
            bool inSet = f < setOf.Length && ofSet.TryGetValue(setOf[f], out colours[f + 1]);
            if (inSet) continue;
            colours[f + 1] = noSet;
            anyOutside = true;
        }

        var key = new List<ViewKey>();
        foreach ((string set, (byte R, byte G, byte B) colour) in ofSet) key.Add(PictureColours.Key(colour, set));
        if (anyOutside) key.Add(PictureColours.Key(noSet, "face in no set"));
        if (Array.IndexOf(faceOf, 0) >= 0) key.Add(PictureColours.Key(noFace, "on no face"));
        return new Paint(
            "faces",
            "Fracture faces by set",
            Invariant($"{Words.Count(faces.Length, "face", "faces")}, tinted by set, shaded as if lit from the upper left."),
            [.. key],
            i => colours[faceOf[i]],
            0.8f);
    }

    /// <summary>Light from the upper left of the picture, 0 to 1 per pixel; normals are turned to the eye.</summary>
    private static float[] Shade(DescribedCloud d, int[] seen, PictureFrame frame, StageContext context)
    {
        float[] shade = new float[seen.Length];
        Vec3 light = ((frame.Up * 1.0) - (frame.Right * 1.0) + (frame.Toward * 1.2)).Unit();
        BlockParallel.For(seen.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int p = from; p < to; p++)
            {
                int i = seen[p];
                if (i < 0 || i >= d.NormalX.Length) continue;
                Vec3 n = d.Normal(i);
                double s = n.Dot(light) * (n.Dot(frame.Toward) < 0 ? -1 : 1);
                shade[p] = (float)Math.Clamp(s, 0, 1);
            }
        });
        return shade;
    }

    private static byte[] Develop(int[] seen, float[] shade, Paint paint, StageContext context)
    {
        byte[] rgba = new byte[4 * seen.Length];
        BlockParallel.For(seen.Length, context.Threads, context.Stop, (from, to) =>
        {
            for (int p = from; p < to; p++)
            {
                if (seen[p] < 0) continue;
                (byte r, byte g, byte b) = paint.Colour(seen[p]);

                // A surface square to the light gains a fifth, one edge-on loses by the strength of the shading.
                float light = 1.2f - (paint.Strength * 0.85f * (1 - shade[p]));
                if (paint.Strength < 0.5f) light = 1.08f - (paint.Strength * (1 - shade[p]));
                rgba[4 * p] = Lit(r, light);
                rgba[(4 * p) + 1] = Lit(g, light);
                rgba[(4 * p) + 2] = Lit(b, light);
                rgba[(4 * p) + 3] = 255;
            }
        });
        return rgba;
    }

    // Neither factor is below 0.
    private static byte Lit(byte colour, float light)
    {
        int lit = (int)((colour * light) + 0.5f);
        return (byte)(lit > 255 ? 255 : lit);
    }

    /// <summary>One way to colour the points.</summary>
    private sealed record Paint(
        string Name, string Title, string Sentence, ViewKey[] Key, Func<int, (byte R, byte G, byte B)> Colour, float Strength);
}
