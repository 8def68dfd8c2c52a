using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Decisions;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Sets;
using CloudStruct.Records.Stages;
using CloudStruct.Stages.Decisions;

namespace CloudStruct.Tests.Stages.Decisions;

public class DecidedFacesTests
{
    private static readonly SurveyFrame Frame = new() { Origin = new Vec3(1000, 2000, 100), North = North.True, ConvergenceDeg = 2 };

    [Fact]
    public void Without_decisions_nothing_changes_at_all()
    {
        FaceSet faces = Three();
        DecidedFaces d = DecidedFaces.Of(faces, [], Frame);
        Assert.Same(faces, d.Faces);
        Assert.Empty(d.Domains);
        Assert.Empty(d.Outcomes);
    }

    [Fact]
    public void A_dropped_face_leaves_its_points_to_no_face()
    {
        DecidedFaces d = DecidedFaces.Of(Three(), [Of(DecisionAction.Drop, 1)], Frame);
        Assert.Equal([11, 13], d.Faces.Faces.Select(f => f.FaceId));
        Assert.Equal([0, 1, 1, 0, 2], d.Faces.FaceOfPoint);
        Assert.Equal((true, 12), (d.Outcomes[0].Applied, d.Outcomes[0].FaceId));
    }

    [Fact]
    public void A_number_that_another_face_carries_now_is_not_believed()
    {
        // The row names face 13, but lies where 11 is and dips like 11.
        Decision moved = Of(DecisionAction.Drop, 0) with { FaceId = 13 };
        Assert.Equal([12, 13], DecidedFaces.Of(Three(), [moved], Frame).Faces.Faces.Select(f => f.FaceId));

        // The right number at a place where there is no face: not applied, and said.
        DecidedFaces gone = DecidedFaces.Of(Three(), [Of(DecisionAction.Drop, 0) with { Place = new Vec3(1003, 2000, 100) }], Frame);
        Assert.Equal(3, gone.Faces.Faces.Length);
        Assert.False(gone.Outcomes[0].Applied);
    }

    [Fact]
    public void The_step_beside_a_face_is_not_taken_for_it()
    {
        FaceSet one = Three() with { Faces = [Three().Faces[0]], FaceOfPoint = [] };
        Decision step = Of(DecisionAction.Drop, 0);
        Vec3 n = one.Faces[0].Normal;
        Assert.True(DecidedFaces.Of(one, [step with { Place = step.Place + (n * 0.02) }], Frame).Outcomes[0].Applied);
        Assert.False(DecidedFaces.Of(one, [step with { Place = step.Place + (n * 0.1) }], Frame).Outcomes[0].Applied);
    }

    [Fact]
    public void An_attitude_from_another_north_is_turned()
    {
        // Strike 40 from true north is strike 38 from grid north where the convergence is 2 deg; 13 deg more is another face.
        Decision d = Of(DecisionAction.Drop, 2);
        double grid = d.Attitude!.Value.StrikeDeg - 2;
        Assert.True(DecidedFaces.Of(Three(), [d with { North = North.Grid, Attitude = new Attitude(grid + 9, 60) }], Frame).Outcomes[0].Applied);
        Assert.False(DecidedFaces.Of(Three(), [d with { North = North.Grid, Attitude = new Attitude(grid + 13, 60) }], Frame).Outcomes[0].Applied);
    }

    [Fact]
    public void The_later_row_counts_and_a_drop_beats_all()
    {
        DecidedFaces d = DecidedFaces.Of(
            Three(),
            [
                Of(DecisionAction.Domain, 0) with { Line = 2, Domain = FaceDomain.Dike }, Of(DecisionAction.Domain, 0) with { Line = 3, Domain = FaceDomain.Host },
                Of(DecisionAction.Domain, 1) with { Line = 4, Domain = FaceDomain.Host }, Of(DecisionAction.Drop, 1) with { Line = 5 },
            ],
            Frame);
        Assert.Equal([FaceDomain.Host, null], d.Domains);
        Assert.Equal([false, true, false, true], d.Outcomes.Select(o => o.Applied));
    }

    [Fact]
    public void What_could_not_be_applied_is_said_with_its_line()
    {
        FaceSet faces = Three();
        Decision lost = Of(DecisionAction.Drop, 0) with { Line = 7, Place = new Vec3(0, 0, 0) }, noted = Of(DecisionAction.Note, 2) with { Line = 8, Note = "wet" };
        DecidedFaces d = DecidedFaces.Of(faces, [lost, noted], Frame);
        var said = new List<Remark>();
        DecisionsRecord r = DecisionLedger.Of([lost, noted], d.Outcomes, [], d.Faces, new SetsRecord(), said.Add);
        Assert.Equal([false, true], r.Outcomes.Select(o => o.Applied));
        Assert.Equal("note", r.OfFace[13]);
        Assert.Contains(said, m => m.Doubtful && m.Text.Contains("line 7"));
        Assert.Contains(said, m => !m.Doubtful && m.Text.StartsWith("1 of 2", StringComparison.Ordinal));
    }

    private static Decision Of(DecisionAction action, int face)
    {
        Face f = Three().Faces[face];
        return new Decision { Line = 2, Action = action, Target = DecisionTarget.Face, FaceId = f.FaceId, Place = f.Middle + Frame.Origin, Attitude = f.Attitude, North = North.True };
    }

    private static FaceSet Three() => new()
    {
        Faces = [Face(11, new Vec3(0, 0, 0), 120, 30), Face(12, new Vec3(5, 0, 0), 120, 80), Face(13, new Vec3(0, 5, 0), 40, 60)],
        FaceOfPoint = [0, 1, 1, 2, 3],
        ToleranceM = 0.02,
    };

    private static Face Face(int id, Vec3 middle, double strike, double dip) => new()
    {
        FaceId = id, Middle = middle, Normal = new Attitude(strike, dip).UpwardNormal(2), Attitude = new Attitude(strike, dip), AreaM2 = 0.5, LengthM = 0.8, HeightM = 0.6,
    };
}
