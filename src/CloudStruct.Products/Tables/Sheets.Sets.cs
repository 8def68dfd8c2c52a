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
    .Angle("cone95_deg", "Half-angle of the cone that holds the true mean pole with 95 % probability, internal errors only.", s => s.Cone95Deg)
    .Number("s1", "Largest normalised eigenvalue of the orientation tensor.", s => s.S1)
    .Number("s2", "Middle normalised eigenvalue.", s => s.S2)
    .Number("s3", "Smallest normalised eigenvalue.", s => s.S3)
    .Number("shape", "ln(s1/s2)/ln(s2/s3) (Woodcock 1977): above 1 clusters, below 1 girdles.", s => s.Shape)
    .Number("strength", "ln(s1/s3) (Woodcock 1977): 0 when uniform.", s => s.Strength)
    .MetresWithLimits("spacing", "Mean spacing of the exposed planes along the set's normal.", s => s.SpacingM, "spacing_mean_m")
    .Number("p32_per_m", "Area of exposed planes per volume of rock.", s => s.P32PerM?.Value)
    .Number("p32_low95_per_m", "Lower 95 % limit of the same.", s => s.P32PerM?.Low95)
    .Number("p32_high95_per_m", "Upper 95 % limit of the same.", s => s.P32PerM?.High95)
    .Metres("exposed_length_mean_m", "Mean exposed length along strike.", s => s.ExposedLengthMeanM)
    .MetresWithLimits("persistence", "Mean length of the planes along strike, ends that run out of sight taken into account.", s => s.PersistenceM)
    .Text("weighting", "How faces were weighted in the mean and the tensor: count, exposure, area.", s => s.Weighting)
    .Number("n_effective", "Number of equally weighted faces they are worth.", s => s.NEffective)
    .Number("blind_share", "Share of orientations that this exposure could not have shown.", s => s.BlindShare)
    .Text("zone", "Zone drawn by the user; empty for the whole survey.", s => s.Zone)
    .Angle("cone95_total_deg", "The cone with the common errors of the whole model added.", s => s.Cone95TotalDeg)
    .Number("stability", "Share of redrawn outcrops (places drawn with replacement) in which the set came back; empty in zones.", s => s.Stability)
    .Word("spacing_class", "ISRM 1978 word for the mean spacing; a value on a boundary belongs to the upper class.", ["extremely_close", "very_close", "close", "moderate", "wide", "very_wide", "extremely_wide"], s => s.SpacingClass)
    .Word("persistence_class", "ISRM 1978 word for the persistence; a value on a boundary belongs to the upper class.", ["very_low", "low", "medium", "high", "very_high"], s => s.PersistenceClass)
    .Text("decided", "What a geologist decided by hand: joined, split, note; empty when nothing.", s => s.Decided)
    .Count("dike", "Dike whose joints these are, where several were found and each was looked at by itself; empty elsewhere.", s => s.Dike > 0 ? s.Dike : null);
}
