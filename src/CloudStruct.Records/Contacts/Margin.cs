namespace CloudStruct.Records.Contacts;

/// <summary>One side of a dike. Looking along increasing chainage A is on the left; for a sheet dipping less than 30 deg A is the lower side.</summary>
public enum Margin
{
    /// <summary>Left, or lower.</summary>
    A,

    /// <summary>Right, or upper.</summary>
    B,
}
