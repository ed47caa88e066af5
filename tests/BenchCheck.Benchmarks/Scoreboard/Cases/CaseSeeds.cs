namespace BenchCheck.Benchmarks.Scoreboard.Cases;

/// <summary>The seed of each case from that of the whole run, so that a single case can be made again.</summary>
public static class CaseSeeds
{
    /// <summary>A positive number, well mixed (finaliser of Steele, Lea and Flood, "Fast splittable pseudorandom number generators", 2014).</summary>
    public static int Of(int seed, int number)
    {
        var z = ((ulong)(uint)seed << 32 | (uint)number) + 0x9E3779B97F4A7C15UL;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
        return (int)((z ^ (z >> 31)) >> 33);
    }
}
