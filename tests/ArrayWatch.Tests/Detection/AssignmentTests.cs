using ArrayWatch.Detection.Hypotheses;

namespace ArrayWatch.Tests.Detection;

public sealed class AssignmentTests
{
    [Fact]
    public void It_finds_what_trying_every_permutation_finds()
    {
        Random random = new(4711);
        for (int trial = 0; trial < 50; trial++)
        {
            int n = 2 + (trial % 5);
            double[,] score = new double[n, n];
            for (int i = 0; i < n; i++)
            {
                for (int j = 0; j < n; j++) score[i, j] = (random.NextDouble() * 20) - 10;
            }

            int[] found = Assignment.Maximise(score);
            Assert.Equal(Enumerable.Range(0, n), found.Order());
            double best = Permutations([.. Enumerable.Range(0, n)], 0).Max(p => p.Select((c, r) => score[r, c]).Sum());
            Assert.Equal(best, found.Select((c, r) => score[r, c]).Sum(), 9);
        }
    }

    private static IEnumerable<int[]> Permutations(int[] items, int from)
    {
        if (from == items.Length) yield return [.. items];
        for (int i = from; i < items.Length; i++)
        {
            (items[from], items[i]) = (items[i], items[from]);
            foreach (int[] p in Permutations(items, from + 1)) yield return p;
            (items[from], items[i]) = (items[i], items[from]);
        }
    }
}
