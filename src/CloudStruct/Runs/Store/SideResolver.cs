using MessagePack;
using MessagePack.Formatters;
using MessagePack.Resolvers;

namespace CloudStruct.Runs.Store;

/// <summary>Records as they are (by property name), with columns of numbers put aside.</summary>
internal sealed class SideResolver(SideArrays side) : IFormatterResolver
{
    /// <inheritdoc/>
    public IMessagePackFormatter<T>? GetFormatter<T>()
    {
        if (typeof(T) == typeof(byte[])) return (IMessagePackFormatter<T>)(object)new Aside<byte>(side);
        if (typeof(T) == typeof(int[])) return (IMessagePackFormatter<T>)(object)new Aside<int>(side);
        if (typeof(T) == typeof(long[])) return (IMessagePackFormatter<T>)(object)new Aside<long>(side);
        if (typeof(T) == typeof(float[])) return (IMessagePackFormatter<T>)(object)new Aside<float>(side);
        if (typeof(T) == typeof(double[])) return (IMessagePackFormatter<T>)(object)new Aside<double>(side);
        return ContractlessStandardResolver.Instance.GetFormatter<T>();
    }

    private sealed class Aside<T>(SideArrays side) : IMessagePackFormatter<T[]?>
    {
        public void Serialize(ref MessagePackWriter writer, T[]? value, MessagePackSerializerOptions options)
        {
            if (value is null) writer.WriteNil();
            else writer.Write(side.Add(value));
        }

        public T[]? Deserialize(ref MessagePackReader reader, MessagePackSerializerOptions options) =>
            reader.TryReadNil() ? null : side.Get<T>(reader.ReadInt32());
    }
}
