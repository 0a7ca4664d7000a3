using System.Collections.Concurrent;

namespace EvapMonitor.Service.Live;

/// <summary>Something that the operator should know as long as it lasts.</summary>
/// <param name="Key">What it is about; at most one notice stands for a key.</param>
/// <param name="Since">Since when it lasts.</param>
/// <param name="Sentence">What is the matter and what follows from it, for people.</param>
public sealed record Notice(string Key, DateTimeOffset Since, string Sentence);

/// <summary>The notices that stand now. They live as long as the process: what lasts is raised again after a restart.</summary>
public sealed class Notices(TimeProvider clock)
{
    private readonly ConcurrentDictionary<string, Notice> _standing = new(StringComparer.Ordinal);

    /// <summary>The notices, longest standing first.</summary>
    public IReadOnlyList<Notice> Standing => [.. _standing.Values.OrderBy(notice => notice.Since).ThenBy(notice => notice.Key, StringComparer.Ordinal)];

    /// <summary>Raises a notice, or gives one that stands a new sentence.</summary>
    /// <returns>True when it did not stand before.</returns>
    public bool Raise(string key, string sentence)
    {
        bool isNew = true;
        _standing.AddOrUpdate(key, _ => new Notice(key, clock.GetUtcNow(), sentence), (_, standing) =>
        {
            isNew = false;
            return standing.Sentence == sentence ? standing : standing with { Sentence = sentence };
        });
        return isNew;
    }

    /// <summary>Takes a notice back.</summary>
    /// <returns>True when it stood.</returns>
    public bool Clear(string key) => !_standing.IsEmpty && _standing.TryRemove(key, out _);
}
