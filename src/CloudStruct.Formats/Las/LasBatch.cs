namespace CloudStruct.Formats.Las;

/// <summary>Points to be written, column by column; every column that is given holds at least <see cref="Count"/> values.</summary>
public sealed record LasBatch
{
    /// <summary>Points in the batch.</summary>
    public required int Count { get; init; }

    /// <summary>File coordinates, in the units of the file's coordinate system.</summary>
    public required ReadOnlyMemory<double> X { get; init; }

    /// <summary>File coordinates.</summary>
    public required ReadOnlyMemory<double> Y { get; init; }

    /// <summary>File coordinates.</summary>
    public required ReadOnlyMemory<double> Z { get; init; }

    /// <summary>Colour 0-65535 (an 8-bit source value is multiplied by 256, as the standard says); empty writes zeros.</summary>
    public ReadOnlyMemory<ushort> Red { get; init; }

    /// <summary>Colour.</summary>
    public ReadOnlyMemory<ushort> Green { get; init; }

    /// <summary>Colour.</summary>
    public ReadOnlyMemory<ushort> Blue { get; init; }

    /// <summary>Classification; empty writes 0 (never classified).</summary>
    public ReadOnlyMemory<byte> Class { get; init; }

    /// <summary>Extra columns in the order of <see cref="LasLayout.Extras"/>, each an array of the type declared there.</summary>
    public Array[] Extra { get; init; } = [];
}
