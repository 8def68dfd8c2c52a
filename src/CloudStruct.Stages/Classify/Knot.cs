namespace CloudStruct.Stages.Classify;

/// <summary>One place along a sheet at which its margins are known.</summary>
internal sealed class Knot
{
    /// <summary>Distance along strike [m].</summary>
    public double S { get; init; }

    /// <summary>Half of the stretch it was fitted on [m].</summary>
    public double HalfM { get; init; }

    /// <summary>Middle of the evidence within the plane, square to strike [m].</summary>
    public double V { get; set; }

    /// <summary>Margins at V [m].</summary>
    public double A { get; set; }

    public double B { get; set; }

    /// <summary>Tilt dt/dv against the reference plane.</summary>
    public double G { get; set; }

    /// <summary>Sum of log odds inside over independent pieces of surface: what the fit won.</summary>
    public double Gain { get; set; }

    /// <summary>Mean log odds inside, and on either flank; NaN where nothing is seen.</summary>
    public double Inside { get; set; } = double.NaN;

    public double FlankA { get; set; } = double.NaN;

    public double FlankB { get; set; } = double.NaN;

    /// <summary>Both margins show here: rock on either side of each, and the odds step there.</summary>
    public bool BothMargins => Inside - FlankA > 0.8 && Inside - FlankB > 0.8;

    /// <summary>Either margin shows.</summary>
    public bool AnyMargin => Inside > 0 && (Inside - FlankA > 0.8 || Inside - FlankB > 0.8);
}
