using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Stages.Faces;

namespace CloudStruct.Tests.Stages.Faces;

public class FaceNumbersTests
{
    private static readonly Vec3 Origin = new(341_870, 6_231_460, 12);

    [Fact]
    public void Numbers_do_not_follow_the_origin_or_the_sign_of_a_normal_or_who_else_is_there()
    {
        Face[] faces = [At(0.3, 0.4, 0.5, new Vec3(0, 1, 0)), At(5.3, 0.4, 0.5, new Vec3(0, 0, 1)), At(9.3, 7.4, 2.5, new Vec3(1, 1, 0).Unit())];
        int[] numbers = FaceNumbers.Of(faces, Origin);
        Assert.All(numbers, n => Assert.InRange(n, 1, 99_999_999));

        var shift = new Vec3(100, -20, 3);
        Face[] moved = [.. faces.Select(f => f with { Middle = f.Middle - shift, Normal = -f.Normal })];
        Assert.Equal(numbers, FaceNumbers.Of(moved, Origin + shift));
        Assert.Equal(numbers[2], FaceNumbers.Of([faces[2]], Origin).Single());
    }

    [Fact]
    public void Faces_alike_in_place_and_attitude_get_numbers_of_their_own_and_the_larger_keeps_its_own()
    {
        Face[] steps = [.. Enumerable.Range(0, 400).Select(i => At(0.5, 0.5, 0.01 + (0.002 * i), new Vec3(0, 1, 0)))];
        int[] numbers = FaceNumbers.Of(steps, Origin);
        Assert.Equal(400, numbers.Distinct().Count());
        Assert.Equal(numbers[..5], FaceNumbers.Of(steps[..5], Origin));   // without the smaller ones
        Assert.Equal(numbers, FaceNumbers.Of(steps, Origin));
    }

    [Fact]
    public void A_millimetre_changes_few_numbers()
    {
        // Middles over 40 m; each of three coordinates moves by up to 1 mm against sides 1 m apart: 3 in 2000 at most.
        Face[] faces = [.. Enumerable.Range(0, 2000).Select(i => At(40 * Share(i, 0.6180339887), 40 * Share(i, 0.4142135624), 40 * Share(i, 0.7320508076), new Vec3(0, 0, 1)))];
        Face[] moved = [.. faces.Select(f => f with { Middle = f.Middle + new Vec3(0.001, -0.001, 0.001) })];
        int[] before = FaceNumbers.Of(faces, Origin), after = FaceNumbers.Of(moved, Origin);
        Assert.InRange(before.Zip(after).Count(p => p.First != p.Second), 0, 25);
    }

    private static double Share(int i, double step) => (i * step) - Math.Floor(i * step);

    private static Face At(double x, double y, double z, Vec3 normal) => new() { Middle = new Vec3(x, y, z), Normal = normal, AreaM2 = 1 };
}
