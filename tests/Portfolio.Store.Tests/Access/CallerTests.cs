using Portfolio.Store.Access;

namespace Portfolio.Store.Tests.Access;

public sealed class CallerTests
{
    // Asked right, held right, does the one include the other? Contract, "Keys".
    [Theory]
    [InlineData(Right.Read, Right.Read, true)]
    [InlineData(Right.Read, Right.Submit, false)]
    [InlineData(Right.Read, Right.Manage, true)]
    [InlineData(Right.Read, Right.Finance, false)]
    [InlineData(Right.Submit, Right.Read, false)]
    [InlineData(Right.Submit, Right.Manage, true)]
    [InlineData(Right.Manage, Right.Submit, false)]
    [InlineData(Right.Manage, Right.Admin, true)]
    [InlineData(Right.Finance, Right.Manage, false)]
    [InlineData(Right.Finance, Right.Admin, true)]
    [InlineData(Right.Admin, Right.Manage, false)]
    public void Rights_include_lesser_ones(Right asked, Right held, bool expected) =>
        Assert.Equal(expected, new Caller("k", "k", [new Grant(held, "works")]).Holds(asked, "works"));

    [Fact]
    public void A_grant_on_projects_reaches_these_and_no_totals()
    {
        var caller = new Caller("k", "k", [new Grant(Right.Read, "works", ["lock"])]);
        Assert.True(caller.Knows("works"));
        Assert.True(caller.Holds(Right.Read, "works", "lock"));
        Assert.False(caller.Holds(Right.Read, "works", "LOCK"));
        Assert.False(caller.Holds(Right.Read, "works"));
        Assert.True(caller.HoldsSomewhere(Right.Read, "works"));
        Assert.False(caller.Knows("harbour"));
    }
}
