using CloudStruct.Records.Contacts;
using CloudStruct.Records.Drawings;
using CloudStruct.Records.Frame;
using CloudStruct.Records.Width;

namespace CloudStruct.Stages.Drawings;

/// <summary>Contacts as strips through their traces: down dip where the dip is fixed, a narrow level ribbon where it is not.</summary>
internal static class Strips
{
    // Half the height of a strip in widths of its dike: tall enough to show which way it leans, too low to hide the rock.
    private const double HalfInWidths = 0.25;
    private const double LeastHalfM = 0.15;

    /// <summary>The strips, in the order of contacts; a contact without a trace has none.</summary>
    public static ContactStrip[] Of(Findings input)
    {
        Contact[] contacts = input.Contacts.Contacts;
        var strips = new List<ContactStrip>();
        for (int k = 0; k < contacts.Length; k++)
        {
            Contact c = contacts[k];
            double? width = input.Width.Dikes.FirstOrDefault(d => d.Dike == c.Dike)?.WidthMeanM?.Value;
            double half = Math.Max(LeastHalfM, HalfInWidths * (width ?? 1));
            foreach (MarginTrace trace in input.Contacts.Traces)
            {
                if (trace.Dike != c.Dike || trace.Margin != c.Margin) continue;
                Vec3[] line = [.. trace.Points.Where((_, i) => trace.ChainageM[i] >= c.ChainageFromM && trace.ChainageM[i] <= c.ChainageToM)];
                if (line.Length > 1) strips.Add(One(k, c, line, half));
            }
        }

        return [.. strips];
    }

    private static ContactStrip One(int number, Contact contact, Vec3[] line, double half)
    {
        Vec3[] across = [.. line.Select((_, i) => Across(contact, line, i) * (contact.Normal is null ? LeastHalfM / 2 : half))];
        return new ContactStrip(
            number, contact.Dike, contact.Margin, contact.Normal is null ? Constraint.Line : Constraint.Plane,
            [.. line.Select((p, i) => p + across[i])], [.. line.Select((p, i) => p - across[i])]);
    }

    // Up dip in the plane of the contact; for a line level and square to the trace.
    private static Vec3 Across(Contact contact, Vec3[] line, int i)
    {
        if (contact.Normal is { } n)
        {
            Vec3 strike = n.Cross(Vec3.Up);
            return strike.Length > 1e-6 ? strike.Unit().Cross(n).Unit() : new Vec3(0, 1, 0);
        }

        Vec3 along = line[Math.Min(i + 1, line.Length - 1)] - line[Math.Max(i - 1, 0)], level = along.Cross(Vec3.Up);
        return level.Length > 1e-9 ? level.Unit() : new Vec3(1, 0, 0);
    }
}
