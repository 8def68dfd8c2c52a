using CloudStruct.Maths.Directions;
using CloudStruct.Records.Frame;

namespace CloudStruct.Tests.Maths.Directions;

public sealed class CommonRotationTests
{
    [Fact]
    public void A_known_rotation_comes_back_from_axes_of_either_sign()
    {
        var turn = new Vec3(0.04, -0.21, 0.33);
        Vec3[] a = Poles(new Random(1), 40);
        Vec3[] b = [.. a.Select((v, i) => CommonRotation.Turn(v, turn) * (i % 3 == 0 ? -1 : 1))];
        CommonRotation found = CommonRotation.Of(a, b, Same(40))!;
        Assert.Equal(turn.X, found.Vector.X, 1e-9);
        Assert.Equal(turn.Y, found.Vector.Y, 1e-9);
        Assert.Equal(turn.Z, found.Vector.Z, 1e-9);
    }

    [Fact]
    public void A_quarter_turn_about_the_vertical_moves_east_to_north()
    {
        // Rodrigues' formula by hand: right-handed about z, east (1, 0, 0) goes to north (0, 1, 0).
        Vec3 north = CommonRotation.Turn(new(1, 0, 0), new(0, 0, Math.PI / 2));
        Assert.Equal(0, north.X, 1e-15);
        Assert.Equal(1, north.Y, 1e-15);
    }

    [Fact]
    public void Its_interval_holds_the_truth_in_95_of_100_though_stated_errors_are_wrong_and_some_pairs_are_no_pairs()
    {
        int inside = 0;
        const int trials = 400;
        for (int trial = 0; trial < trials; trial++)
        {
            var dice = new Random(100 + trial);
            Vec3[] a = Poles(dice, 60), b = new Vec3[60];
            for (int i = 0; i < b.Length; i++)
            {
                Vec3 noise = new Vec3(Normal(dice), Normal(dice), Normal(dice)) * 0.03;
                b[i] = i < 3 ? Poles(dice, 1)[0] : (CommonRotation.Turn(a[i], new(0, 0, 0.05)) + noise).Unit();
            }

            CommonRotation found = CommonRotation.Of(a, b, Same(60))!;   // stated as 0.01, really 0.03
            if (Math.Abs(found.Vector.Z - 0.05) <= found.HalfWidth(Vec3.Up)) inside++;
        }

        // Binomial error of 400 trials at 0.95: 0.011; three of them either way.
        Assert.InRange((double)inside / trials, 0.917, 0.983);
    }

    [Fact]
    public void Poles_along_one_line_leave_the_turn_open()
    {
        Vec3[] a = [.. Enumerable.Range(0, 20).Select(i => new Vec3(0.01 * Math.Cos(i), 0.01 * Math.Sin(i), 1).Unit())];
        Assert.Null(CommonRotation.Of(a, a, Same(20)));
        Assert.Null(CommonRotation.Of(a.AsSpan(0, 3), a.AsSpan(0, 3), Same(3)));
    }

    private static double[] Same(int n) => [.. Enumerable.Repeat(0.01, n)];

    private static Vec3[] Poles(Random dice, int n) => [.. Enumerable.Range(0, n).Select(_ => new Vec3(Normal(dice), Normal(dice), Normal(dice)).Unit())];

    private static double Normal(Random dice) => Math.Sqrt(-2 * Math.Log(1 - dice.NextDouble())) * Math.Cos(2 * Math.PI * dice.NextDouble());
}
