using Microsoft.AspNetCore.Http.HttpResults;
using Npgsql;

namespace EvapMonitor.Service.Api;

/// <summary>Liveness: the process answers. Readiness: it can serve results, so the database answers.</summary>
internal static class HealthHandlers
{
    public static Ok Live() => TypedResults.Ok();

    public static async Task<Results<Ok, ProblemHttpResult>> Ready(NpgsqlDataSource database, CancellationToken stop)
    {
        try
        {
            await using NpgsqlCommand command = database.CreateCommand("SELECT 1");
            command.CommandTimeout = 3;
            await command.ExecuteScalarAsync(stop);
            return TypedResults.Ok();
        }
        catch (NpgsqlException)
        {
            return TypedResults.Problem("The database does not answer.", statusCode: StatusCodes.Status503ServiceUnavailable, title: "Not ready");
        }
    }
}
