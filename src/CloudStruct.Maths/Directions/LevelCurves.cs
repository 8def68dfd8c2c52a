using CloudStruct.Records.Drawings;

namespace CloudStruct.Maths.Directions;

/// <summary>Curves of equal value on a square grid (marching squares), chained into polylines.</summary>
public static class LevelCurves
{
    // Per case (bit 0: corner at column, row is above; bit 1: column + 1, row; bit 2: column + 1, row + 1; bit 3: column,
    // row + 1): the edges that a piece joins. Edges: 0 bottom, 1 right, 2 top, 3 left. The two saddles are settled apart.
    private static readonly int[][] Pieces =
    [
        [], [3, 0], [0, 1], [3, 1], [1, 2], [], [0, 2], [3, 2], [2, 3], [2, 0], [], [2, 1], [1, 3], [1, 0], [0, 3], [],
    ];

    /// <summary>Polylines where the value equals the level, in units of columns (x) and rows (y).</summary>
    /// <param name="values">Row-major, columns a row. NaN leaves its cells empty.</param>
    /// <param name="columns">Nodes in a row, at least 2.</param>
    /// <param name="level">The value; a node that has it exactly counts as above.</param>
    /// <returns>Closed curves repeat their first point; open ones end at the border or beside NaN. In order of their first cell.</returns>
    public static IReadOnlyList<Point2[]> Trace(ReadOnlySpan<double> values, int columns, double level)
    {
        int rows = values.Length / columns;
        var ends = new Dictionary<long, (int First, int Second)>();   // edge to the one or two pieces that meet there
        var pieces = new List<(long From, long To)>();
        for (int row = 0; row + 1 < rows; row++)
        {
            for (int column = 0; column + 1 < columns; column++) AddCell(values, columns, level, column, row, pieces, ends);
        }

        var curves = new List<Point2[]>();
        bool[] used = new bool[pieces.Count];

        // Open curves first, from an end; what is left is closed.
        for (int pass = 0; pass < 2; pass++)
        {
            for (int i = 0; i < pieces.Count; i++)
            {
                if (used[i]) continue;
                bool fromOpen = ends[pieces[i].From].Second < 0, toOpen = ends[pieces[i].To].Second < 0;
                if (pass == 0 && !fromOpen && !toOpen) continue;
                curves.Add(Chain(values, columns, level, pieces, ends, used, i, backward: !fromOpen && toOpen));
            }
        }

        return curves;
    }

    private static void AddCell(
        ReadOnlySpan<double> values, int columns, double level, int column, int row, List<(long From, long To)> pieces, Dictionary<long, (int First, int Second)> ends)
    {
        int at = (row * columns) + column;
        double a = values[at], b = values[at + 1], c = values[at + columns + 1], d = values[at + columns];
        double middle = (a + b + c + d) / 4;
        if (double.IsNaN(middle)) return;
        int kind = (a >= level ? 1 : 0) | (b >= level ? 2 : 0) | (c >= level ? 4 : 0) | (d >= level ? 8 : 0);

        // A saddle: the mean of the corners tells whether its middle joins the high corners or the low ones.
        bool joined = middle >= level;
        int[] edges = kind switch
        {
            5 => joined ? [3, 2, 1, 0] : [3, 0, 1, 2],
            10 => joined ? [0, 3, 2, 1] : [0, 1, 2, 3],
            _ => Pieces[kind],
        };
        for (int i = 0; i < edges.Length; i += 2)
        {
            long from = Edge(edges[i], at, columns), to = Edge(edges[i + 1], at, columns);
            Meet(ends, from, pieces.Count);
            Meet(ends, to, pieces.Count);
            pieces.Add((from, to));
        }
    }

    // Twice the node index for the edge to the next column, plus one for the edge to the next row.
    private static long Edge(int side, int at, int columns) => side switch
    {
        0 => 2L * at,
        1 => (2L * (at + 1)) + 1,
        2 => 2L * (at + columns),
        _ => (2L * at) + 1,
    };

    private static void Meet(Dictionary<long, (int First, int Second)> ends, long edge, int piece) =>
        ends[edge] = ends.TryGetValue(edge, out (int First, int Second) other) ? (other.First, piece) : (piece, -1);

    private static Point2[] Chain(
        ReadOnlySpan<double> values, int columns, double level, List<(long From, long To)> pieces, Dictionary<long, (int First, int Second)> ends, bool[] used, int start, bool backward)
    {
        long edge = backward ? pieces[start].To : pieces[start].From;
        var curve = new List<Point2> { At(values, columns, level, edge) };
        for (int piece = start; piece >= 0 && !used[piece];)
        {
            used[piece] = true;
            edge = pieces[piece].From == edge ? pieces[piece].To : pieces[piece].From;
            curve.Add(At(values, columns, level, edge));
            (int first, int second) = ends[edge];
            piece = first == piece ? second : first;
        }

        return [.. curve];
    }

    private static Point2 At(ReadOnlySpan<double> values, int columns, double level, long edge)
    {
        int node = (int)(edge / 2), next = edge % 2 == 0 ? node + 1 : node + columns;
        double t = (level - values[node]) / (values[next] - values[node]);
        double x = node % columns, y = node / columns;
        return edge % 2 == 0 ? new Point2(x + t, y) : new Point2(x, y + t);
    }
}
