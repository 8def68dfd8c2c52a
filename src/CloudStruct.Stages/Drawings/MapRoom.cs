using CloudStruct.Records.Drawings;

namespace CloudStruct.Stages.Drawings;

/// <summary>The window of the map and the places on it that are taken, as discs.</summary>
internal sealed class MapRoom(double left, double bottom, double right, double top, double scale)
{
    // Discs are looked up by squares of this size on paper: wider than the widest disc.
    private const double SquarePaperM = 0.012;

    private readonly Dictionary<(int, int), List<(Point2 At, double RadiusM)>> taken = [];

    public double Left => left;

    public double Bottom => bottom;

    public double Right => right;

    public double Top => top;

    /// <summary>Metres on the ground of a length on paper [mm].</summary>
    public double OfMm(double mm) => mm / 1000 * scale;

    /// <summary>Takes a disc when it lies within the window and touches no other.</summary>
    /// <param name="at">Middle, local [m].</param>
    /// <param name="radiusMm">Radius on paper, up to 6 mm.</param>
    public bool Take(Point2 at, double radiusMm)
    {
        double r = OfMm(radiusMm), edge = SquarePaperM * scale;
        if (at.X - r < left || at.X + r > right || at.Y - r < bottom || at.Y + r > top) return false;
        int x = (int)Math.Floor((at.X - left) / edge), y = (int)Math.Floor((at.Y - bottom) / edge);
        for (int i = x - 1; i <= x + 1; i++)
        {
            for (int j = y - 1; j <= y + 1; j++)
            {
                if (!taken.TryGetValue((i, j), out List<(Point2 At, double RadiusM)>? others)) continue;
                foreach ((Point2 other, double otherR) in others)
                {
                    double dx = other.X - at.X, dy = other.Y - at.Y, sum = r + otherR;
                    if ((dx * dx) + (dy * dy) < sum * sum) return false;
                }
            }
        }

        if (!taken.TryGetValue((x, y), out List<(Point2 At, double RadiusM)>? own)) taken[(x, y)] = own = [];
        own.Add((at, r));
        return true;
    }
}
