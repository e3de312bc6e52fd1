using Portfolio.Engine.Calendars;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Networks;

/// <summary>
/// The activities and links of a whole portfolio in flat arrays. An activity is its index in document order over all projects. Links
/// stand with their successor: those of activity a are <c>LinkStart[a] … LinkStart[a + 1] − 1</c>. Instants are on the scale of
/// <see cref="Scale"/>, lags minutes. Immutable once built.
/// </summary>
internal sealed class Network
{
    /// <summary>Stands for "no instant" where one is optional.</summary>
    public const int None = int.MinValue;

    public required IReadOnlyList<Project> Projects { get; init; }

    public required Activity[] Activities { get; init; }

    /// <summary>[project] first activity; one entry more than projects.</summary>
    public required int[] ProjectStart { get; init; }

    public required int[] ProjectOf { get; init; }

    /// <summary>The scale of all instants: working time where one calendar serves the whole network, else minutes.</summary>
    public required WorkTime Scale { get; init; }

    public required WorkTime[] Calendar { get; init; }

    /// <summary>[project] the project's own calendar.</summary>
    public required WorkTime[] ProjectCalendar { get; init; }

    /// <summary>[activity] beginning of the status date.</summary>
    public required int[] Status { get; init; }

    /// <summary>[activity] beginning of the earliest start, or <see cref="None"/> (also once started).</summary>
    public required int[] EarliestStart { get; init; }

    /// <summary>[activity] start of finished work, actual start of work under way, else <see cref="None"/>.</summary>
    public required int[] ActualStart { get; init; }

    /// <summary>[activity] end of finished work, else <see cref="None"/>.</summary>
    public required int[] ActualFinish { get; init; }

    public required int[] LinkStart { get; init; }

    public required NetworkLink[] Links { get; init; }

    /// <summary>[activity] fork it belongs to, or −1; see <see cref="Branch"/>.</summary>
    public required int[] Fork { get; init; }

    public required int[] Branch { get; init; }

    /// <summary>
    /// Successors in compressed rows: those of activity a are <c>Successors[SuccessorStart[a] …]</c>, one entry per link.
    /// </summary>
    public required int[] SuccessorStart { get; init; }

    public required int[] Successors { get; init; }

    /// <summary>Activities so that predecessors come first; among those that are free, document order.</summary>
    public required int[] Order { get; init; }

    public int Count => Activities.Length;

    public bool Finished(int activity) => ActualFinish[activity] != None;

    public bool UnderWay(int activity) => ActualStart[activity] != None && ActualFinish[activity] == None;

    public ReadOnlySpan<NetworkLink> LinksOf(int activity) => Links.AsSpan(LinkStart[activity]..LinkStart[activity + 1]);

    /// <summary>[activity] true when its start is read as an instant: by a link, or by overhead on another calendar.</summary>
    public required bool[] StartMatters { get; init; }

    public ReadOnlySpan<int> SuccessorsOf(int activity) => Successors.AsSpan(SuccessorStart[activity]..SuccessorStart[activity + 1]);

    /// <summary>True when work on one of the project's activities has started.</summary>
    public bool Begun(int project)
    {
        for (var a = ProjectStart[project]; a < ProjectStart[project + 1]; a++)
        {
            if (Activities[a].Started)
                return true;
        }
        return false;
    }
}

/// <summary>A link from a predecessor; the lag in minutes on the successor's calendar.</summary>
internal readonly record struct NetworkLink(int Predecessor, LinkType Type, int Lag)
{
    /// <summary>True when the predecessor's finish drives, false when its start does.</summary>
    public bool FromFinish => Type is LinkType.FinishToStart or LinkType.FinishToFinish;

    /// <summary>True when the successor's start is bound, false when its finish is.</summary>
    public bool ToStart => Type is LinkType.FinishToStart or LinkType.StartToStart;
}
