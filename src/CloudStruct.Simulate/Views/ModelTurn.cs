using CloudStruct.Records.Frame;
using CloudStruct.Simulate.Chance;

namespace CloudStruct.Simulate.Views;

/// <summary>The error that a whole model has in common: a small tilt and a turn about its middle.</summary>
/// <param name="TiltX">About the east axis [rad].</param>
/// <param name="TiltY">About the north axis [rad].</param>
/// <param name="Turn">About the vertical, counter-clockwise from above [rad].</param>
internal readonly record struct ModelTurn(double TiltX, double TiltY, double Turn)
{
    /// <summary>Draws that of a plan; nothing when the plan asks for none.</summary>
    public static ModelTurn Of(OutcropPlan plan, ulong seed)
    {
        var dice = new Dice(seed, Purpose.Model);
        double tilt = plan.ModelTiltSigmaDeg * Math.PI / 180, turn = plan.ModelTurnSigmaDeg * Math.PI / 180;
        return new(tilt * dice.Normal(), tilt * dice.Normal(), turn * dice.Normal());
    }

    /// <summary>Moves all places in turn about an origin: about z, then y, then x.</summary>
    public void Apply(double[] x, double[] y, double[] z, Vec3 origin)
    {
        if (this == default) return;
        (double cz, double sz) = (Math.Cos(Turn), Math.Sin(Turn));
        (double cy, double sy) = (Math.Cos(TiltY), Math.Sin(TiltY));
        (double cx, double sx) = (Math.Cos(TiltX), Math.Sin(TiltX));
        for (int i = 0; i < x.Length; i++)
        {
            (double a, double b, double c) = (x[i] - origin.X, y[i] - origin.Y, z[i] - origin.Z);
            (a, b) = ((cz * a) - (sz * b), (sz * a) + (cz * b));
            (a, c) = ((cy * a) + (sy * c), (cy * c) - (sy * a));
            (b, c) = ((cx * b) - (sx * c), (sx * b) + (cx * c));
            (x[i], y[i], z[i]) = (a + origin.X, b + origin.Y, c + origin.Z);
        }
    }
}
