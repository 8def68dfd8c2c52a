using CloudStruct.Records.Classes;

namespace CloudStruct.Products.Tables;

public static partial class Sheets
{
    private static TableSheet<ClassSummary> Classes() => new TableSheet<ClassSummary>
    {
        File = "classes.csv",
        Title = "Classes",
        Meaning = "One row for each class of surface that is present; agreement is given when there are check labels.",
        From = f => f.Classes.Summary,
    }
    .Word("class", "host and dike: rock in place. cover: vegetation, soil, water, snow. inclusion: a clast in the dike. loose: rock out of place. unknown: not decided.", c => c.Class)
    .Count("points", "Points of the working cloud.", c => c.Points)
    .Number("area_m2", "Surface.", c => c.AreaM2)
    .Number("precision", "Share of what was called this class that the check labels call so too.", c => c.Precision)
    .Number("recall", "Share of the check labels of this class that were found.", c => c.Recall)
    .Number("iou", "Intersection over union with the check labels.", c => c.Iou);
}
