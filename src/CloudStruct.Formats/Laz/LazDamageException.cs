namespace CloudStruct.Formats.Laz;

/// <summary>A compressed stream that no encoder wrote; the reader says where and wraps it.</summary>
internal sealed class LazDamageException(string fact) : Exception(fact);
