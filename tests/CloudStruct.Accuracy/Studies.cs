using CloudStruct.Accuracy.Deep;

namespace CloudStruct.Accuracy;

/// <summary>The studies by name.</summary>
public static class Studies
{
    /// <summary>All of them.</summary>
    public static SortedDictionary<string, IStudy> All { get; } = new(StringComparer.Ordinal)
    {
        ["classes"] = new ClassesStudy(),
        ["contacts"] = new ContactsStudy(),
        ["deep"] = new DeepStudy(),
        ["faces"] = new FacesStudy(),
        ["planes"] = new PlanesStudy(),
        ["sets"] = new SetsStudy(),
        ["width"] = new WidthStudy(),
        ["whole"] = new WholeStudy(),
    };
}
