using System.Buffers.Binary;
using System.Collections.Immutable;
using System.Reflection.Metadata;
using System.Reflection.PortableExecutable;
using SkiaSharp;

namespace BenchCheck.Plots.Typefaces;

/// <summary>The faces of the Inter typeface that travel inside this assembly, so that pictures have text on a machine without any font.</summary>
/// <remarks>
/// The typeface comes as the resource <c>!AvaloniaResources</c> of a library that is itself embedded here as <c>Inter</c>; it is read as data,
/// never loaded. In it TrueType faces stand one after another (OpenType specification, "Table Directory": a version of 1.0, the number of
/// tables, then sixteen bytes a table of tag, checksum, offset, length), so each face ends with its last table.
/// </remarks>
internal static class CarriedFaces
{
    public const string Family = "Inter";

    private const string CarrierResource = "Inter";
    private const string FontResource = "!AvaloniaResources";
    private const int DirectoryStart = 12;
    private const int DirectoryEntry = 16;
    private const int MostTables = 64;

    private static readonly Lazy<ImmutableArray<SKTypeface>> Faces = new(Read);

    /// <summary>The face nearest to a weight (400 regular, 700 bold).</summary>
    public static SKTypeface Nearest(int weight) => Faces.Value.MinBy(f => Math.Abs(f.FontStyle.Weight - weight))!;

    /// <exception cref="InvalidOperationException">the carrier holds no face: a fault of the build</exception>
    private static ImmutableArray<SKTypeface> Read()
    {
        var bytes = FontBytes();
        var faces = ImmutableArray.CreateBuilder<SKTypeface>();
        for (var at = 0; at < bytes.Length;)
        {
            var length = FaceLength(bytes.AsSpan(at));
            if (length > 0)
            {
                using var data = SKData.CreateCopy(bytes.AsSpan(at, length));
                if (SKTypeface.FromData(data) is { } face) faces.Add(face);
            }

            at += Math.Max(1, length);
        }

        return faces.Count > 0 ? faces.ToImmutable() : throw new InvalidOperationException($"no face in the embedded resource {CarrierResource}");
    }

    private static byte[] FontBytes()
    {
        using var carrier = typeof(CarriedFaces).Assembly.GetManifestResourceStream(CarrierResource)
            ?? throw new InvalidOperationException($"the assembly lacks its embedded resource {CarrierResource}");
        using var image = new PEReader(carrier);
        var metadata = image.GetMetadataReader();
        var resource = metadata.ManifestResources.Select(metadata.GetManifestResource).First(r => metadata.GetString(r.Name) == FontResource);
        var directory = image.PEHeaders.CorHeader!.ResourcesDirectory.RelativeVirtualAddress;
        var reader = image.GetSectionData(directory).GetReader((int)resource.Offset, sizeof(int));
        return [.. image.GetSectionData(directory).GetContent((int)resource.Offset + sizeof(int), reader.ReadInt32())];
    }

    /// <summary>Length of the face that starts here; zero where none starts.</summary>
    private static int FaceLength(ReadOnlySpan<byte> bytes)
    {
        if (bytes.Length < DirectoryStart || BinaryPrimitives.ReadUInt32BigEndian(bytes) != 0x00010000) return 0;
        var tables = BinaryPrimitives.ReadUInt16BigEndian(bytes[4..]);
        var directory = DirectoryStart + DirectoryEntry * tables;
        if (tables is 0 or > MostTables || bytes.Length < directory) return 0;
        var end = 0L;
        var hasHead = false;
        for (var at = DirectoryStart; at < directory; at += DirectoryEntry)
        {
            hasHead |= bytes.Slice(at, 4).SequenceEqual("head"u8);
            end = Math.Max(end, (long)BinaryPrimitives.ReadUInt32BigEndian(bytes[(at + 8)..]) + BinaryPrimitives.ReadUInt32BigEndian(bytes[(at + 12)..]));
        }

        return hasHead && end <= bytes.Length ? (int)end : 0;
    }
}
