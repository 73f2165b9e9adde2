namespace Acquire.Bench.Text;

/// <summary>How many letters must change to make one word of another (Levenshtein 1966).</summary>
internal static class EditDistance
{
    public static int Between(string a, string b)
    {
        var row = Enumerable.Range(0, b.Length + 1).ToArray();
        for (var i = 1; i <= a.Length; i++)
        {
            var diagonal = row[0];
            row[0] = i;
            for (var j = 1; j <= b.Length; j++)
            {
                var cost = diagonal + (a[i - 1] == b[j - 1] ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.Min(cost, 1 + Math.Min(row[j - 1], row[j]));
            }
        }

        return row[b.Length];
    }
}
