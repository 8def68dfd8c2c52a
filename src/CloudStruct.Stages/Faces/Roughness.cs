namespace CloudStruct.Stages.Faces;

/// <summary>How rough a face is against the noise of its scene.</summary>
/// <param name="Scatter">Scatter of its points over that of the scene's large faces.</param>
/// <param name="WavePower">Mean power of its residual waves over what the scene's noise makes expected: 1 for a plane.</param>
/// <param name="WavinessM">Root of the excess power of those waves [m].</param>
internal readonly record struct Roughness(double Scatter, double WavePower, double WavinessM);
