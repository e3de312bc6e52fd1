using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules;

public sealed class AllFaultsAtOnceTests
{
    [Fact]
    public void Ten_different_mistakes_give_ten_faults()
    {
        var document = new PortfolioDocument(
            Sound.Settings with { Currency = "EURO", Confidence = [80, 80], Pools = [new("rig", null, -1, [])] },
            [
                Sound.WeirLock with { Correlation = 1.5, ChanceBranches = [new("permit", null, [new("granted", 0.7, []), new("refused", 0.2, [])])] },
                Sound.Quay with
                {
                    Activities =
                    [
                        Sound.Work("B10", "pier/P1") with { Duration = new Triangular(9, 5, 20) },
                        Sound.Work("B20", "B30"),
                        Sound.Work("B30", "B20") with { ActualStart = Sound.Status },
                    ],
                },
            ]);
        Assert.Equal(
            [
                (RuleCodes.ActualNotBeforeStatus, "/projects/1/activities/2/actualStart"),
                (RuleCodes.CapacityRange, "/settings/pools/0/capacity"),
                (RuleCodes.ConfidenceRepeated, "/settings/confidence/1"),
                (RuleCodes.CorrelationRange, "/projects/0/correlation"),
                (RuleCodes.CurrencyUnknown, "/settings/currency"),
                (RuleCodes.DistributionOrder, "/projects/1/activities/0/duration"),
                (RuleCodes.LinkCycle, "/projects/1/activities/1/predecessors/0"),
                (RuleCodes.ProbabilitySum, "/projects/0/chanceBranches/0/branches"),
                (RuleCodes.ProjectUnknown, "/projects/1/activities/0/predecessors/0"),
                (RuleCodes.RemainingMissing, "/projects/1/activities/2"),
            ],
            Sound.FaultsOf(document).Select(f => (f.Code, f.Path)).Order());
    }

    [Fact]
    public void What_could_not_be_read_is_not_reported_again()
    {
        var document = Sound.Document with
        {
            Projects =
            [
                Sound.WeirLock with { StatusDate = DateOnly.MinValue },
                Sound.Quay with { Activities = [Sound.Work("B10") with { Duration = Unreadable.Instance, EarliestStart = DateOnly.MinValue }] },
            ],
        };
        Assert.Empty(Sound.FaultsOf(document));
    }

    [Theory]
    [InlineData(0, false)]
    [InlineData(1, true)]
    public void A_portfolio_has_a_finish_when_a_project_has_work(int activities, bool expected)
    {
        var project = new Project { Id = "p", StatusDate = Sound.Status, Activities = [.. Enumerable.Range(0, activities).Select(i => Sound.Work("A" + i))] };
        var valid = ValidPortfolio.Check(new(new() { Name = "Small", Currency = "EUR" }, [project]), out _);
        Assert.Equal(expected, valid!.HasFinish);
    }

    [Fact]
    public void Limits_can_be_set()
    {
        Assert.Null(ValidPortfolio.Check(Sound.Document, new ModelLimits { Activities = 3, Points = 1 }, out var faults));
        Assert.Equal((RuleCodes.LimitExceeded, "/projects/0/activities"), faults.Select(f => (f.Code, f.Path)).Single());
    }
}
