using System.Runtime.Intrinsics;

namespace CloudStruct.Maths.Fitting;

/// <summary>Decomposes the residuals of a planar patch into waves and sums its pairs by distance, on a raster.</summary>
/// <remarks>One per worker: it keeps its scratch memory. Cost: the square of the number of cells, which is bounded.</remarks>
public sealed partial class PatchModes
{
    /// <summary>Most waves: all polynomials up to degree 5.</summary>
    public const int MostWaves = 21;

    private const int MostDegree = 5;

    // Twenty cells a side carry the fifth degree; the time goes with the square.
    private const int MostCells = 400;

    private readonly LagBins bins;
    private readonly double finestM;
    private double[] weight = [], square = [], residual = [], wave = [], byWave = [];
    private int nx, ny;
    private double cellM;

    /// <summary>For patches of one cloud.</summary>
    /// <param name="bins">Common to all patches.</param>
    /// <param name="finestM">Smallest cell worth having: about the distance between points [m].</param>
    public PatchModes(LagBins bins, double finestM)
    {
        this.bins = bins;
        this.finestM = finestM;
    }

    /// <summary>The record of one patch.</summary>
    /// <param name="u">First coordinate in the plane [m].</param>
    /// <param name="v">Second coordinate in the plane [m].</param>
    /// <param name="r">Distance from the fitted plane [m].</param>
    /// <param name="w">Weight of each point in the fit; points of weight 0 do not count.</param>
    /// <returns>Null when the points span no area.</returns>
    public PatchRecord? Record(ReadOnlySpan<double> u, ReadOnlySpan<double> v, ReadOnlySpan<double> r, ReadOnlySpan<double> w)
    {
        double sw = 0, su = 0, sv = 0;
        for (int i = 0; i < u.Length; i++)
        {
            sw += w[i];
            su += w[i] * u[i];
            sv += w[i] * v[i];
        }

        if (!(sw > 3)) return null;
        double mu = su / sw, mv = sv / sw, uu = 0, uv = 0, vv = 0;
        for (int i = 0; i < u.Length; i++)
        {
            double du = u[i] - mu, dv = v[i] - mv;
            uu += w[i] * du * du;
            uv += w[i] * du * dv;
            vv += w[i] * dv * dv;
        }

        double turn = Math.Atan2(2 * uv, uu - vv) / 2, cos = Math.Cos(turn), sin = Math.Sin(turn);
        if (!Rasterise(u, v, r, w, mu, mv, cos, sin, out double meanSquare)) return null;
        int waves = Waves(sw);
        if (waves < 3) return null;

        double total = 0;
        foreach (double c in weight.AsSpan(0, nx * ny)) total += c;
        var squares = new double[waves];
        var white = new double[waves];
        for (int k = 0; k < waves; k++)
        {
            double q = 0, s = 0;
            for (int c = 0; c < nx * ny; c++)
            {
                double f = wave[(c * PatchRecord.Lanes) + k];
                q += residual[c] * f;
                s += square[c] * f * f;
            }

            squares[k] = q / total * (q / total);
            white[k] = s / (total * total);
        }

        (double spreadU, double spreadV) = Spreads(total);
        return new PatchRecord
        {
            Waves = waves,
            Squares = squares,
            WhiteShare = white,
            LagSums = SumPairs(waves, total),
            MeanSquare = meanSquare,
            SpreadU = spreadU,
            SpreadV = spreadV,
            Turn = turn,
        };
    }

    private bool Rasterise(
        ReadOnlySpan<double> u,
        ReadOnlySpan<double> v,
        ReadOnlySpan<double> r,
        ReadOnlySpan<double> w,
        double mu,
        double mv,
        double cos,
        double sin,
        out double meanSquare)
    {
        double lowX = double.MaxValue, highX = double.MinValue, lowY = double.MaxValue, highY = double.MinValue;
        for (int i = 0; i < u.Length; i++)
        {
            if (!(w[i] > 0)) continue;
            double du = u[i] - mu, dv = v[i] - mv, x = (cos * du) + (sin * dv), y = (cos * dv) - (sin * du);
            lowX = Math.Min(lowX, x);
            highX = Math.Max(highX, x);
            lowY = Math.Min(lowY, y);
            highY = Math.Max(highY, y);
        }

        double lengthX = highX - lowX, lengthY = highY - lowY;
        cellM = Math.Max(finestM, Math.Sqrt(lengthX * lengthY / MostCells));
        cellM = Math.Max(cellM, lengthX / (MostCells / 2.0));   // a strip one cell wide
        nx = Math.Max(1, (int)Math.Ceiling(lengthX / cellM));
        ny = Math.Max(1, (int)Math.Ceiling(lengthY / cellM));
        int cells = nx * ny;
        meanSquare = 0;
        if (nx < 2 || ny < 2) return false;
        if (weight.Length < cells)
        {
            weight = new double[cells];
            square = new double[cells];
            residual = new double[cells];
            wave = new double[cells * PatchRecord.Lanes];
            byWave = new double[cells * MostWaves];
        }

        Array.Clear(weight, 0, cells);
        Array.Clear(square, 0, cells);
        Array.Clear(residual, 0, cells);
        double sum = 0, sumW = 0;
        for (int i = 0; i < u.Length; i++)
        {
            if (!(w[i] > 0)) continue;
            double du = u[i] - mu, dv = v[i] - mv;
            int x = Math.Clamp((int)(((cos * du) + (sin * dv) - lowX) / cellM), 0, nx - 1);
            int y = Math.Clamp((int)(((cos * dv) - (sin * du) - lowY) / cellM), 0, ny - 1);
            int c = (y * nx) + x;
            weight[c] += w[i];
            square[c] += w[i] * w[i];
            residual[c] += w[i] * r[i];
            sum += w[i] * r[i] * r[i];
            sumW += w[i];
        }

        meanSquare = sum / sumW;
        return true;
    }

    // Fills the polynomials up to degree 5 in order of degree, made orthonormal over the weighted cells; gives how many there are.
    // Made wave by wave, each with its cells side by side, and turned over to cell by cell at the end, as the pairs want them.
    private int Waves(double total)
    {
        int cells = nx * ny, occupied = 0;
        for (int c = 0; c < cells; c++)
        {
            if (weight[c] > 0) occupied++;
        }

        Array.Clear(wave, 0, cells * PatchRecord.Lanes);
        double[] alongX = Legendre(nx), alongY = Legendre(ny);
        int most = Math.Min(MostWaves, occupied / 2), k = 0;
        for (int degree = 0; degree <= MostDegree; degree++)
        {
            for (int j = 0; j <= degree && k < most; j++)
            {
                Span<double> own = byWave.AsSpan(k * cells, cells);
                for (int y = 0, c = 0; y < ny; y++)
                {
                    double factor = alongY[(y * (MostDegree + 1)) + j];
                    for (int x = 0; x < nx; x++, c++) own[c] = weight[c] > 0 ? alongX[(x * (MostDegree + 1)) + degree - j] * factor : 0;
                }

                if (Orthonormal(k, total)) k++;
                else if (k < 3) return Turned(k, cells);
            }
        }

        return Turned(k, cells);
    }

    private int Turned(int waves, int cells)
    {
        for (int c = 0; c < cells; c++)
        {
            for (int k = 0; k < waves; k++) wave[(c * PatchRecord.Lanes) + k] = byWave[(k * cells) + c];
        }

        return waves;
    }

    // Legendre polynomials of the cells' middles on -1 to 1: nearly orthogonal already on a full rectangle.
    private static double[] Legendre(int n)
    {
        var p = new double[n * (MostDegree + 1)];
        for (int i = 0; i < n; i++)
        {
            double x = ((i + 0.5) * 2 / n) - 1;
            Span<double> row = p.AsSpan(i * (MostDegree + 1), MostDegree + 1);
            row[0] = 1;
            row[1] = x;
            for (int d = 2; d <= MostDegree; d++) row[d] = ((((2 * d) - 1) * x * row[d - 1]) - ((d - 1) * row[d - 2])) / d;
        }

        return p;
    }

    private bool Orthonormal(int k, double total)
    {
        int cells = nx * ny;
        Span<double> own = byWave.AsSpan(k * cells, cells);
        ReadOnlySpan<double> share = weight.AsSpan(0, cells);
        double before = Norm2(share, own, total), start = before;
        for (int pass = 0; pass < 2; pass++)
        {
            for (int j = 0; j < k; j++)
            {
                ReadOnlySpan<double> earlier = byWave.AsSpan(j * cells, cells);
                double dot = 0;
                for (int c = 0; c < share.Length && c < earlier.Length && c < own.Length; c++) dot += share[c] * earlier[c] * own[c];
                dot /= total;
                int done = 0;
                for (; done <= own.Length - 4; done += 4)
                    (Vector256.Create<double>(own[done..]) - (Vector256.Create(dot) * Vector256.Create(earlier[done..]))).CopyTo(own[done..]);
                for (; done < own.Length; done++) own[done] -= dot * earlier[done];
            }

            double after = Norm2(share, own, total);
            if (!(after > 1e-6 * start)) return false;
            bool steady = after > 0.01 * before;   // little was lost: rounding cannot have spoilt it
            before = after;
            if (steady) break;
        }

        double scale = 1 / Math.Sqrt(before);
        for (int c = 0; c < own.Length; c++) own[c] *= scale;
        return true;
    }

    private static double Norm2(ReadOnlySpan<double> share, ReadOnlySpan<double> own, double total)
    {
        double sum = 0;
        for (int c = 0; c < share.Length && c < own.Length; c++) sum += share[c] * own[c] * own[c];
        return sum / total;
    }

    private (double U, double V) Spreads(double total)
    {
        double x = 0, y = 0, xx = 0, yy = 0;
        for (int c = 0; c < nx * ny; c++)
        {
            double px = ((c % nx) + 0.5) * cellM, py = ((c / nx) + 0.5) * cellM;
            x += weight[c] * px;
            y += weight[c] * py;
            xx += weight[c] * px * px;
            yy += weight[c] * py * py;
        }

        return (Math.Sqrt((xx / total) - (x / total * (x / total))), Math.Sqrt((yy / total) - (y / total * (y / total))));
    }
}
