using Portfolio.Engine.Draws;
using Xunit;

namespace Portfolio.Engine.Tests.Draws;

/// <summary>Pinned: whoever changes one of these numbers changes every result that was ever published.</summary>
public sealed class DrawKeyTests
{
    // Computed with python-xxhash 3.0.0 (xxHash 0.8.1); the draws with it and a Philox written apart in Python.
    [Theory]
    [InlineData("", 0x2D06800538D394C2ul)]
    [InlineData("portfolio", 0xe7bba094d4e32041ul)]
    [InlineData("project/weir-lock/activity/A10/duration", 0x9595c649280f3b3ul)]
    public void Hashes_are_pinned(string key, ulong hash) => Assert.Equal(hash, DrawKey.Hash(key));

    [Fact]
    public void First_draws_of_a_seed_are_pinned()
    {
        var u = new double[4];
        Uniforms.Fill(1, DrawKey.Hash("portfolio"), 0, u);
        Assert.Equal([0.8011971998409755, 0.29118428978892824, 0.08550467950628232, 0.1978091156482475], u);
    }
}
