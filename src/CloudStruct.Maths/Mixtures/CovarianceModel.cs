namespace CloudStruct.Maths.Mixtures;

/// <summary>What the components of a Gaussian mixture share.</summary>
public enum CovarianceModel
{
    /// <summary>One full covariance for all components.</summary>
    Common,

    /// <summary>A full covariance for each component.</summary>
    Own,
}
