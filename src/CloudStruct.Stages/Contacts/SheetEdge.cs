namespace CloudStruct.Stages.Contacts;

/// <summary>A class change in the coordinates of a <see cref="Sheet"/>.</summary>
/// <param name="Edge">Index of the edge.</param>
/// <param name="At">Place.</param>
/// <param name="Facing">Cosine between the direction out of the dike and the sheet's normal: near +1 on margin B, -1 on A.</param>
/// <param name="Weight">Weight of the edge times the size of <paramref name="Facing"/>.</param>
internal readonly record struct SheetEdge(int Edge, SheetPoint At, double Facing, double Weight);
