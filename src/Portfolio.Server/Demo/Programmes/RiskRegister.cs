using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>
/// The thirty risks of the first week. An impact is written <c>activity | delay in working days | cost in thousands</c>; without an
/// activity it is a cost to the project, <c>=project</c> in the portfolio's own register.
/// </summary>
internal static class RiskRegister
{
    public static readonly IReadOnlyList<RiskEventJson> OfPortfolio =
    [
        Risk("surge", "Storm surge floods open sites", 0.08,
            ["weir-lock/C60 | 10 15 30 | 250", "pumping-station-marsh/C10 | 8 12 25 | 180", "=quay-wall-north | | 300 400 900"],
            Response("flood-plans", "Flood plans, barriers in store", 0, 180, 0.08, ["weir-lock/C60 | 4 6 12 | 80"], "quay-wall-north")),
        Risk("funding-late", "State grant is paid a year late", 0.12, ["=dyke-east | | 250 400 800", "=weir-lock | | 200 300 700"],
            Response("bridging", "Bridging loan is arranged", 1, 60, 0.12, ["=dyke-east | | 80 120 240"], "dyke-east")),
    ];

    /// <summary>The registers of the projects.</summary>
    public static readonly IReadOnlyDictionary<string, RiskEventJson[]> OfProjects = new Dictionary<string, RiskEventJson[]>
    {
        ["weir-lock"] =
        [
            Risk("seepage", "Seepage under the cofferdam", 0.25, ["B50 | 10 20 45 | 200 380 900"],
                Response("grout", "Grout curtain below the toe", 0, 320, 0.06, ["B50 | 4 8 15 | 80 120 250"])),
            Risk("gate-misfit", "Upper gate does not fit the recess", 0.12, ["E10 | 8 15 30 | 120 200 450"],
                Response("laser-survey", "Laser survey before fabrication is released", 1, 45, 0.03, ["E10 | 3 5 10 | 40"])),
            Risk("bomb", "Ordnance under the old chamber", 0.08, ["C40 | 10 20 40 | 150 250 500"]),
        ],
        ["canal-bridge"] =
        [
            Risk("gas-main", "Gas main lies in the abutment", 0.3, ["B20 | 20 35 80 | 180 320 700"],
                Response("trial-pits", "Trial pits along both abutments", 0, 35, 0.12, ["B20 | 8 12 25 | 90"])),
            Risk("listed", "Old bridge is listed as a monument", 0.07, ["B30 | 60 120 200 | 100 200 500"]),
        ],
        ["fish-pass"] =
        [
            Risk("spawning", "Work is stopped in the spawning season", 0.25, ["B30 | 20 40 | 60"],
                Response("calendar", "Excavation planned around the season", 1, 15, 0.05, ["B30 | 10 20 | 30"])),
            Risk("turbine-grant", "Grant for the turbine is higher than expected", 0.3, ["| | -180 -120 -60"]),
        ],
        ["quay-wall-north"] =
        [
            Risk("boulders", "Boulders in the pile line", 0.35, ["C20 | 15 25 50 | 350 600 1400", "C30 | 8 15 30 | 200 350 800"],
                Response("pre-drill", "Pre-drill the pile line", 0, 540, 0.1, ["C20 | 5 8 15 | 120"])),
            Risk("ordnance", "Large ordnance find stops the berth", 0.15, ["B20 | 10 18 40 | 120 250 600"]),
            Risk("anchor-creep", "Anchors creep in the acceptance test", 0.15, ["D30 | 10 20 40 | 200 400 900"],
                Response("extra-tests", "More suitability tests before production", 0, 140, 0.05, ["D30 | 5 10 | 120"])),
        ],
        ["dredging-approach"] =
        [
            Risk("wreck", "Wreck found in the channel", 0.1, ["C20 | 20 40 90 | 400 700 1800"],
                Response("magnetometer", "Magnetometer survey of the whole channel", 1, 85, 0.06, ["C20 | 10 20 45 | 200 400 900"])),
            Risk("dredger-repair", "Dredger needs the dry dock", 0.2, ["C10 | 10 20 40 | 150"]),
            Risk("turbidity", "Turbidity limits stop dredging", 0.2, ["C60 | 8 15 30 | 90"],
                Response("silt-screens", "Silt screens at the intake", 0, 110, 0.07, ["C60 | 4 8 | 60"])),
        ],
        ["ferry-terminal"] =
        [
            Risk("operator", "Ferry operator changes the ship", 0.2, ["C40 | 20 40 80 | 300 600 1500"],
                Response("early-freeze", "Interface frozen by agreement", 0, 90, 0.06, ["C40 | 10 20 | 200"])),
            Risk("protected-birds", "Protected birds nest on the yard", 0.2, ["E10 | 15 30 60 | 40 70 150"]),
        ],
        ["storm-barrier"] =
        [
            Risk("asbestos", "Asbestos in the gate coating", 0.3, ["C50 | 15 25 45 | 300 550 1200"],
                Response("sampling", "Coating sampled on all gates", 1, 40, 0.2, ["C50 | 10 15 30 | 250 400 800"])),
            Risk("cracks", "Cracks in the gate pivots", 0.2, ["C50 | 20 35 80 | 400 800 2200", "C80 | 20 35 80 | 400 800 2200"]),
            Risk("software", "Control software fails the factory test", 0.25, ["E30 | 15 30 60 | 80 150 350"],
                Response("early-tests", "Test rig at the supplier", 0, 160, 0.1, ["E30 | 8 12 25 | 60"])),
            Risk("closure", "Barrier must close during gate work", 0.15, ["C60 | 6 10 20 | 100 180 400"]),
        ],
        ["dyke-east"] =
        [
            Risk("clay-quality", "Clay fails the specification", 0.2, ["C20 | 10 20 40 | 200 350 900"],
                Response("second-pit", "Second clay pit under option", 0, 120, 0.08, ["C20 | 5 10 | 90"])),
            Risk("appeal", "Appeal against the planning approval", 0.15, ["B10 | 40 80 160 | 60 100 300"]),
        ],
        ["pumping-station-marsh"] =
        [
            Risk("heave", "Pit floor heaves", 0.15, ["B30 | 10 20 40 | 250 450 1000"],
                Response("relief-wells", "Relief wells around the pit", 1, 95, 0.04, ["B30 | 5 8 15 | 100"])),
            Risk("pump-test", "Pumps miss the guaranteed flow", 0.15, ["D70 | 15 30 60 | 60 120 300"]),
        ],
        ["reservoir-hill"] =
        [
            Risk("fault-zone", "Fault zone in the rock", 0.2, ["B20 | 10 20 45 | 200 350 900"]),
            Risk("leak", "A cell fails the tightness test", 0.15, ["D20 | 12 20 40 | 60 110 280"]),
        ],
        ["sewage-main"] =
        [
            Risk("tbm-stuck", "Tunnelling machine is stuck", 0.18, ["C50 | 25 45 100 | 600 1100 3000"],
                Response("rescue-shaft", "Rescue shaft prepared half way", 0, 420, 0.18, ["C50 | 10 18 35 | 200 350 700"])),
            Risk("archaeology", "Remains of the old town wall", 0.3, ["B50 | 10 20 50 | 100 180 450"]),
        ],
        ["treatment-works"] =
        [
            Risk("limits", "Discharge limits are tightened again", 0.2, ["E40 | 10 25 60 | 250 600 1800"],
                Response("pilot", "Pilot plant shows the margin", 0, 230, 0.08, ["E40 | 5 10 25 | 150"])),
        ],
    };

    public static RiskEventJson Risk(string id, string name, double probability, string[] impacts, params ResponseJson[] responses) => new()
    {
        Id = id,
        Name = name,
        Probability = probability,
        Impacts = [.. impacts.Select(Impact)],
        Responses = responses.Length == 0 ? null : responses,
    };

    /// <param name="taken">1 when it has been decided.</param>
    /// <param name="cost">Thousands.</param>
    /// <param name="project">Who pays for a response to a risk of the portfolio.</param>
    private static ResponseJson Response(
        string id, string name, int taken, decimal cost, double probability, string[] impacts, string? project = null) => new()
    {
        Id = id,
        Name = name,
        Cost = cost * 1000,
        Probability = probability,
        Impacts = [.. impacts.Select(Impact)],
        Taken = taken == 1 ? true : null,
        Project = project,
    };

    private static ImpactJson Impact(string text)
    {
        var cells = text.Split('|', StringSplitOptions.TrimEntries);
        return new ImpactJson
        {
            Activity = cells[0].Length == 0 || cells[0][0] == '=' ? null : cells[0],
            Project = cells[0].StartsWith('=') ? cells[0][1..] : null,
            Delay = cells[1].Length == 0 ? null : Estimate.Read(cells[1]),
            Cost = cells.Length < 3 || cells[2].Length == 0 ? null : Estimate.Scaled(Estimate.Read(cells[2]), 1000, digits: 0),
        };
    }
}
