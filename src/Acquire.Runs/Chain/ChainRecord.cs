using System.Buffers;
using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using Acquire.Runs.Records;

namespace Acquire.Runs.Chain;

/// <summary>The bytes of one record as the hash chain sees them. Never changes for a given <c>user_version</c>.</summary>
/// <remarks>
/// reading: 'r', channel int32, t_us int64, value as the 8 bytes of the double (one NaN for all), quality int32, raw text;
/// event: 'e', t_us int64, severity int32, then kind, source, text, data as texts; point: 'p' and its columns as one text.
/// Integers little-endian; a text is its UTF-8 length as int32 (-1 for null) and its bytes.
/// </remarks>
internal static class ChainRecord
{
    private static readonly long OneNaN = BitConverter.DoubleToInt64Bits(double.NaN);

    public static void Add(ArrayBufferWriter<byte> to, in Reading reading)
    {
        var span = to.GetSpan(25);
        span[0] = (byte)'r';
        BinaryPrimitives.WriteInt32LittleEndian(span[1..], reading.Channel);
        BinaryPrimitives.WriteInt64LittleEndian(span[5..], reading.TimeUs);
        BinaryPrimitives.WriteInt64LittleEndian(span[13..], double.IsNaN(reading.Value) ? OneNaN : BitConverter.DoubleToInt64Bits(reading.Value));
        BinaryPrimitives.WriteInt32LittleEndian(span[21..], (int)reading.Quality);
        to.Advance(25);
        AddText(to, reading.Raw);
    }

    public static void Add(ArrayBufferWriter<byte> to, RunEvent record)
    {
        var span = to.GetSpan(13);
        span[0] = (byte)'e';
        BinaryPrimitives.WriteInt64LittleEndian(span[1..], record.TimeUs);
        BinaryPrimitives.WriteInt32LittleEndian(span[9..], (int)record.Severity);
        to.Advance(13);
        AddText(to, record.Kind);
        AddText(to, record.Source);
        AddText(to, record.Text);
        AddText(to, record.DataJson);
    }

    public static void Add(ArrayBufferWriter<byte> to, PointRecord point)
    {
        to.GetSpan(1)[0] = (byte)'p';
        to.Advance(1);
        AddText(to, string.Create(CultureInfo.InvariantCulture,
            $"{point.Index}|{point.Step}|{point.Leg}|{point.Direction}|{(int)point.Light}|{point.StartUs}|{point.EndUs}|{point.SetPointK:R}|{point.StageK:R}|{point.SampleK:R}|{point.SampleUncertaintyK:R}|{point.BiasV:R}|{point.CurrentPlusA:R}|{point.CurrentMinusA:R}|{point.ConductanceS:R}|{point.ConductanceUncertaintyS:R}|{point.HalfSumA:R}|{point.RangeA:R}|{point.Readings}|{point.SoakS:R}|{point.SignalSettleS:R}|{point.WavelengthM:R}|{point.IrradianceWPerM2:R}|{point.MonitorA:R}|{point.SinceLightS:R}|{(int)point.Quality}"));
        AddText(to, point.Reason);
        AddText(to, point.GatesJson);
    }

    private static void AddText(ArrayBufferWriter<byte> to, string? text)
    {
        if (text is null)
        {
            BinaryPrimitives.WriteInt32LittleEndian(to.GetSpan(4), -1);
            to.Advance(4);
            return;
        }

        var length = Encoding.UTF8.GetByteCount(text);
        var span = to.GetSpan(4 + length);
        BinaryPrimitives.WriteInt32LittleEndian(span, length);
        Encoding.UTF8.GetBytes(text, span[4..]);
        to.Advance(4 + length);
    }
}
