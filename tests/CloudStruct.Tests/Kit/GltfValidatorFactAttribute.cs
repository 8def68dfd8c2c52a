namespace CloudStruct.Tests.Kit;

/// <summary>A test that asks the Khronos glTF validator; skipped with the reason where it cannot be had.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class GltfValidatorFactAttribute : FactAttribute
{
    public GltfValidatorFactAttribute()
    {
        if (GltfValidator.Missing.Length > 0) Skip = GltfValidator.Missing;
    }
}
