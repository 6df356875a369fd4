namespace ModelLab.Benchmarks;

/// <summary>Something that is timed.</summary>
/// <param name="Name">What it is, as the table shows it.</param>
/// <param name="Run">Does it once.</param>
/// <param name="Peers">Names under which the peers do the same; empty where nobody does.</param>
/// <param name="Rounds">Rounds at most; null: as many as asked for.</param>
public sealed record Workload(string Name, Action Run, IReadOnlyList<string> Peers, int? Rounds = null);

/// <summary>What was measured of a workload.</summary>
/// <param name="Name">The workload.</param>
/// <param name="Peer">The peer compared with, or null.</param>
/// <param name="OursMilliseconds">Median CPU time of one run here.</param>
/// <param name="PeerMilliseconds">Median CPU time of one run there.</param>
/// <param name="Ratio">Median over the rounds of peer time by our time in the same round: how many times faster this program is.</param>
public sealed record Measurement(string Name, string? Peer, double OursMilliseconds, double? PeerMilliseconds, double? Ratio);
