namespace CloudStruct.Stages.Thin;

/// <summary>What is known of a voxel.</summary>
internal struct Voxel
{
    public long Key;
    public long First;   // number of the point in the stream that opened it
    public float X, Y, Z;
    public int Count;
    public uint Red, Green, Blue;
    public byte Class;
    private float sumX, sumY, sumZ, heldX, heldY, heldZ;
    private int votes;

    /// <summary>Takes a point by its offset in the voxel, and holds it when it lies nearer to the mean than the one held.</summary>
    public void Take(float dx, float dy, float dz, float x, float y, float z)
    {
        Count++;
        sumX += dx;
        sumY += dy;
        sumZ += dz;
        float mx = sumX / Count, my = sumY / Count, mz = sumZ / Count;
        if (Count > 1 && Square(dx - mx, dy - my, dz - mz) >= Square(heldX - mx, heldY - my, heldZ - mz)) return;
        (heldX, heldY, heldZ) = (dx, dy, dz);
        (X, Y, Z) = (x, y, z);
    }

    /// <summary>Majority vote in one pass (Boyer and Moore 1981): right whenever one class has more than half.</summary>
    public void Vote(byte cls)
    {
        if (votes == 0) Class = cls;
        votes += Class == cls ? 1 : -1;
    }

    private static float Square(float a, float b, float c) => (a * a) + (b * b) + (c * c);
}
