using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Comparing;

/// <summary>A station as width.csv gives it.</summary>
/// <param name="Id">"dike 1 station 12".</param>
/// <param name="Place">Map coordinates [m].</param>
/// <param name="WidthM">True width [m].</param>
/// <param name="Low95M">Lower 95 % limit by internal errors [m].</param>
/// <param name="High95M">Upper limit [m].</param>
public sealed record MeasuredWidth(string Id, Vec3 Place, double WidthM, double Low95M, double High95M);
