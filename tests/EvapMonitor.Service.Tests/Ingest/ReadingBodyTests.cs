using System.Text;
using EvapMonitor.Service.Api;

namespace EvapMonitor.Service.Tests.Ingest;

public class ReadingBodyTests
{
    [Theory]
    [InlineData("""{"r\ud800eadings":[{"signal":"A","at":"2026-03-01T14:05:00Z","value":1}]}""", "The body holds text that is not valid Unicode.")]
    [InlineData("""{"readings":[{"sig\ud800nal":"A","at":"2026-03-01T14:05:00Z","value":1}]}""", "Nothing was stored. readings[0]: text that is not valid Unicode.")]
    [InlineData("""{"readings":[]}""", "readings has 0 items; allowed: 1 to 50000.")]
    public void WrongBody_IsToldAndNothingIsTaken(string body, string told)
    {
        Assert.Empty(ReadingBody.Read(Encoding.UTF8.GetBytes(body), out string? wrong));
        Assert.Equal(told, wrong);
    }
}
