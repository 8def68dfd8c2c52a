namespace CloudStruct.Formats.Las;

/// <summary>Where one variable length record (or extended one) of a file stands.</summary>
/// <param name="User">User id, 16 characters at most.</param>
/// <param name="Id">Record id.</param>
/// <param name="Description">What the record says it is.</param>
/// <param name="At">First byte of the content.</param>
/// <param name="Bytes">Length of the content.</param>
/// <param name="IsExtended">True when it stands after the points.</param>
internal sealed record LasVariable(string User, int Id, string Description, long At, long Bytes, bool IsExtended);
