using CloudStruct.Records.Stages;
using static System.FormattableString;

namespace CloudStruct.Stages.Intake;

/// <summary>How many bits the colours of each file have, told from their range.</summary>
internal static class TileColour
{
    // 16-bit colour of a real scene goes well beyond this; what stays below was stored with 10 or 12 bits, or is all dark.
    private const int Dim = 1 << 13;

    /// <summary>By how many bits to shift values of a file to get 0-255.</summary>
    /// <remarks>LAS 1.4 R16 wants 16 bits (8-bit sources times 256), many writers store 0-255 as it is: common practice.</remarks>
    public static int ShiftOf(int largest) => largest > 255 ? 8 : 0;

    /// <summary>Whether every file that is kept has colour; says what is odd.</summary>
    public static bool Judge(TileFacts[] tiles, bool[] isCopy, StageContext context)
    {
        TileFacts[] kept = [.. tiles.Where((t, i) => !isCopy[i] && t.Read > 0)];
        foreach (TileFacts t in kept)
        {
            if (t.Header.HasColour && !t.HasColour)
            {
                context.Say(new Remark("intake", $"{t.Header.Name} has colour fields, but all of them are 0: it counts as colourless.", true));
            }
            else if (t.LargestColour is > 255 and < Dim)
            {
                context.Say(new Remark(
                    "intake", Invariant($"{t.Header.Name}: the brightest colour value is {t.LargestColour} of 65535. If it was stored with 10 or 12 bits the cloud is too dark; export it again with 8 or 16 bits."), true));
            }
        }

        int coloured = kept.Count(t => t.HasColour);
        if (coloured == kept.Length) return coloured > 0;
        context.Say(coloured == 0
            ? new Remark("intake", "The clouds have no colour: rocks can be told apart by texture only.", true)
            : new Remark(
                "intake",
                Invariant($"Only {coloured} of {kept.Length} files have colour ({string.Join(", ", kept.Where(t => !t.HasColour).Select(t => t.Header.Name).Take(3))} ... have none), so colour was left aside everywhere."),
                true));
        return false;
    }
}
