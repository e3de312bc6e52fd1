using Portfolio.Server.Demo.Course;
using Portfolio.Server.Demo.Programmes;
using static Portfolio.Server.Demo.Story.Happenings;

namespace Portfolio.Server.Demo.Story;

/// <summary>What happens in one week.</summary>
/// <param name="Note">A sentence for the revision.</param>
internal sealed record WeekOfStory(string Note, IReadOnlyList<Happening> All);

/// <summary>The half year as a table: what happened in each of the 26 weeks besides ordinary progress.</summary>
internal static class WeeklyStory
{
    // One report in nine does not come in.
    private const double Missing = 0.11;

    private static readonly IReadOnlyList<WeekOfStory> Weeks =
    [
        Week("First weekly report; commitments and budgets as approved."),
        Week("Ferry terminal: the permit authority asks for a second wave study.",
            Slip("ferry-terminal", "A70", 12)),
        Week("Canal bridge: the gas main lies in the west abutment; the risk has occurred.",
            Occurs("canal-bridge", "gas-main")),
        Week("Treatment works: cone tests show softer ground than assumed; ground improvement re-estimated, wider.",
            Reestimate("treatment-works", "B20", "28 40 85"), Reprice("treatment-works", "B20", 1.15)),
        Week("North quay: boulders met from bay 6 on; the risk has occurred.",
            Occurs("quay-wall-north", "boulders")),
        Week("One of two dive teams is lost to another client, back after week 19. Test piles closed the ordnance risk at the quay.",
            Capacity("dive-teams", afterWeek: 6, 1), Returns("dive-teams", afterWeek: 19, 2), Closes("quay-wall-north", "ordnance")),
        Week("Dredging: laboratory classes the silt as polluted; it has to be treated ashore.",
            Resolves("dredging-approach", "silt", "polluted")),
        Week("East dyke: clay fails the specification and the pit is changed; the risk has occurred. A second pit comes too late.",
            Occurs("dyke-east", "clay-quality")),
        Week("Ferry terminal: sheltered waiting area added at the request of the operator.",
            Adds("ferry-terminal", "Z10", """
                G10 | Waiting area: design change        | 15 20 30 | 90    | M10    | ~design
                G20 | Waiting area: structure            | 24 30 46 | 680+3 | ^, D20 | ~materials
                G30 | Waiting area: glazing and services | 20 28 42 | 520   | ^      | ~labour
                """)),
        Week("North quay: anchor tests passed, the wall is held by ground anchors; their estimate is narrower now.",
            Resolves("quay-wall-north", "anchorage", "ground-anchors"), Reestimate("quay-wall-north", "C40", "30 36 48")),
        Week("Storm barrier: cracks found in the pivots of gate 1; the risk has occurred. Sewage main: a rescue shaft is approved.",
            Occurs("storm-barrier", "cracks"), Takes("sewage-main", "tbm-stuck", "rescue-shaft")),
        Week("Sewage main: borings allow one drive under the river. Treatment works: pilot plant approved against tighter limits.",
            Resolves("sewage-main", "crossing", "one-drive"), Takes("treatment-works", "limits", "pilot")),
        Week("The dive team is back six weeks early.",
            Returns("dive-teams", afterWeek: 13, 2)),
        Week("Weir and lock: the old piles cannot be reused and have to be replaced; new commitment.",
            Resolves("weir-lock", "old-piles", "replace"), Rebaselines("weir-lock", weeks: 24, budget: 2_200_000)),
        Week("Dredging: new commitment after the finding on silt.",
            Rebaselines("dredging-approach", weeks: 26, budget: 4_800_000)),
        Week("Fish pass: its control is moved into the weir building, so the turbine waits for that building.",
            Links("fish-pass", "D20", "weir-lock/F20")),
        Week("Storm barrier: the bearings are sound. Treatment works: the blower supplier is in difficulty; risk entered.",
            Resolves("storm-barrier", "bearings", "sound"),
            Identified("treatment-works", RiskRegister.Risk("supplier", "Blower supplier fails", 0.15, ["C50 | 20 40 90 | 200 400 1100"]))),
        Week("The cutter dredger has to be docked for a month; announced for week 21.",
            Capacity("dredging-plant", afterWeek: 20, 0), Returns("dredging-plant", afterWeek: 25, 1),
            Closes("dredging-approach", "dredger-repair")),
        Week("Storm barrier: a second blasting crew shortens the repair of gate 2.",
            Reestimate("storm-barrier", "C80", "38 46 64"), Reprice("storm-barrier", "C80", 1.1)),
        Week("Ferry terminal: a yard with a free berth will build the link span; shorter and narrower.",
            Reestimate("ferry-terminal", "C40", "normal 92 10"), Takes("ferry-terminal", "operator", "early-freeze")),
        Week("Treatment works: phosphorus removal added by the new discharge permit.",
            Adds("treatment-works", "E40", """
                G10 | Phosphorus removal: design       | 20 28 45 | 160    | M10    | ~design
                G20 | Phosphorus removal: tanks        | 30 38 58 | 1400+4 | ^, C30 | ~materials
                G30 | Phosphorus removal: dosing plant | 24 30 48 | 900    | ^      | ~labour
                G40 | Phosphorus removal: loop checks  | 6 10     | 40+2   | ^      | commissioning-engineers*1
                """),
            Rebaselines("treatment-works", weeks: 8, budget: 2_900_000)),
        Week("One commissioning engineer leaves; three remain until a successor is trained.",
            Capacity("commissioning-engineers", afterWeek: 22, 3), Returns("commissioning-engineers", afterWeek: 44, 4)),
        Week("Storm barrier: new commitment after the cracks; refit of gate 1 re-estimated, wider.",
            Rebaselines("storm-barrier", weeks: 26, budget: 3_400_000), Reestimate("storm-barrier", "C60", "8 12 26")),
        Week("Canal bridge: new commitment, it waits for the lock. Gate recesses of the lock re-estimated after a trial, narrower.",
            Rebaselines("canal-bridge", weeks: 45, budget: 400_000),
            Reestimate("weir-lock", "C90", "22 26 34"), Reestimate("weir-lock", "C95", "22 26 34"), Closes("reservoir-hill", "fault-zone")),
        Week("Pumping station: the network operator moves the grid connection; the switchgear waits.",
            Slip("pumping-station-marsh", "D30", 10), Slip("pumping-station-marsh", "D60", 5)),
        Week("A successor for the commissioning engineer is found early. North quay: asphalt works re-estimated, shorter.",
            Returns("commissioning-engineers", afterWeek: 32, 4), Reestimate("quay-wall-north", "F10", "26 34 50")),
    ];

    public static WeekOfStory Of(int week) => Weeks[week - 1];

    /// <summary>Whether a project's report came in that week; all come in the first and the last.</summary>
    public static bool Reports(string project, int week) =>
        week == 1 || week == DemoHistory.Length || Chance.Of($"{project}/{week}/report") >= Missing;

    private static WeekOfStory Week(string note, params Happening[] all) => new(note, all);

    private static Happening Returns(string pool, int afterWeek, double capacity) => Capacity(pool, afterWeek, capacity);
}
