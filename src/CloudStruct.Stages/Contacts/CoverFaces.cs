using CloudStruct.Records.Classes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Faces;

namespace CloudStruct.Stages.Contacts;

/// <summary>Takes out the flat pieces that lie on cover: turf draped over a step is as flat and as smooth as rock, and only its
/// class tells that it is none.</summary>
public static class CoverFaces
{
    /// <summary>The faces without those of which more than half the points are cover, in the same order, and the
    /// contacts with what they say of the faces cut alike.</summary>
    /// <param name="faces">All flat pieces.</param>
    /// <param name="contacts">Domains and places of those faces.</param>
    /// <param name="classes">Class of every working point.</param>
    /// <param name="dropped">How many were taken out.</param>
    public static (FaceSet Faces, ContactsRecord Contacts) Drop(FaceSet faces, ContactsRecord contacts, ClassifiedCloud classes, out int dropped)
    {
        int n = faces.Faces.Length;
        int[] points = new int[n + 1], cover = new int[n + 1];
        for (int i = 0; i < faces.FaceOfPoint.Length; i++)
        {
            int f = faces.FaceOfPoint[i];
            points[f]++;
            if (classes.Class[i] == (byte)RockClass.Cover) cover[f]++;
        }

        int[] kept = [.. Enumerable.Range(1, n).Where(f => 2 * cover[f] <= points[f])];
        dropped = n - kept.Length;
        if (dropped == 0) return (faces, contacts);
        int[] number = new int[n + 1];
        for (int k = 0; k < kept.Length; k++) number[kept[k]] = k + 1;
        return (
            faces with
            {
                Faces = [.. kept.Select(f => faces.Faces[f - 1])],
                FaceOfPoint = Array.ConvertAll(faces.FaceOfPoint, f => number[f]),
            },
            contacts with
            {
                DomainOfFace = [.. kept.Select(f => contacts.DomainOfFace[f - 1])],
                DikeOfFace = contacts.DikeOfFace.Length == 0 ? [] : [.. kept.Select(f => contacts.DikeOfFace[f - 1])],
                InPlaceOfFace = [.. kept.Select(f => contacts.InPlaceOfFace[f - 1])],
            });
    }
}
