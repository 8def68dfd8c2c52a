namespace CloudStruct.Tests.Kit;

/// <summary>A test that asks a program of the machine; where the program is missing the test is skipped and says so.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class ToolFactAttribute : FactAttribute
{
    public ToolFactAttribute(string tool)
    {
        if (!Tool.Has(tool)) Skip = $"{tool} is not installed here: what it would say is not checked";
    }
}
