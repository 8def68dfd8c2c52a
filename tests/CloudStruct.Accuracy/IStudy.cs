namespace CloudStruct.Accuracy;

/// <summary>One deep study: simulated outcrops through some stages, scored against their truth, a table printed.</summary>
public interface IStudy
{
    /// <summary>Runs and prints.</summary>
    void Run(StudyOptions options);
}
