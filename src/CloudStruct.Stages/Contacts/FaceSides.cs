using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;

namespace CloudStruct.Stages.Contacts;

/// <summary>Tells on which side of the rock each face is, and whether its rock is in place.</summary>
internal sealed class FaceSides
{
    private const int PointsTried = 400, LeastInCell = 8;
    private const double ReachM = 0.4;   // from the face to the trace that it must touch
    private readonly WorkingCloud cloud;
    private readonly FaceSet faces;
    private readonly int[] starts, members;
    private readonly FaceDomain?[] decided;

    /// <summary>Sorts points by face.</summary>
    /// <param name="cloud">The cloud.</param>
    /// <param name="classes">Class of every point.</param>
    /// <param name="faces">The faces.</param>
    /// <param name="decided">Domain decided by hand per face, null where nothing was; empty when nothing was at all.</param>
    public FaceSides(WorkingCloud cloud, ClassifiedCloud classes, FaceSet faces, FaceDomain?[] decided)
    {
        this.decided = decided;
        this.cloud = cloud;
        this.faces = faces;
        int n = faces.Faces.Length;
        starts = new int[n + 2];
        foreach (int f in faces.FaceOfPoint) starts[f + 1]++;
        for (int f = 0; f <= n; f++) starts[f + 1] += starts[f];
        members = new int[faces.FaceOfPoint.Length];
        int[] next = [.. starts];
        for (int i = 0; i < members.Length; i++) members[next[faces.FaceOfPoint[i]]++] = i;
        Domain = new FaceDomain[n];
        InPlace = new InPlace[n];
        Dike = new int[n];
        for (int f = 0; f < n; f++)
        {
            Vote(f, classes);
            Domain[f] = Decided(f) ?? Domain[f];
            if (Domain[f] == FaceDomain.Dike) Dike[f] = Commonest(f, classes);
        }
    }

    /// <summary>Domain of every face.</summary>
    public FaceDomain[] Domain { get; }

    /// <summary>Dike of every face of domain dike or margin; 0 for others.</summary>
    public int[] Dike { get; }

    /// <summary>Whether the rock of every face is in place.</summary>
    public InPlace[] InPlace { get; }

    private FaceDomain? Decided(int face) => face < decided.Length ? decided[face] : null;

    private ReadOnlySpan<int> Members(int face) => members.AsSpan(starts[face + 1]..starts[face + 2]);

    // The commonest class; clasts lie in the dike. A tie goes to what makes fewer claims: unknown, cover, loose first.
    private void Vote(int face, ClassifiedCloud classes)
    {
        int host = 0, dike = 0, loose = 0, other = 0;
        foreach (int i in Members(face))
        {
            switch ((RockClass)classes.Class[i])
            {
                case RockClass.Host: host++; break;
                case RockClass.Dike or RockClass.Inclusion: dike++; break;
                case RockClass.Loose: loose++; break;
                default: other++; break;
            }
        }

        int most = Math.Max(Math.Max(host, dike), Math.Max(loose, other));
        bool rock = most > other && most > loose;
        Domain[face] = !rock ? FaceDomain.Unknown : dike > host ? FaceDomain.Dike : FaceDomain.Host;
        InPlace[face] = rock ? Records.Faces.InPlace.Yes : most == other ? Records.Faces.InPlace.Unknown : Records.Faces.InPlace.No;
    }

    // The dike that most of its dike rock belongs to; the lower number on a tie.
    private int Commonest(int face, ClassifiedCloud classes)
    {
        var votes = new SortedDictionary<int, int>();
        foreach (int i in Members(face))
        {
            if ((RockClass)classes.Class[i] is RockClass.Dike or RockClass.Inclusion && classes.DikeOfPoint[i] > 0) votes[classes.DikeOfPoint[i]] = votes.GetValueOrDefault(classes.DikeOfPoint[i]) + 1;
        }

        return votes.Count == 0 ? 0 : votes.MaxBy(v => v.Value).Key;
    }

    /// <summary>Marks the faces that lie on a contact of one dike: parallel to it, and the trace that touches them runs in their
    /// plane.</summary>
    /// <param name="dike">Number of the dike.</param>
    /// <param name="tracker">The dike's margins.</param>
    /// <param name="cells">Its trace cells in order of s.</param>
    /// <param name="normalAt">Unit normal of the dike at a place along the sheet.</param>
    /// <param name="angleDeg">Largest angle between face and contact [deg].</param>
    /// <param name="toleranceM">Largest distance of the trace from the face's plane, in the median [m].</param>
    /// <returns>The faces as cells of the margin that they lie on.</returns>
    public TraceCell[] MarkMargins(int dike, MarginTracker tracker, TraceCell[] cells, Func<double, Vec3> normalAt, double angleDeg, double toleranceM)
    {
        var surface = new List<TraceCell>();
        double least = Math.Cos(angleDeg * Math.PI / 180);
        for (int f = 0; f < faces.Faces.Length; f++)
        {
            FaceDomain? byHand = Decided(f);   // a face that a geologist put on the margin need not pass; one put elsewhere may not
            if (byHand is not (null or FaceDomain.Margin) || (byHand is null && InPlace[f] != Records.Faces.InPlace.Yes)) continue;
            Face face = faces.Faces[f];
            SheetPoint at = tracker.Sheet.Of(face.Middle);
            if (byHand is null && Math.Abs(face.Normal.Dot(normalAt(at.S))) < least) continue;
            double away = Math.Min(Math.Abs(tracker.Guess.Distance(Margin.A, at)), Math.Abs(tracker.Guess.Distance(Margin.B, at)));
            if (away > 0.5) continue;
            if (byHand is null && !TouchesTrace(f, at, cells, toleranceM)) continue;
            (Domain[f], Dike[f]) = (FaceDomain.Margin, dike);
            surface.AddRange(CellsOf(f, tracker, toleranceM));
        }

        return [.. surface];
    }

    // Means of the face's points over cells as large as those of the traces, so that one error law holds for both.
    private IEnumerable<TraceCell> CellsOf(int f, MarginTracker tracker, double toleranceM)
    {
        double size = tracker.CellM;
        var sums = new SortedDictionary<(int, int, int), (int Count, Vec3 Sum)>();
        foreach (int i in Members(f))
        {
            Vec3 p = cloud.Place(i);
            var key = ((int)Math.Floor(p.X / size), (int)Math.Floor(p.Y / size), (int)Math.Floor(p.Z / size));
            sums.TryGetValue(key, out (int Count, Vec3 Sum) old);
            sums[key] = (old.Count + 1, old.Sum + p);
        }

        foreach ((int count, Vec3 sum) in sums.Values)
        {
            if (count < LeastInCell) continue;
            Vec3 place = sum / count;
            SheetPoint at = tracker.Sheet.Of(place);
            double a = Math.Abs(tracker.Guess.Distance(Margin.A, at)), b = Math.Abs(tracker.Guess.Distance(Margin.B, at));
            if (Math.Min(a, b) <= 5 * toleranceM) yield return new TraceCell(a < b ? Margin.A : Margin.B, place, at, count, true);
        }
    }

    private bool TouchesTrace(int f, SheetPoint at, TraceCell[] cells, double toleranceM)
    {
        Face face = faces.Faces[f];
        double half = (Math.Max(face.LengthM, face.HeightM) / 2) + ReachM;
        ReadOnlySpan<int> own = Members(f);
        int stride = Math.Max(1, own.Length / PointsTried);
        var offsets = new List<double>();
        foreach (TraceCell c in cells)
        {
            if (c.At.S < at.S - half) continue;
            if (c.At.S > at.S + half) break;
            double offset = Math.Abs(face.Normal.Dot(c.Place - face.Middle));
            if (offset > 0.3) continue;
            for (int k = 0; k < own.Length; k += stride)
            {
                if ((cloud.Place(own[k]) - c.Place).Length > ReachM) continue;
                offsets.Add(offset);
                break;
            }
        }

        return offsets.Count >= 2 && MarginTracker.Median([.. offsets]) <= toleranceM;
    }
}
