namespace CloudStruct.Products;

/// <summary>One file that a run read.</summary>
/// <param name="Name">Name relative to the survey, with forward slashes.</param>
/// <param name="Bytes">Size [bytes].</param>
/// <param name="Sha256">SHA-256 of the bytes, lower-case hexadecimal.</param>
public sealed record InputFile(string Name, long Bytes, string Sha256);
