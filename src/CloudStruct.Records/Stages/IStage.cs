namespace CloudStruct.Records.Stages;

/// <summary>One step of the pipeline: a pure function of its inputs and settings. No file, clock, console or static state.</summary>
/// <typeparam name="TIn">What it takes: a record of Records.</typeparam>
/// <typeparam name="TSettings">Its own settings.</typeparam>
/// <typeparam name="TOut">The record it hands on.</typeparam>
public interface IStage<in TIn, in TSettings, out TOut>
    where TSettings : IStageSettings
{
    /// <summary>The word in recipes and run.json, and the name of the folder: "faces".</summary>
    string Name { get; }

    /// <summary>Computes the record. The same input, settings and seed give the same bytes on any number of threads.</summary>
    TOut Run(TIn input, TSettings settings, StageContext context);
}
