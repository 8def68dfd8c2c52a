namespace CloudStruct.Records.Drawings;

/// <summary>A rose of strikes, computed.</summary>
public sealed record RoseDrawing
{
    /// <summary>File stem: "rose-host".</summary>
    public string Name { get; init; } = "";

    /// <summary>Title.</summary>
    public string Title { get; init; } = "";

    /// <summary>Width of a class of strikes [deg].</summary>
    public double BinDeg { get; init; } = 10;

    /// <summary>Planes whose strike, as an axis from 0 to 180 deg, falls into each class.</summary>
    public int[] Counts { get; init; } = [];

    /// <summary>Plain sentences beneath.</summary>
    public string Sentence { get; init; } = "";

    /// <summary>False when angles are in the model's frame: no north.</summary>
    public bool HasNorth { get; init; } = true;
}
