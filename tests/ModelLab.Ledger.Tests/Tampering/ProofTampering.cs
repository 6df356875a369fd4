using ModelLab.Ledger.Merkle;
using ModelLab.Ledger.Tests.Merkle;

namespace ModelLab.Ledger.Tests.Tampering;

/// <summary>Proofs of all leaves and sizes up to 16, altered in every node, number and length.</summary>
internal static class ProofTampering
{
    public static Tally Inclusion()
    {
        var tally = new Tally("inclusion proofs");
        for (var size = 1; size < TestLeaves.Largest; size++)
        {
            for (var index = 0; index < size; index++)
            {
                var proof = InclusionProof.Make(TestLeaves.Hashes[..size], index);
                var leaf = TestLeaves.Hashes[index];
                var root = TestLeaves.Root(size);
                var name = $"leaf {index} of {size}";
                tally.MustPass(proof.Verify(leaf, root), name);

                foreach (var (path, how) in AlteredPaths(proof.Path))
                {
                    tally.MustBeFound(!(proof with { Path = path }).Verify(leaf, root), $"{name}, {how}");
                }

                for (var place = 0; place < 32; place++)
                {
                    tally.MustBeFound(!proof.Verify(TestLeaves.Flip(leaf, place), root), $"{name}, leaf byte {place}");
                    tally.MustBeFound(!proof.Verify(leaf, TestLeaves.Flip(root, place)), $"{name}, root byte {place}");
                }

                for (var otherSize = 0; otherSize < TestLeaves.Largest; otherSize++)
                {
                    for (var otherIndex = -1; otherIndex <= otherSize; otherIndex++)
                    {
                        if (otherSize != size || otherIndex != index)
                        {
                            var claimed = proof with { LeafIndex = otherIndex, TreeSize = otherSize };
                            tally.MustBeFound(!claimed.Verify(leaf, TestLeaves.Root(otherSize)), $"{name}, claimed as leaf {otherIndex} of {otherSize}");
                        }
                    }
                }
            }
        }

        return tally;
    }

    public static Tally Consistency()
    {
        var tally = new Tally("consistency proofs");
        for (var second = 1; second < TestLeaves.Largest; second++)
        {
            for (var first = 1; first <= second; first++)
            {
                var proof = ConsistencyProof.Make(TestLeaves.Hashes[..second], first);
                var firstRoot = TestLeaves.Root(first);
                var secondRoot = TestLeaves.Root(second);
                var name = $"{first} to {second}";
                tally.MustPass(proof.Verify(firstRoot, secondRoot), name);

                foreach (var (path, how) in AlteredPaths(proof.Path))
                {
                    tally.MustBeFound(!(proof with { Path = path }).Verify(firstRoot, secondRoot), $"{name}, {how}");
                }

                for (var place = 0; place < 32; place++)
                {
                    tally.MustBeFound(!proof.Verify(TestLeaves.Flip(firstRoot, place), secondRoot), $"{name}, first root byte {place}");
                    tally.MustBeFound(!proof.Verify(firstRoot, TestLeaves.Flip(secondRoot, place)), $"{name}, second root byte {place}");
                }

                if (first != second)
                {
                    tally.MustBeFound(!proof.Verify(secondRoot, firstRoot), $"{name}, roots exchanged");
                    OtherSizes(proof, tally, name);
                }
            }
        }

        return tally;
    }

    private static void OtherSizes(ConsistencyProof proof, Tally tally, string name)
    {
        for (var second = 0; second < TestLeaves.Largest; second++)
        {
            for (var first = -1; first <= second + 1; first++)
            {
                if (first != proof.FirstSize || second != proof.SecondSize)
                {
                    var claimed = proof with { FirstSize = first, SecondSize = second };
                    var firstRoot = TestLeaves.Root(Math.Clamp(first, 0, TestLeaves.Largest));
                    tally.MustBeFound(!claimed.Verify(firstRoot, TestLeaves.Root(second)), $"{name}, claimed as {first} to {second}");
                }
            }
        }
    }

    private static IEnumerable<(IReadOnlyList<Sha256Hash> Path, string How)> AlteredPaths(IReadOnlyList<Sha256Hash> path)
    {
        for (var node = 0; node < path.Count; node++)
        {
            for (var place = 0; place < 32; place++)
            {
                yield return ([.. path.Take(node), TestLeaves.Flip(path[node], place, place % 8), .. path.Skip(node + 1)], $"node {node} byte {place}");
            }

            yield return ([.. path.Take(node), .. path.Skip(node + 1)], $"node {node} left out");
            yield return ([.. path.Take(node), path[node], .. path.Skip(node)], $"node {node} doubled");
            if (node > 0)
            {
                yield return ([.. path.Take(node - 1), path[node], path[node - 1], .. path.Skip(node + 1)], $"nodes {node - 1} and {node} exchanged");
            }
        }

        yield return ([.. path, Sha256Hash.Zero], "a node appended");
        yield return ([Sha256Hash.Zero, .. path], "a node put first");
        if (path.Count > 0)
        {
            yield return ([], "emptied");
        }
    }
}
