using CloudStruct.Formats;
using CloudStruct.Formats.Meshes;
using CloudStruct.Formats.Ply;
using CloudStruct.Records.Complaints;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Formats;

/// <summary>Small real files with random damage: data or a refusal, never anything else, and never more memory than is due.</summary>
public class MutationTests
{
    private const int MutantsPerFile = 40;

    public static TheoryData<string> Seeds()
    {
        var names = new TheoryData<string>();
        foreach (string folder in (string[])["las", "ply", "broken"])
        {
            foreach (string path in Directory.GetFiles(Repo.Path("testdata/" + folder)).Order(StringComparer.Ordinal))
            {
                if (new FileInfo(path).Length <= 10_000) names.Add(folder + "/" + Path.GetFileName(path));
            }
        }
        return names;
    }

    [Theory]
    [MemberData(nameof(Seeds))]
    public void Damage_gives_data_or_a_refusal(string name)
    {
        byte[] whole = File.ReadAllBytes(Repo.Path("testdata/" + name));
        var rng = new Random(20240301 + name.Sum(c => c));
        using var file = new CloudFile(Path.GetFileName(name), whole);
        for (int i = 0; i < MutantsPerFile; i++)
        {
            byte[] mutant = Damaged(whole, rng, i);
            File.WriteAllBytes(file.Path, mutant);
            using var stop = new CancellationTokenSource(TimeSpan.FromSeconds(20));   // a hang ends as a failure
            long before = GC.GetAllocatedBytesForCurrentThread();
            try
            {
                CloudFile.Points(file.Path, new MeshSampling { Least = 50, Most = 200 }, stop.Token);
                CloudFiles.Inspect(file.Path);
            }
            catch (InputException e)
            {
                Assert.NotEqual("", e.Mend);
            }
            catch (Exception e) when (e is not Xunit.Sdk.XunitException)
            {
                Assert.Fail($"{name}, mutant {i}: {e}");
            }
            long spent = GC.GetAllocatedBytesForCurrentThread() - before;
            Assert.True(spent < (8 << 20), $"{name}, mutant {i}: {spent} bytes allocated");
        }
    }

    // Headers are where counts and lengths stand: half of the damage goes there.
    private static byte[] Damaged(byte[] whole, Random rng, int i)
    {
        byte[] m = (byte[])whole.Clone();
        int reach = rng.Next(2) == 0 ? Math.Min(m.Length, 512) : m.Length;
        switch (i % 5)
        {
            case 0:
                for (int k = rng.Next(1, 9); k > 0; k--) m[rng.Next(reach)] ^= (byte)(1 << rng.Next(8));
                break;
            case 1:
                for (int k = rng.Next(1, 5); k > 0; k--) m[rng.Next(reach)] = (byte)rng.Next(256);
                break;
            case 2:
                return m[..rng.Next(m.Length)];
            case 3:
                // Extreme numbers where lengths and counts may stand.
                int at = rng.Next(Math.Max(1, reach - 8));
                m.AsSpan(at, Math.Min(rng.Next(1, 9), m.Length - at)).Fill(rng.Next(3) switch { 0 => 0, 1 => 0xFF, _ => 0x7F });
                break;
            default:
                int from = rng.Next(m.Length), length = Math.Min(rng.Next(1, 64), m.Length - from);
                return rng.Next(2) == 0 ? [.. m[..from], .. m[(from + length)..]] : [.. m[..from], .. m[from..(from + length)], .. m[from..]];
        }
        return m;
    }
}
