using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Faces;
using CloudStruct.Records.Frame;

namespace CloudStruct.Products.Tables;

/// <summary>A face with what later stages said of it.</summary>
internal sealed record FaceRow(Face Face, Vec3 Map, FaceDomain Domain, string Set, InPlace InPlace, string Decided)
{
    /// <summary>Faces in order of their numbers. A stage that did not run leaves its columns undetermined.</summary>
    public static IEnumerable<FaceRow> Of(Findings f)
    {
        SurveyFrame frame = f.Intake.Frame;
        Face[] faces = f.Faces.Faces;
        for (int i = 0; i < faces.Length; i++)
        {
            FaceDomain domain = i < f.Contacts.DomainOfFace.Length ? f.Contacts.DomainOfFace[i] : FaceDomain.Unknown;
            string set = i < f.Sets.SetOfFace.Length ? f.Sets.SetOfFace[i] : "";
            InPlace inPlace = i < f.Contacts.InPlaceOfFace.Length ? f.Contacts.InPlaceOfFace[i] : faces[i].InPlace;
            yield return new(faces[i], frame.ToMap(faces[i].Middle), domain, set, inPlace, f.Decisions.OfFace.GetValueOrDefault(faces[i].FaceId, ""));
        }
    }
}
