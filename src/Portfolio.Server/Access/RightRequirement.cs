using Microsoft.AspNetCore.Authorization;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access;

/// <summary>
/// The rights of which a route needs one on the portfolio in its address, or on some project of it: the store decides about single
/// projects. Where the address names no portfolio: on everything.
/// </summary>
internal sealed record RightRequirement(params Right[] Rights) : IAuthorizationRequirement;

/// <summary>
/// Tells three cases apart: the right is held; the portfolio is known but the right missing (403); nothing is granted on it (404).
/// </summary>
internal sealed class RightHandler : AuthorizationHandler<RightRequirement>
{
    public const string Stranger = "stranger";

    protected override Task HandleRequirementAsync(AuthorizationHandlerContext context, RightRequirement requirement)
    {
        if (context.User.Identity is not CallerIdentity { Caller: var caller } || context.Resource is not HttpContext http)
            return Task.CompletedTask;
        var portfolio = http.GetRouteValue("portfolio") as string;
        if (requirement.Rights.Any(right => portfolio is null
            ? caller.Holds(right, Grant.Everywhere)
            : caller.HoldsSomewhere(right, portfolio)))
            context.Succeed(requirement);
        else if (portfolio is not null && !caller.Knows(portfolio))
            context.Fail(new AuthorizationFailureReason(this, Stranger));
        return Task.CompletedTask;
    }
}
