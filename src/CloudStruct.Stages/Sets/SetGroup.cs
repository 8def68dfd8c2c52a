using CloudStruct.Records.Contacts;
using static System.FormattableString;

namespace CloudStruct.Stages.Sets;

/// <summary>Whose faces are grouped together.</summary>
/// <param name="Domain">Side of the rock.</param>
/// <param name="Dike">Dike looked at by itself; 0: the whole domain.</param>
/// <param name="Numbered">Sets of the domain that have a number already.</param>
internal readonly record struct SetGroup(FaceDomain Domain, int Dike, int Numbered)
{
    /// <summary>The domain's word, as in the names of sets.</summary>
    public string Word => Domain.ToString().ToLowerInvariant();

    /// <summary>What it is called where people read it.</summary>
    public string Said => Dike > 0 ? Invariant($"dike {Dike}") : Word;
}
