using CloudStruct.Records.Contacts;
using CloudStruct.Records.Sets;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<OrientationSet> Sets() => new TableSheet<OrientationSet>
    {
        File = "sets.csv",
        Title = "Orientation sets",
        Meaning = "One row for each group of faces of like attitude, and again for each zone that the user drew.",
        From = f => f.Sets.Sets,
    }
    .Text("set", "Domain and number in order of exposed area: host-1, dike-2.", s => s.Set)
    .Word("domain", "The side of the rock.", s => s.Domain, FaceDomain.Unknown)
    .Count("count", "Faces in the set.", s => s.Count)
    .Azimuth("strike_deg", "Strike of the mean plane (principal axis of the weighted poles).", s => s.Mean.StrikeDeg)
    .Angle("dip_deg", "Dip of the mean plane.", s => s.Mean.DipDeg)
    .Azimuth("dip_direction_deg", "Azimuth of steepest descent of the mean plane.", s => s.Mean.DipDirectionDeg)
    .Number("kappa", "Fisher concentration about the mean: large for tight sets.", s => s.Kappa)
    .Angle("cone95_deg", "Half-angle of the cone that holds the true mean pole with 95 % probability.", s => s.Cone95Deg)
    .Number("s1", "Largest normalised eigenvalue of the orientation tensor.", s => s.S1)
    .Number("s2", "Middle normalised eigenvalue.", s => s.S2)
    .Number("s3", "Smallest normalised eigenvalue.", s => s.S3)
    .Number("shape", "ln(s1/s2)/ln(s2/s3) (Woodcock 1977): above 1 clusters, below 1 girdles.", s => s.Shape)
    .Number("strength", "ln(s1/s3) (Woodcock 1977): 0 when uniform.", s => s.Strength)
    .MetresWithLimits("spacing", "Mean spacing along the set's normal.", s => s.SpacingM, "spacing_mean_m")
    .Number("p32_per_m", "Fracture area per volume of rock.", s => s.P32PerM?.Value)
    .Number("p32_low95_per_m", "Lower 95 % limit of the same.", s => s.P32PerM?.Low95)
    .Number("p32_high95_per_m", "Upper 95 % limit of the same.", s => s.P32PerM?.High95)
    .Metres("exposed_length_mean_m", "Mean exposed length along strike.", s => s.ExposedLengthMeanM)
    .MetresWithLimits("persistence", "Length of the fractures, estimated with the ends that run out of sight taken into account.", s => s.PersistenceM)
    .Text("weighting", "How faces were weighted in the mean and the tensor: count, area.", s => s.Weighting)
    .Number("n_effective", "Number of equally weighted faces they are worth.", s => s.NEffective)
    .Number("blind_share", "Share of orientations that this exposure could not have shown.", s => s.BlindShare)
    .Text("zone", "Zone drawn by the user; empty for the whole survey.", s => s.Zone);
}
