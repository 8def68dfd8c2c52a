using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Field;

/// <summary>One attitude that a person measured on the rock.</summary>
/// <param name="Id">Its name in the table.</param>
/// <param name="Place">Map coordinates [m], later those of the survey frame; z is NaN where none was written down.</param>
/// <param name="SigmaM">One standard deviation of the place in each direction [m]; 0 when not stated.</param>
/// <param name="Kind">Face or contact.</param>
/// <param name="Attitude">Against <paramref name="FromTrueNorth"/>'s north; a declination has been applied already.</param>
/// <param name="FromTrueNorth">Whether azimuths count from true north; else from grid north.</param>
/// <param name="Use">Check or prior.</param>
public sealed record FieldReading(string Id, Vec3 Place, double SigmaM, ReadingKind Kind, Attitude Attitude, bool FromTrueNorth, ReadingUse Use)
{
    /// <summary>Upward unit normal in the grid frame.</summary>
    /// <param name="convergenceDeg">True azimuth minus grid azimuth; null when it is not known.</param>
    /// <returns>Null when the reading counts from true north and the convergence is not known.</returns>
    public Vec3? NormalInGrid(double? convergenceDeg) =>
        !FromTrueNorth ? Attitude.UpwardNormal() : convergenceDeg is { } c ? Attitude.UpwardNormal(c) : null;
}
