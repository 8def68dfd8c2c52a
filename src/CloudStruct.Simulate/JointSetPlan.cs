using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate;

/// <summary>One set of joints.</summary>
/// <param name="DipDirectionDeg">Azimuth of its mean dip against uphill [deg].</param>
/// <param name="DipDeg">Mean dip [deg]; above 90 means that it dips the other way.</param>
/// <param name="Kappa">Fisher concentration of its planes.</param>
/// <param name="SpacingM">Mean distance of its planes [m].</param>
/// <param name="Law">How the distances scatter.</param>
public sealed record JointSetPlan(Span2 DipDirectionDeg, Span2 DipDeg, Span2 Kappa, Span2 SpacingM, SpacingLaw Law = SpacingLaw.Even);
