using CloudStruct.Records.Attitudes;
using CloudStruct.Records.Contacts;
using CloudStruct.Records.Frame;

namespace CloudStruct.Records.Decisions;

/// <summary>One row of decisions.csv in a survey.</summary>
/// <remarks>A face is known again by place and attitude. Its number is kept for people: it can change hands between two runs.</remarks>
public sealed record Decision
{
    /// <summary>Line of the file, for messages.</summary>
    public int Line { get; init; }

    /// <summary>What is to be done.</summary>
    public DecisionAction Action { get; init; }

    /// <summary>What it is about.</summary>
    public DecisionTarget Target { get; init; }

    /// <summary>Number that the face had when it was decided on; 0 when not given.</summary>
    public int FaceId { get; init; }

    /// <summary>Place in map coordinates [m]; null for sets.</summary>
    public Vec3? Place { get; init; }

    /// <summary>Attitude of the face or contact; of the first set, or of the first part of a set; null for a place, or a contact that
    /// is only a line.</summary>
    public Attitude? Attitude { get; init; }

    /// <summary>Attitude of the second set, or of the second part.</summary>
    public Attitude? Other { get; init; }

    /// <summary>North of the azimuths; null: that of the run.</summary>
    public North? North { get; init; }

    /// <summary>The side that the face is on, or the domain of the sets.</summary>
    public FaceDomain Domain { get; init; }

    /// <summary>Name that the set had.</summary>
    public string Set { get; init; } = "";

    /// <summary>Name that the second set had.</summary>
    public string OtherSet { get; init; } = "";

    /// <summary>Number of the dike; 0 when not given.</summary>
    public int Dike { get; init; }

    /// <summary>Side of the dike; null when not given.</summary>
    public Margin? Margin { get; init; }

    /// <summary>Words of the geologist.</summary>
    public string Note { get; init; } = "";

    /// <summary>Who decided; empty when not given.</summary>
    public string By { get; init; } = "";

    /// <summary>Day of the decision, yyyy-MM-dd; empty when not given.</summary>
    public string On { get; init; } = "";

    /// <summary>Degrees from grid to the north of the azimuths, in a run of this frame.</summary>
    public double TurnDeg(SurveyFrame frame) => (North ?? frame.North) == Records.Frame.North.True ? frame.ConvergenceDeg ?? 0 : 0;
}
