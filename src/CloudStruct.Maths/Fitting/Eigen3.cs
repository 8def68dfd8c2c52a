using CloudStruct.Records.Frame;

namespace CloudStruct.Maths.Fitting;

/// <summary>Eigenvalues in falling order, with unit eigenvectors of arbitrary sign.</summary>
/// <param name="L1">Largest.</param>
/// <param name="L2">Middle.</param>
/// <param name="L3">Smallest.</param>
/// <param name="V1">Of the largest.</param>
/// <param name="V2">Of the middle.</param>
/// <param name="V3">Of the smallest: a plane's normal.</param>
public readonly record struct Eigen3(double L1, double L2, double L3, Vec3 V1, Vec3 V2, Vec3 V3);
