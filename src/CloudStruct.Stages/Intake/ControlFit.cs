using CloudStruct.Maths.Fitting;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Points;
using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Intake;

/// <summary>Residuals at control points, and what they say about tilt, azimuth and scale of the whole model.</summary>
internal sealed class ControlFit
{
    private const double SurfaceSpacings = 8;
    private const int LeastOnSurface = 8;

    private readonly ControlPoint[] points;
    private readonly Vec3[] places;
    private readonly double radiusM;
    private readonly List<Vec3>[] near;

    /// <summary>Control of a survey.</summary>
    /// <param name="points">Control points, survey coordinates [m].</param>
    /// <param name="origin">Origin of the local frame [m].</param>
    /// <param name="spacingM">Spacing of the cloud [m].</param>
    public ControlFit(ControlPoint[] points, Vec3 origin, double spacingM)
    {
        this.points = points;
        places = [.. points.Select(p => p.Place - origin)];
        radiusM = Math.Max(0.15, SurfaceSpacings * spacingM);
        near = [.. points.Select(_ => new List<Vec3>())];
    }

    /// <summary>Whether the surface near a point is wanted.</summary>
    public bool NeedsSurface => points.Any(p => p.Model is null);

    /// <summary>Takes in a block: keeps what lies near points that were not picked in the model.</summary>
    public void Add(PointBlock block)
    {
        Span<float> x = block.X, y = block.Y, z = block.Z;
        for (int k = 0; k < points.Length; k++)
        {
            if (points[k].Model is not null) continue;
            for (int i = 0; i < block.Count; i++)
            {
                var d = new Vec3(x[i] - places[k].X, y[i] - places[k].Y, z[i] - places[k].Z);

                // A mark that lies a little off the surface still sees the surface across it.
                if (d.Dot(d) < 4 * radiusM * radiusM) near[k].Add(d);
            }
        }
    }

    /// <summary>One residual per point.</summary>
    public ControlResidual[] Residuals() => [.. points.Select((p, k) => new ControlResidual
    {
        Id = p.Id,
        Role = p.IsCheck ? "check" : "control",
        DxM = p.Model?.X - p.Place.X,
        DyM = p.Model?.Y - p.Place.Y,
        DzM = p.Model?.Z - p.Place.Z,
        AlongNormalM = p.Model is null ? AlongNormal(near[k]) : null,
    })];

    /// <summary>The reference with sigmas from the residuals, when three points or more were picked in the model.</summary>
    /// <remarks>Small turns, scale and shift by weighted least squares on d = t + ω × r + k r, r from the middle of the
    /// points. The model is not corrected: what was found and its standard error both stay in the results, so a sigma is
    /// the root of the sum of their squares. Points that built the model say less about it than check points; check points
    /// alone are used when there are three.</remarks>
    public static ModelReference Estimate(ControlPoint[] all, ModelReference stated, StageContext context)
    {
        ControlPoint[] picked = [.. all.Where(p => p.Model is not null)];
        ControlPoint[] check = [.. picked.Where(p => p.IsCheck)];
        ControlPoint[] used = check.Length >= 3 ? check : picked;
        if (used.Length < 3) return stated;
        var middle = used.Aggregate(new Vec3(), (sum, p) => sum + p.Place) / used.Length;
        Vec3[] r = [.. used.Select(p => p.Place - middle)];
        if (!SpreadsOut(r)) return stated;
        if (Solve(used, r) is not { } fit) return stated;
        double deg = 180 / Math.PI;
        double tilt = deg * Math.Sqrt(0.5 * ((fit.Turn.X * fit.Turn.X) + (fit.Turn.Y * fit.Turn.Y) + (fit.SigmaTurn.X * fit.SigmaTurn.X) + (fit.SigmaTurn.Y * fit.SigmaTurn.Y)));
        double azimuth = deg * Math.Sqrt((fit.Turn.Z * fit.Turn.Z) + (fit.SigmaTurn.Z * fit.SigmaTurn.Z));
        double scale = Math.Sqrt((fit.Scale * fit.Scale) + (fit.SigmaScale * fit.SigmaScale));
        string which = check.Length >= 3 ? "check points" : "control points";
        bool byHand = stated.Source == "survey.yaml" && (stated.TiltSigmaDeg > 0 || stated.AzimuthSigmaDeg > 0 || stated.ScaleSigma > 0);
        context.Say(new Remark(
            "intake",
            Invariant($"{used.Length} {which}: tilt {tilt:0.000} deg, azimuth {azimuth:0.000} deg, scale {1e6 * scale:0} ppm (one sigma of the whole model{(byHand ? "; survey.yaml states its own, which were kept" : "")})."),
            false));
        if (byHand) return stated;
        return stated with
        {
            Kind = stated.Kind == ReferenceKind.NotStated ? ReferenceKind.Control : stated.Kind,
            TiltSigmaDeg = tilt,
            AzimuthSigmaDeg = azimuth,
            ScaleSigma = scale,
            Source = "control points",
        };
    }

    // Points in a line leave the turn about that line free.
    private static bool SpreadsOut(Vec3[] r)
    {
        var sums = new Moments(new Vec3());
        foreach (Vec3 p in r) sums.Add(p.X, p.Y, p.Z);
        Eigen3 e = sums.Covariance.Eigen();
        return e.L2 > 1e-3 * e.L1 && e.L1 > 0;
    }

    private static (Vec3 Turn, Vec3 SigmaTurn, double Scale, double SigmaScale)? Solve(ControlPoint[] used, Vec3[] r)
    {
        const int unknowns = 7;   // shift x y z, turn x y z, scale
        var rows = new List<double>();
        var d = new List<double>();
        void Row(double weight, double difference, params ReadOnlySpan<double> of)
        {
            foreach (double value in of) rows.Add(weight * value);
            d.Add(weight * difference);
        }

        // Turns and scale are solved as metres at the outermost point, so that all unknowns have one size.
        double reach = r.Max(p => p.Length);
        for (int k = 0; k < used.Length; k++)
        {
            Vec3 difference = used[k].Model!.Value - used[k].Place, q = r[k] / reach;
            double h = 1 / Math.Max(0.001, used[k].SigmaHM), v = 1 / Math.Max(0.001, used[k].SigmaVM);
            Row(h, difference.X, 1, 0, 0, 0, q.Z, -q.Y, q.X);
            Row(h, difference.Y, 0, 1, 0, -q.Z, 0, q.X, q.Y);
            Row(v, difference.Z, 0, 0, 1, q.Y, -q.X, 0, q.Z);
        }

        if (LeastSquares.Solve([.. rows], [.. d], unknowns) is not { } fit) return null;

        // Never below what the stated sigmas of the points allow: a lucky fit of three points proves nothing.
        int free = d.Count - unknowns;
        double factor = free > 0 ? Math.Max(1, fit.SumOfSquares / free) : 1;
        double Sigma(int k) => Math.Sqrt(factor * fit.Variances[k]) / reach;
        return (new Vec3(fit.X[3], fit.X[4], fit.X[5]) / reach, new Vec3(Sigma(3), Sigma(4), Sigma(5)), fit.X[6] / reach, Sigma(6));
    }

    // Plane through the nearest points, then the distance of the mark from it: positive when the mark lies above.
    private double? AlongNormal(List<Vec3> offsets)
    {
        if (offsets.Count < LeastOnSurface) return null;
        Vec3[] nearest = [.. offsets.OrderBy(d => d.Dot(d))];
        double gap = nearest[0].Length;
        Vec3[] patch = [.. nearest.Where(d => d.Length < gap + radiusM)];
        if (patch.Length < LeastOnSurface) return null;
        return PlaneFit.To(patch).Distance(new Vec3());
    }
}
