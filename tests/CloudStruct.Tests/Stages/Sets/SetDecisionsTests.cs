using CloudStruct.Maths.Blocks;
using CloudStruct.Maths.Directions;
using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Sets;
using CloudStruct.Tests.Kit;

namespace CloudStruct.Tests.Stages.Sets;

public class SetDecisionsTests
{
    [Fact]
    public void Two_sets_become_one()
    {
        Face[] faces = [.. Set(40, 90, 80, 1), .. Set(30, 130, 80, 2), .. Set(30, 0, 10, 3)];
        SetsRecord before = Run(faces), after = Run(faces, Pair(DecisionAction.JoinSets, new Attitude(90, 80), new Attitude(130, 80)));
        Assert.Equal(3, before.Sets.Length);
        Assert.Equal(2, after.Sets.Length);
        OrientationSet joined = Assert.Single(after.Sets, s => s.Decided == "joined");
        Assert.InRange(joined.Count, 65, 70);
        Assert.InRange(joined.Mean.StrikeDeg, 100, 115);   // between 90 and 130, nearer to the larger
        Assert.All(after.SetOfFace[..70].Where(s => s != ""), s => Assert.Equal(joined.Set, s));
        Assert.True(Assert.Single(after.Decided).Applied);
        Assert.Equal("", after.Sets.Single(s => s != joined).Decided);
    }

    [Fact]
    public void A_set_becomes_two()
    {
        Face[] faces = [.. Set(60, 90, 80, 1), .. Set(30, 0, 10, 3)];
        SetsRecord after = Run(faces, Pair(DecisionAction.SplitSet, new Attitude(84, 80), new Attitude(96, 80)));
        OrientationSet[] parts = [.. after.Sets.Where(s => s.Decided == "split")];
        Assert.Equal(2, parts.Length);
        Assert.InRange(parts.Sum(s => s.Count), 55, 60);
        double between = Math.Abs(parts[0].Mean.StrikeDeg - parts[1].Mean.StrikeDeg);
        Assert.InRange(between, 4, 20);
    }

    [Theory]
    [InlineData(DecisionAction.JoinSets, 90, 200)]    // no second set there
    [InlineData(DecisionAction.JoinSets, 88, 92)]     // both are one set
    [InlineData(DecisionAction.SplitSet, 200, 210)]   // no set there
    public void What_matches_no_set_changes_nothing_and_says_so(DecisionAction action, double first, double second)
    {
        Face[] faces = [.. Set(40, 90, 80, 1), .. Set(30, 0, 10, 3)];
        SetsRecord before = Run(faces), after = Run(faces, Pair(action, new Attitude(first, 80), new Attitude(second, 80)));
        Assert.Equal(before.Sets, after.Sets);
        Assert.Equal(before.SetOfFace, after.SetOfFace);
        Assert.False(Assert.Single(after.Decided).Applied);
    }

    [Fact]
    public void A_domain_without_sets_is_named() =>
        Assert.Equal("no set of this domain was found", Assert.Single(Run([], Pair(DecisionAction.JoinSets, default, default)).Decided).Found);

    private static Decision Pair(DecisionAction action, Attitude first, Attitude second) =>
        new() { Line = 2, Action = action, Target = DecisionTarget.Set, Domain = FaceDomain.Host, Attitude = first, Other = second };

    private static SetsRecord Run(Face[] faces, params Decision[] decisions)
    {
        faces = [.. faces.Select((f, i) => f with { FaceId = i + 1 })];
        var input = new SetsInput(new SurveyFrame(), new FaceSet { Faces = faces, NoiseM = 0.005 }, new ContactsRecord(), new DescribedCloud()) { Decisions = decisions };
        return new SetsStage().Run(input, new SetSettings(), StageContext.Plain());
    }

    private static IEnumerable<Face> Set(int count, double strike, double dip, ulong stream)
    {
        Vec3 mean = new Attitude(strike, dip).UpwardNormal();
        for (int i = 0; i < count; i++)
        {
            var d = new Draws(71, stream, (ulong)i);
            Vec3 n = Fisher.Draw(mean, 150, ref d);
            yield return new Face
            {
                Middle = new Vec3((40 * (double)stream) + (7 * i), 11 * (i % 5), 3 * (i % 3)), Normal = n.Z < 0 ? -n : n, Attitude = Attitude.FromNormal(n), AreaM2 = 0.3, LengthM = 0.6, HeightM = 0.5,
                Region = new PoleRegion { Cone95Deg = 1, Cone95TotalDeg = 1, Ellipse95MajorDeg = 1, Ellipse95MinorDeg = 1 },
            };
        }
    }
}
