using System.Security.Cryptography;
using CloudStruct.Formats.Laz;

namespace CloudStruct.Tests.Formats.Laz;

/// <summary>The parts of the encoder against streams that the reference encoder's classes wrote, to the byte.</summary>
public class LazEncoderPartsTests
{
    [Fact]
    public void A_stream_with_nothing_in_it() => Same("01 00 00 00", _ => { });

    [Fact]
    public void Bits_by_one_model() => Same("87b7172b11ab23725684fdf9b6ac2bd09a14fc000000", stream =>
    {
        var model = new BitModel();
        for (int i = 0; i < 200; i++) stream.Bit(model, i % 5 == 0 ? 1 : 0);
    });

    // 20,000 symbols of a congruential generator, small ones more often.
    [Theory]
    [InlineData(5, 5196, "cd1b12aee179df305e687888a2664b5fd0c6bdb83542d1beab53a6b57862058a")]
    [InlineData(16, 9168, "25674235423d9e0cb2a36c4d1a632f44e8d2c11d79ad929b61918846001238df")]
    [InlineData(17, 9379, "2e2c1e490b80f4bbda36da45a5556fc18f33043a1d7bbf9d1c0412493c538ed9")]
    [InlineData(33, 11698, "486cd830847dd8f5bc301dd781b9df85952e62a39664d7e0e3d83785cb8cb4f4")]
    [InlineData(256, 19040, "818c2fd5d156860faf8c669e75278299882ca57505316c0a392f151188faf5b1")]
    [InlineData(516, 21610, "444edc21c7bea4b166de5c18ea6971c7b54ec9f8676d0957e330467996ba9123")]
    public void Symbols_of_alphabets_of_all_sizes(int symbols, int length, string sha)
    {
        var stream = new ArithmeticEncoder();
        var model = new SymbolModel(symbols);
        int[] given = new int[20_000];
        uint x = 12345;
        unchecked
        {
            for (int i = 0; i < given.Length; i++)
            {
                x = (x * 1664525) + 1013904223;
                uint r = x >> 16;
                given[i] = (int)((((r * r) >> 16) * (uint)symbols) >> 16);
                stream.Symbol(model, given[i]);
            }
        }

        stream.Finish();
        Assert.Equal(length, stream.Bytes.Length);
        Assert.Equal(sha, Convert.ToHexStringLower(SHA256.HashData(stream.Bytes)));
        var decoder = new ArithmeticDecoder(stream.Bytes.ToArray(), 0, length);
        model = new SymbolModel(symbols);
        foreach (int s in given) Assert.Equal(s, decoder.Symbol(model));
        Assert.Equal(length, decoder.At);
    }

    [Fact]
    public void Raw_bits_of_all_lengths() => Same("a4 68 80 33 10 cd 7d 51 ff e1 00 00 00", stream =>
    {
        stream.Raw(5, 3);
        stream.Raw(0x12345, 20);
        stream.Raw(0xDEADBEEF, 32);
        stream.Raw(1, 1);
        stream.Raw(0x7FFFF, 19);
    });

    [Fact]
    public void Integers_of_32_bits() => Same("00 0f 79 13 ec f0 fb 61 8c 50 0d 7b 9a 44 90 59 42 e5 c8 70 e8 8b 73 68 52 6b ff 66 ae 00 01 00 00 00", stream =>
    {
        (int Predicted, int Real, int Bits)[] pairs =
        [
            (0, 0, 0), (0, 1, 0), (0, -1, 1), (0, 2, 1), (0, -2, 2), (0, 3, 2), (10, 265, 8), (0, -256, 9), (0, 257, 9), (0, 65536, 16), (7, -100000, 17),
            (5, int.MinValue, 31), (0, int.MaxValue, 31), (int.MaxValue, int.MinValue, 0), (0, int.MinValue, 32), (-1, 1073741824, 31),
        ];
        var coder = new IntegerCoder(32, 2);
        for (int i = 0; i < pairs.Length; i++)
        {
            coder.Encode(stream, pairs[i].Predicted, pairs[i].Real, i & 1);
            Assert.Equal(pairs[i].Bits, coder.LastBits);
        }
    });

    [Fact]
    public void Integers_of_16_bits_wrap() => Same("0f 79 60 60 31 c8 0d 0b 6d f4 44 2a 6b 00 00 00", stream =>
    {
        (int, int, int)[] pairs = [(0, 65535, 1), (65535, 0, 0), (100, 40000, 15), (0, 32768, 16), (32768, 0, 16), (1000, 1300, 9), (1000, 700, 9), (0, 1, 0)];
        var coder = new IntegerCoder(16, 1);
        foreach ((int predicted, int real, int bits) in pairs)
        {
            coder.Encode(stream, predicted, real, 0);
            Assert.Equal(bits, coder.LastBits);
        }
    });

    [Theory]
    [InlineData(true, "2a e6 c5 9d 91 18 1e 2f 75 a7 73 de 31 9c be 7f 00 00 00 78 ca 61 67 8c 3c 19 ea de d2 c0 37 81 92 43 40 27 15 3c 00 00 01 5e 8d 92 91 41 71 00 20 00 20 31 0e d4 00 00 01 00 00 00")]
    [InlineData(false, "4e 6a 37 bd 89 14 2e 27 b6 00 4b a7 5c 70 c1 cc 00 00 01 12 5b b0 cc 82 c0 21 9c 73 fa 1c 2a 2c 21 24 bf 09 0a 55 6c 00 01 0b 72 08 6a 9b 67 54 a0 00 1a 04 1a e0 70 00 01 00 00 00")]
    public void Times_in_several_sequences(bool layered, string hex) => Same(hex, stream =>
    {
        double[] times = [1000.00001, 1000.00002, 1000.00003, 1000.00013, 5e6, 5e6 + 1e-5, 1000.00014, 1000.00013, 1000.0001, 5e6 + 2e-5, -7.5, 1000.00016, 1001.0, 1002.0];
        var sequences = new TimeSequences(layered);
        sequences.Start(BitConverter.DoubleToInt64Bits(1000.0));
        foreach (double t in times) sequences.Put(stream, BitConverter.DoubleToInt64Bits(t));
    });

    [Fact]
    public void Tables_of_chunks_of_differing_and_of_equal_size()
    {
        Assert.Equal(
            Hex("00 00 00 00 05 00 00 00 4a 58 f6 aa 26 e7 de 7f a3 7e 71 81 a2 95 19 5b 06 63 13 00 00 00"),
            ChunkTable.Bytes([(300, 5000), (1, 60), (2, 75), (900, 14000), (333, 5200)], true));
        Assert.Equal(Hex("00 00 00 00 03 00 00 00 9a c9 3a de b6 18 07 e1 3c 00 00 00"), ChunkTable.Bytes([(50000, 500000), (50000, 498000), (7, 120)], false));
        Assert.Equal(new byte[8], ChunkTable.Bytes([], false));
    }

    [Fact]
    public void One_chunk_of_point_format_3()
    {
        byte[] records = Hex(
            "e8 03 00 00 d0 07 00 00 2c 01 00 00 32 00 09 02 fd 07 0b 00 00 00 00 00 00 20 59 40 10 10 20 20 30 30"
            + "f2 03 00 00 c6 07 00 00 36 01 00 00 34 00 09 02 fd 07 0b 00 00 00 00 00 00 20 59 40 11 11 21 21 31 31"
            + "01 04 00 00 c1 07 00 00 31 01 00 00 28 00 11 01 fe 07 0b 00 12 6b f1 29 00 20 59 40 40 40 40 40 40 40"
            + "00 04 00 00 c1 07 00 00 64 00 00 00 0c 00 12 05 fe 08 0c 00 12 6b f1 29 00 20 59 40 40 00 00 ff 34 12"
            + "fb ff ff ff 70 11 01 00 64 00 00 00 0c 00 52 05 09 08 0c 00 00 00 00 00 00 00 1d c0 40 00 00 ff 34 12");
        byte[] stream = Hex(
            "41 99 32 69 ac c9 dd 81 35 75 ac 80 00 44 ad 96 37 2e 1a f8 72 90 2f b6 33 ae 02 e7 c2 e2 9c 32"
            + "15 76 c0 d3 98 54 fc b7 bd 17 ed 04 3d cd df 04 5e dc 19 e4 a2 1d 82 ff 0b 63 e4 ca 90 00 00 39 19 00 00 00");
        LazLayout layout = LazLayout.For(3, 34);
        byte[] chunk = LazChunkBytes.Of(layout, records);
        Assert.Equal([.. records[..34], .. stream], chunk);
        Assert.Equal(Hex("00 00 00 00 01 00 00 00 3c 6b 00 00 00"), ChunkTable.Bytes([(5, chunk.Length)], false));
        Assert.Equal(
            Hex("02 00 00 00 03 04 03 00 00 00 00 00 50 c3 00 00 ff ff ff ff ff ff ff ff ff ff ff ff ff ff ff ff 03 00 06 00 14 00 02 00 07 00 08 00 02 00 08 00 06 00 02 00"),
            layout.Write());
    }

    // Scanner channels 0 1 2 1 1 0 and one extra byte; versions 3 and 4 differ in the two layers that follow the channel.
    [Theory]
    [InlineData(3, "aa 01 aa 80 54 61 0a 85 f1 62 89 47 ce b8 32 87 ff f8 00 00 00", "01 03 f6 79 00 83 00 00 00")]
    [InlineData(4, "aa 01 aa 80 54 61 8b 4d 69 a2 3b 07 3c 32 87 ff f8 00 00 00", "01 03 f8 7f ff 80 00 00 00")]
    public void One_chunk_of_point_format_7(int version, string colour, string extra)
    {
        byte[] records = Hex(
            "e8 03 00 00 d0 07 00 00 2c 01 00 00 32 00 11 00 02 07 0c fe 0b 00 00 00 00 00 00 20 59 40 0a 00 14 00 1e 00 05"
            + "f2 03 00 00 c6 07 00 00 36 01 00 00 34 00 31 10 02 07 0c fe 0b 00 00 00 00 00 00 20 59 40 0b 00 15 00 1f 00 06"
            + "01 04 00 00 c1 07 00 00 31 01 00 00 28 00 33 21 01 07 70 fe 0b 00 12 6b f1 29 00 20 59 40 28 00 28 00 28 00 09"
            + "00 04 00 00 c1 07 00 00 64 00 00 00 0c 00 32 10 28 09 70 fe 0c 00 12 6b f1 29 00 20 59 40 29 00 27 00 28 00 ff"
            + "fc 03 00 00 bc 07 00 00 5a 00 00 00 0d 00 11 d5 28 09 70 fe 0b 00 00 00 00 00 00 00 08 c0 09 00 27 00 28 00 00"
            + "06 04 00 00 b2 07 00 00 50 00 00 00 0d 00 11 00 28 07 70 fe 0b 00 00 00 00 00 00 40 59 40 09 00 27 00 2c 01 01");
        byte[][] layers =
        [
            Hex("88 21 2d 24 de 82 e9 3b 39 6f 7b 54 78 84 7e 81 c2 a9 00 00 00"), Hex("23 6f 1e 2e ae 88 4c 7d 00 00 00"), Hex("02 01 27 27 93 ec 00 00 00"),
            Hex("00 10 32 fa 00 00 00"), Hex("18 73 49 0f 2d 13 00 00 00"), Hex("75 1b 8f 9f 52 00 00 00"), Hex("07 07 05 85 82 7c 00 00 00"), Hex("07 f9 00 00 00"),
            Hex("2f 8d af 01 8e 1a ed 6e 20 12 fd fd 9e 4a e0 0f b8 00 00 55 29 ff a1 28 00 01 00 00 00"), Hex(colour), Hex(extra),
        ];
        LazLayout layout = LazLayout.For(7, 37, 0);
        layout = layout with { Items = [.. layout.Items.Select(i => i with { Version = version })] };
        byte[] expected = [.. records[..37], 6, 0, 0, 0, .. layers.SelectMany(l => BitConverter.GetBytes(l.Length)), .. layers.SelectMany(l => l)];
        byte[] chunk = LazChunkBytes.Of(layout, records);
        Assert.Equal(expected, chunk);
        Assert.Equal(Hex(version == 3 ? "00 00 00 00 01 00 00 00 1c 5f 93 00 00 00" : "00 00 00 00 01 00 00 00 1c 5f 8c 00 00 00"), ChunkTable.Bytes([(6, chunk.Length)], true));
    }

    [Fact]
    public void Formats_with_wave_packets_are_refused()
    {
        foreach (int format in new[] { 4, 5, 9, 10 }) Assert.Throws<ArgumentException>(() => LazLayout.For(format, 80));
        Assert.Throws<ArgumentException>(() => LazLayout.For(7, 35));
    }

    private static void Same(string hex, Action<ArithmeticEncoder> write)
    {
        var stream = new ArithmeticEncoder();
        write(stream);
        stream.Finish();
        Assert.Equal(Hex(hex), stream.Bytes.ToArray());
    }

    private static byte[] Hex(string hex) => Convert.FromHexString(hex.Replace(" ", "", StringComparison.Ordinal));
}
