using CloudStruct.Formats.Laz;

namespace CloudStruct.Tests.Formats.Laz;

/// <summary>The parts of the decoder against streams that the reference encoder's classes wrote.</summary>
public class LazPartsTests
{
    [Fact]
    public void Bits_by_one_model()
    {
        ArithmeticDecoder stream = Stream("87b7172b11ab237256 84fdf9b6ac2bd09a14fc000000 00");
        var model = new BitModel();
        for (int i = 0; i < 200; i++) Assert.Equal(i % 5 == 0 ? 1 : 0, stream.Bit(model));
        Assert.Equal(22, stream.At);
    }

    [Fact]
    public void Raw_bits_of_all_lengths()
    {
        ArithmeticDecoder stream = Stream("a4 68 80 33 10 cd 7d 51 ff e1 00 00 00");
        Assert.Equal(5u, stream.Raw(3));
        Assert.Equal(0x12345u, stream.Raw(20));
        Assert.Equal(0xDEADBEEFu, stream.Raw(32));
        Assert.Equal(1u, stream.Raw(1));
        Assert.Equal(0x7FFFFu, stream.Raw(19));
    }

    [Fact]
    public void Integers_of_32_bits()
    {
        ArithmeticDecoder stream = Stream("00 0f 79 13 ec f0 fb 61 8c 50 0d 7b 9a 44 90 59 42 e5 c8 70 e8 8b 73 68 52 6b ff 66 ae 00 01 00 00 00");
        (int Predicted, int Real, int Bits)[] pairs =
        [
            (0, 0, 0), (0, 1, 0), (0, -1, 1), (0, 2, 1), (0, -2, 2), (0, 3, 2), (10, 265, 8), (0, -256, 9), (0, 257, 9), (0, 65536, 16), (7, -100000, 17),
            (5, int.MinValue, 31), (0, int.MaxValue, 31), (int.MaxValue, int.MinValue, 0), (0, int.MinValue, 32), (-1, 1073741824, 31),
        ];
        var decoder = new IntegerCoder(32, 2);
        for (int i = 0; i < pairs.Length; i++)
        {
            Assert.Equal(pairs[i].Real, decoder.Decode(stream, pairs[i].Predicted, i & 1));
            Assert.Equal(pairs[i].Bits, decoder.LastBits);
        }
    }

    [Fact]
    public void Integers_of_16_bits_wrap()
    {
        ArithmeticDecoder stream = Stream("0f 79 60 60 31 c8 0d 0b 6d f4 44 2a 6b 00 00 00");
        var decoder = new IntegerCoder(16, 1);
        (int, int)[] pairs = [(0, 65535), (65535, 0), (100, 40000), (0, 32768), (32768, 0), (1000, 1300), (1000, 700), (0, 1)];
        foreach ((int predicted, int real) in pairs) Assert.Equal(real, decoder.Decode(stream, predicted, 0));
    }

    [Fact]
    public void The_running_median_follows_its_own_rule()
    {
        int[] add = [5, -3, 8, 8, 2, 100, 100, -50, 1, 1, 7, 9, 9, 9, -1], expected = [0, 0, 0, 0, 0, 2, 8, 8, 8, 8, 1, 1, 7, 8, 9, 9];
        var median = default(RunningMedian);
        for (int i = 0; i < add.Length; i++)
        {
            Assert.Equal(expected[i], median.Middle);
            median.Add(add[i]);
        }

        Assert.Equal(expected[^1], median.Middle);
    }

    [Theory]
    [InlineData(true, "2a e6 c5 9d 91 18 1e 2f 75 a7 73 de 31 9c be 7f 00 00 00 78 ca 61 67 8c 3c 19 ea de d2 c0 37 81 92 43 40 27 15 3c 00 00 01 5e 8d 92 91 41 71 00 20 00 20 31 0e d4 00 00 01 00 00 00")]
    [InlineData(false, "4e 6a 37 bd 89 14 2e 27 b6 00 4b a7 5c 70 c1 cc 00 00 01 12 5b b0 cc 82 c0 21 9c 73 fa 1c 2a 2c 21 24 bf 09 0a 55 6c 00 01 0b 72 08 6a 9b 67 54 a0 00 1a 04 1a e0 70 00 01 00 00 00")]
    public void Times_in_several_sequences(bool layered, string hex)
    {
        ArithmeticDecoder stream = Stream(hex);
        double[] times = [1000.00001, 1000.00002, 1000.00003, 1000.00013, 5e6, 5e6 + 1e-5, 1000.00014, 1000.00013, 1000.0001, 5e6 + 2e-5, -7.5, 1000.00016, 1001.0, 1002.0];
        var sequences = new TimeSequences(layered);
        sequences.Start(BitConverter.DoubleToInt64Bits(1000.0));
        foreach (double t in times) Assert.Equal(t, BitConverter.Int64BitsToDouble(sequences.Next(stream)));
    }

    [Fact]
    public void A_stream_that_ends_early_is_damage_and_a_start_that_no_encoder_writes_too()
    {
        Assert.Throws<LazDamageException>(() => Stream("01 00 00"));
        Assert.Throws<LazDamageException>(() => Stream("ff ff ff ff 00"));
        ArithmeticDecoder stream = Stream("87 b7 17 2b");
        Assert.Throws<LazDamageException>(() =>
        {
            for (int i = 0; i < 100; i++) stream.Raw(8);
        });
    }

    [Fact]
    public void Tables_are_those_of_the_format()
    {
        byte[] all = [.. Enumerable.Range(0, 8).SelectMany(n => Enumerable.Range(0, 8).Select(r => (byte)ReturnTables.NarrowMap(n, r)))];
        Assert.Equal(15, all[0]);
        Assert.Equal(64, all.Length);
        for (int n = 0; n < 8; n++) for (int r = 0; r < 8; r++) Assert.Equal(ReturnTables.NarrowMap(n, r), ReturnTables.NarrowMap(r, n));
        Assert.Equal(0, ReturnTables.WideMap(1, 1));
        Assert.Equal(5, ReturnTables.WideMap(15, 15));
    }

    private static ArithmeticDecoder Stream(string hex)
    {
        byte[] bytes = Convert.FromHexString(hex.Replace(" ", "", StringComparison.Ordinal));
        return new ArithmeticDecoder(bytes, 0, bytes.Length);
    }
}
