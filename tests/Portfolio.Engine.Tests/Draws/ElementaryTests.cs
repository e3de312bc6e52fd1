using Portfolio.Engine.Draws;
using Xunit;

namespace Portfolio.Engine.Tests.Draws;

public sealed class ElementaryTests
{
    // The C library's functions are right to about one unit in the last place (2.2e-16).
    [Fact]
    public void Exp_agrees_with_the_library()
    {
        for (var x = -700.0; x < 700; x += 0.0917)
            Assert.InRange(Elementary.Exp(x) / Math.Exp(x) - 1, -5e-16, 5e-16);
    }

    [Fact]
    public void Log_agrees_with_the_library()
    {
        for (var x = 1e-300; x < 1e300; x *= 1.0737)
            Assert.InRange(Elementary.Log(x) / Math.Log(x) - 1, -5e-16, 5e-16);
        for (var x = 0.5; x < 2; x += 0.00091)
            Assert.InRange(Elementary.Log(x) / Math.Log(x) - 1, -5e-16, 5e-16);
    }

    [Fact]
    public void Log_of_1_is_0() => Assert.Equal(0, Elementary.Log(1));
}
