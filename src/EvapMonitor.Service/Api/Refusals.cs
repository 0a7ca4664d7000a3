using System.Text.Json;
using System.Text.RegularExpressions;
using Microsoft.AspNetCore.Diagnostics;
using Microsoft.AspNetCore.Http.HttpResults;
using Npgsql;

namespace EvapMonitor.Service.Api;

/// <summary>Turns what the framework refuses before a handler sees it into problem details that say what, where and what is allowed.</summary>
internal sealed partial class Refusals : IExceptionHandler
{
    public async ValueTask<bool> TryHandleAsync(HttpContext httpContext, Exception exception, CancellationToken cancellationToken)
    {
        ProblemHttpResult? problem = exception switch
        {
            BadHttpRequestException refused => TypedResults.Problem(
                WordsOf(refused), statusCode: refused.StatusCode, title: refused.StatusCode == StatusCodes.Status400BadRequest ? "Wrong request" : null),
            NpgsqlException => TypedResults.Problem("The database does not answer.", statusCode: StatusCodes.Status503ServiceUnavailable, title: "Not ready"),
            _ => null,
        };
        if (problem is null) return false;
        await problem.ExecuteAsync(httpContext);
        return true;
    }

    private static string WordsOf(BadHttpRequestException refused)
    {
        if (refused.InnerException is JsonException json) return WordsOf(json);
        if (Parameter().Match(refused.Message) is not { Success: true } parameter) return refused.Message;
        string type = parameter.Groups["type"].Value;
        string allowed = type.Contains(nameof(DateTimeOffset), StringComparison.Ordinal) ? "an RFC 3339 time such as 2026-03-01T14:05:00Z"
            : type.Contains("int", StringComparison.Ordinal) ? "a whole number"
            : type.Contains("bool", StringComparison.Ordinal) ? "true or false"
            : "see /openapi/v1.json";
        return $"{parameter.Groups["name"].Value} is '{parameter.Groups["value"].Value}'; allowed: {allowed}.";
    }

    private static string WordsOf(JsonException error)
    {
        string where = error.Path is null or "$" ? "The body" : $"The body's {error.Path.TrimStart('$', '.')}";
        if (error.LineNumber is { } line) where += $", line {line + 1},";
        if (Member().Match(error.Message) is { Success: true } member) return $"{where} has a member '{member.Groups["name"].Value}' that is not known; /openapi/v1.json has those there are.";
        return Conversion().IsMatch(error.Message)
            ? $"{where} is not of the kind that /openapi/v1.json names; a time is RFC 3339 with its offset, such as 2026-03-01T14:05:00Z."
            : $"{where} is not sound JSON.";
    }

    [GeneratedRegex("""^Failed to bind parameter "(?<type>\S+) (?<name>\w+)" from "(?<value>.*)"\.$""", RegexOptions.Singleline)]
    private static partial Regex Parameter();

    [GeneratedRegex("^The JSON property '(?<name>.*)' could not be mapped")]
    private static partial Regex Member();

    [GeneratedRegex("^The JSON value could not be converted")]
    private static partial Regex Conversion();
}
