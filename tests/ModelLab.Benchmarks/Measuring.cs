namespace ModelLab.Benchmarks;

/// <summary>
/// Times workloads and their peers round by round, one after the other, so that a busy machine slows both. CPU time is compared,
/// and the ratio of one round is taken before the median over rounds.
/// </summary>
/// <param name="rounds">Rounds.</param>
/// <param name="peers">The peers, or null where there is no Python.</param>
public sealed class Measuring(int rounds, PeerProcess? peers)
{
    private static readonly TimeSpan LeastBatch = TimeSpan.FromMilliseconds(60);

    // Long enough for the compiler to have made its best code of what is run often.
    private static readonly TimeSpan WarmUp = TimeSpan.FromSeconds(1);

    /// <summary>Times one workload against each of its peers.</summary>
    public IReadOnlyList<Measurement> Measure(Workload workload)
    {
        var runs = Calibrate(workload.Run);
        var present = peers is null ? [] : workload.Peers.Where(peers.Has).ToList();
        var ours = new List<double>();
        var theirs = present.ToDictionary(p => p, _ => new List<double>());
        for (var round = 0; round < (workload.Rounds ?? rounds); round++)
        {
            ours.Add(Batch(workload.Run, runs));
            foreach (var peer in present)
            {
                theirs[peer].Add(peers!.Run(peer));
            }
        }

        return present.Count == 0
            ? [new Measurement(workload.Name, null, Median(ours), null, null)]
            : [.. present.Select(p => new Measurement(workload.Name, p, Median(ours), Median(theirs[p]), Median(theirs[p].Zip(ours, (their, our) => their / our))))];
    }

    // Warms the workload up, and finds how many runs make a batch long enough to be timed.
    private static int Calibrate(Action run)
    {
        var runs = 1;
        for (var begun = Environment.CpuUsage.TotalTime; Environment.CpuUsage.TotalTime - begun < WarmUp;)
        {
            run();
        }

        while (true)
        {
            var spent = Batch(run, runs) * runs;
            if (spent >= LeastBatch.TotalMilliseconds)
            {
                return runs;
            }

            runs = Math.Max(runs * 2, (int)(runs * LeastBatch.TotalMilliseconds / Math.Max(spent, 0.1)));
        }
    }

    private static double Batch(Action run, int runs)
    {
        var before = Environment.CpuUsage.TotalTime;
        for (var i = 0; i < runs; i++)
        {
            run();
        }

        return (Environment.CpuUsage.TotalTime - before).TotalMilliseconds / runs;
    }

    private static double Median(IEnumerable<double> values)
    {
        var sorted = values.Order().ToList();
        return (sorted[sorted.Count / 2] + sorted[(sorted.Count - 1) / 2]) / 2;
    }
}
