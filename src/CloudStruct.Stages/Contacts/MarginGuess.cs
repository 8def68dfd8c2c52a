using CloudStruct.Records.Contacts;

namespace CloudStruct.Stages.Contacts;

/// <summary>Where the margins are along strike, at even steps: the corridor from which trace points are taken.</summary>
/// <param name="FirstS">Place of the first step [m].</param>
/// <param name="StepM">Distance of the steps [m].</param>
/// <param name="A">Offset of margin A along the normal [m], at t = 0.</param>
/// <param name="B">Offset of margin B [m], at t = 0.</param>
/// <param name="Tilt">Change of the offsets per metre up dip.</param>
internal sealed record MarginGuess(double FirstS, double StepM, double[] A, double[] B, double[] Tilt)
{
    /// <summary>Number of steps.</summary>
    public int Count => A.Length;

    /// <summary>Distance from a margin along the normal [m].</summary>
    public double Distance(Margin margin, SheetPoint p)
    {
        (int i, double f) = Step(p.S);
        double[] line = margin == Margin.A ? A : B;
        return p.Q - Mix(line, i, f) - (Mix(Tilt, i, f) * p.T);
    }

    /// <summary>Offset of a margin along the normal at t = 0 [m].</summary>
    public double OffsetAt(Margin margin, double s)
    {
        (int i, double f) = Step(s);
        return Mix(margin == Margin.A ? A : B, i, f);
    }

    /// <summary>Width at a place along strike [m].</summary>
    public double WidthAt(double s)
    {
        (int i, double f) = Step(s);
        return Mix(B, i, f) - Mix(A, i, f);
    }

    /// <summary>Place of a step [m].</summary>
    public double SOf(int step) => FirstS + (step * StepM);

    private static double Mix(double[] line, int i, double f) =>
        i + 1 < line.Length ? line[i] + (f * (line[i + 1] - line[i])) : line[i];

    private (int Index, double Fraction) Step(double s)
    {
        double u = Math.Clamp((s - FirstS) / StepM, 0, Count - 1);
        int i = Math.Min((int)u, Math.Max(0, Count - 2));
        return (i, u - i);
    }
}
