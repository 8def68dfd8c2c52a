namespace CloudStruct.Records.Drawings;

/// <summary>The structural map, laid out at a round scale: what is drawn where, in local metres, grid north up.</summary>
public sealed record MapDrawing
{
    /// <summary>Title above the map.</summary>
    public string Title { get; init; } = "";

    /// <summary>Window of the map: local east and north of its edges [m].</summary>
    public double LeftM { get; init; }

    /// <summary>See <see cref="LeftM"/>.</summary>
    public double BottomM { get; init; }

    /// <summary>See <see cref="LeftM"/>.</summary>
    public double RightM { get; init; }

    /// <summary>See <see cref="LeftM"/>.</summary>
    public double TopM { get; init; }

    /// <summary>Metres on the ground for a metre on paper: 200 for a scale of 1:200.</summary>
    public double Scale { get; init; }

    /// <summary>Distance of the lines of the coordinate grid [m].</summary>
    public double GridM { get; init; }

    /// <summary>Symbols of attitudes that have room, most important first.</summary>
    public MapSymbol[] Symbols { get; init; } = [];

    /// <summary>Faces that were measured but have no room for a symbol at this scale.</summary>
    public int SymbolsLeftOut { get; init; }

    /// <summary>Contacts: seen where traced, concealed where they are carried on along the centre line.</summary>
    public MapLine[] Lines { get; init; } = [];

    /// <summary>The ground of each dike between its margins where both show, closed rings.</summary>
    public MapLine[] DikeAreas { get; init; } = [];

    /// <summary>Stations with the labels that have room.</summary>
    public MapStation[] Stations { get; init; } = [];

    /// <summary>Azimuth of the sheet's upper edge about the stated north [deg]; null when angles are in the model's frame.</summary>
    public double? UpAzimuthDeg { get; init; }

    /// <summary>Whether the stated north is true north.</summary>
    public bool NorthIsTrue { get; init; }

    /// <summary>Plain sentences beneath.</summary>
    public string Sentence { get; init; } = "";
}
