namespace CloudStruct.Records.Stages;

/// <summary>Checked settings of one stage. Property names in snake case are the recipe keys.</summary>
public interface IStageSettings
{
    /// <summary>Yields every fault, not only the first.</summary>
    IEnumerable<SettingComplaint> Check();
}
