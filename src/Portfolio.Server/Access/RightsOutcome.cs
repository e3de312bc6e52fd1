using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.Authorization.Policy;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Access;

/// <summary>Answers a stranger with 404, as if the portfolio did not exist; everything else as usual.</summary>
internal sealed class RightsOutcome : IAuthorizationMiddlewareResultHandler
{
    private readonly AuthorizationMiddlewareResultHandler usual = new();

    public Task HandleAsync(RequestDelegate next, HttpContext context, AuthorizationPolicy policy, PolicyAuthorizationResult result) =>
        result.AuthorizationFailure?.FailureReasons.Any(reason => reason.Message == RightHandler.Stranger) == true
            ? Problem.NotFound().ExecuteAsync(context)
            : usual.HandleAsync(next, context, policy, result);
}
