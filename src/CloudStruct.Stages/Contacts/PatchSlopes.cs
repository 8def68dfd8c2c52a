namespace CloudStruct.Stages.Contacts;

/// <summary>Slopes of the plane nearest to a margin over a patch, against the sheet.</summary>
/// <param name="Tilt">Change of q per metre up dip.</param>
/// <param name="TiltVariance">Its variance.</param>
/// <param name="Slope">Change of q per metre along strike.</param>
/// <param name="SlopeVariance">Its variance.</param>
/// <param name="SlopeTilt">Covariance of the two.</param>
internal readonly record struct PatchSlopes(double Tilt, double TiltVariance, double Slope, double SlopeVariance, double SlopeTilt);
