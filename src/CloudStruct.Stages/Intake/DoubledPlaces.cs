using System.Numerics;

namespace CloudStruct.Stages.Intake;

/// <summary>Places at which more than one point may lie, and which of them a stream has met already.</summary>
/// <remarks>Open addressing in 16 bytes a place or less; the lowest bit of a fingerprint is given up for the mark "met".</remarks>
internal sealed class DoubledPlaces
{
    private readonly ulong[] slots;   // 0 free; else the fingerprint without its lowest bit, plus 1 when met
    private readonly int mask;

    /// <summary>A table of fingerprints, none met yet.</summary>
    public DoubledPlaces(IReadOnlyCollection<ulong> prints)
    {
        slots = new ulong[(int)BitOperations.RoundUpToPowerOf2((uint)Math.Max(16, 2 * prints.Count))];
        mask = slots.Length - 1;
        IsEmpty = prints.Count == 0;
        foreach (ulong print in prints) slots[Slot(print)] = Bare(print);
    }

    /// <summary>True when no place is listed.</summary>
    public bool IsEmpty { get; }

    /// <summary>Meets a place: null when it is not listed, true the first time, false from then on.</summary>
    public bool? MeetFirst(ulong print)
    {
        if (IsEmpty) return null;
        ref ulong slot = ref slots[Slot(print)];
        if (slot == 0) return null;
        bool first = (slot & 1) == 0;
        slot |= 1;
        return first;
    }

    private static ulong Bare(ulong print) => (print & ~1UL) == 0 ? 2 : print & ~1UL;

    private int Slot(ulong print)
    {
        ulong bare = Bare(print);
        int slot = (int)(Fingerprint.Mix(bare) & (uint)mask);
        while (slots[slot] != 0 && (slots[slot] & ~1UL) != bare) slot = (slot + 1) & mask;
        return slot;
    }
}
