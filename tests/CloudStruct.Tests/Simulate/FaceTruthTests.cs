using CloudStruct.Records.Classes;
using CloudStruct.Records.Frame;
using CloudStruct.Simulate;

namespace CloudStruct.Tests.Simulate;

public class FaceTruthTests
{
    private readonly SimulatedOutcrop demo = SimulatedOutcrops.Demo;

    [Fact]
    public void Points_of_a_true_face_lie_on_its_plane_within_the_stated_noise()
    {
        double[] squares = new double[2], counts = new double[2];
        for (int i = 0; i < demo.Count; i++)
        {
            if (demo.TrueFace[i] == 0) continue;
            SimulatedFace face = demo.Faces[demo.TrueFace[i] - 1];
            Assert.Equal(demo.TrueFace[i], face.Id);
            if (face.Kind is FaceKind.Contact or FaceKind.LooseSide) continue;
            double off = face.Normal.Dot(demo.Place(i) - demo.Origin) - face.OffsetM;
            int rock = face.Kind == FaceKind.Joint ? 0 : 1;
            squares[rock] += off * off;
            counts[rock]++;
        }

        // Shared and white noise and the grain of the rock are independent: their variances add. Worn edges and joint
        // traces, which may reach 5 mm inward, come on top.
        double noise = Math.Sqrt((demo.NoiseM * demo.NoiseM) + (demo.WhiteNoiseM * demo.WhiteNoiseM));
        Assert.InRange(Math.Sqrt(squares[0] / counts[0]), 0.97 * Math.Sqrt((noise * noise) + 9e-6), 1.12 * Math.Sqrt((noise * noise) + 9e-6));
        Assert.InRange(Math.Sqrt(squares[1] / counts[1]), 0.95 * noise, 1.15 * noise);
    }

    [Fact]
    public void No_point_of_a_true_face_is_far_off_its_plane()
    {
        for (int i = 0; i < demo.Count; i++)
        {
            if (demo.TrueFace[i] == 0) continue;
            SimulatedFace face = demo.Faces[demo.TrueFace[i] - 1];
            double off = Math.Abs(face.Normal.Dot(demo.Place(i) - demo.Origin) - face.OffsetM);
            Assert.True(off < 0.045 + (4 * face.WaveRmsM), $"point {i} of {face} lies {off} m off");
        }
    }

    [Fact]
    public void Faces_are_counted_and_measured_as_sampled()
    {
        int[] counts = new int[demo.Faces.Length + 1];
        foreach (int f in demo.TrueFace) counts[f]++;
        for (int f = 0; f < demo.Faces.Length; f++)
        {
            Assert.Equal(f + 1, demo.Faces[f].Id);
            Assert.Equal(counts[f + 1], demo.Faces[f].Points);
            Assert.Equal(1, demo.Faces[f].Normal.Length, 12);
        }

        // Large faces have about the cloud's points per area; a face looks out of the rock.
        SimulatedFace[] large = [.. demo.Faces.Where(f => f.AreaM2 > 0.5)];
        Assert.True(large.Length > 80);
        double perArea = large.Sum(f => f.Points) / large.Sum(f => f.AreaM2) * demo.SpacingM * demo.SpacingM;
        Assert.InRange(perArea, 0.85, 1.15);
        Assert.True(demo.Faces.Where(f => f.AreaM2 > 0.05).Average(f => f.Normal.Z) > 0.2);
    }

    [Fact]
    public void Pieces_of_one_plane_that_do_not_touch_have_numbers_of_their_own()
    {
        IGrouping<(double, double, double), SimulatedFace>[] planes =
            [.. demo.Faces.Where(f => f.Kind == FaceKind.Joint && f.AreaM2 > 0.1).GroupBy(f => (f.Normal.X, f.Normal.Y, f.Normal.Z))];
        Assert.Contains(planes, p => p.Count() > 1);
        int[] shown = [.. planes.Where(p => p.Count() > 1).SelectMany(p => p).Select(f => f.Id).Take(12)];
        foreach (int id in shown)
        {
            // Brute force: no point of another piece of the plane lies within one spacing.
            (Vec3 normal, Vec3[] own) = (demo.Faces[id - 1].Normal, Points(id));
            foreach (SimulatedFace other in demo.Faces.Where(f => f.Id != id && f.Normal == normal))
            {
                double nearest = Points(other.Id).Min(p => own.Min(q => (p - q).Length));
                Assert.True(nearest > demo.SpacingM, $"{id} and {other.Id} are {nearest} m apart");
            }
        }
    }

    [Fact]
    public void Stray_points_weathered_rock_and_cover_belong_to_no_face()
    {
        for (int i = 0; i < demo.Count; i++)
        {
            if (demo.TrueClass[i] is (byte)RockClass.Unknown or (byte)RockClass.Cover) Assert.Equal(0, demo.TrueFace[i]);
        }

        double stray = demo.TrueClass.Count(c => c == (byte)RockClass.Unknown) / (double)demo.Count;
        Assert.InRange(stray, 0.0025, 0.0055);
    }

    // The mean poles of sets are stated in the plan's own words; faces must scatter about them as their law says.
    [Fact]
    public void Host_faces_scatter_about_the_stated_poles()
    {
        SimulatedFace[] large = [.. demo.Faces.Where(f => f.Kind == FaceKind.Joint && f.AreaM2 > 0.25)];
        double[] angles = [.. large.Select(f => demo.HostSetPoles.Min(p => Math.Acos(Math.Min(1, Math.Abs(p.Dot(f.Normal)))) * 180 / Math.PI))];
        // kappa 90 to 300: the median angle from the mean is sqrt(2 ln 2 / kappa), 3.9 to 7.1 deg.
        Assert.InRange(angles.Order().ElementAt(angles.Length / 2), 3, 8);
        Assert.True(angles.Max() < 25);
    }

    // Residuals about the exact planes, pair by pair: their mean product at the stated length is the stated variance
    // over e. The grain of the rock (3 mm over 3 cm) adds at most a few hundredths of that; worn edges and joint traces
    // add a little at every lag.
    [Fact]
    public void Noise_in_the_cloud_is_correlated_over_the_stated_length()
    {
        double near = 0, far = 0, nearPairs = 0, farPairs = 0;
        foreach (SimulatedFace face in demo.Faces.Where(f => f.Kind == FaceKind.Joint && f.Points > 60))
        {
            Vec3[] points = Points(face.Id);
            double[] off = [.. points.Select(p => face.Normal.Dot(p - demo.Origin) - face.OffsetM)];
            double mean = off.Average();
            for (int i = 0; i < off.Length; i++)
            {
                for (int j = 0; j < i; j++)
                {
                    double lag = (points[i] - points[j]).Length / demo.NoiseLengthM;
                    if (lag is > 0.9 and < 1.1)
                    {
                        near += (off[i] - mean) * (off[j] - mean);
                        nearPairs++;
                    }
                    else if (lag is > 4 and < 6)
                    {
                        far += (off[i] - mean) * (off[j] - mean);
                        farPairs++;
                    }
                }
            }
        }

        double variance = demo.NoiseM * demo.NoiseM;
        Assert.True(nearPairs > 2000, $"{nearPairs}");
        Assert.InRange(near / nearPairs / variance, 0.25, 0.50);
        Assert.InRange(far / farPairs / variance, -0.1, 0.1);
    }

    private Vec3[] Points(int face) => [.. Enumerable.Range(0, demo.Count).Where(i => demo.TrueFace[i] == face).Select(demo.Place)];
}
