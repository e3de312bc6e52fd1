using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>Programme <c>waterways</c>: keeping the river and the canal open.</summary>
internal static class Waterways
{
    public static readonly IReadOnlyList<ProjectPlan> Projects =
    [
        new("weir-lock", "Weir and lock renewal, upper reach", StartWeek: -76, Priority: 10)
        {
            Region = "river", Funding = "state grant", Correlation = 0.3, OverheadPerDay = 7, Size = (1.05, 1.5), Drivers = ["labour"],
            Survey = "Bathymetric and lock structure survey", Permits = "Water act and navigation permits", WorksEnd = "E50, E60, F10, F20",
            Works = """
                B10 | Mobilisation and site compound          | 10 15 25   | 420     | M10      |
                B20 | Diversion of navigation                 | 8 12 20    | 260     | B10      |
                B30 | Cofferdam upstream                      | 25 34 60   | 1900+9  | ^        | @marine ~ground ~weather piling-rig*1
                B40 | Cofferdam downstream                    | 22 30 52   | 1600+9  | ^        | @marine ~ground ~weather piling-rig*1
                B50 | Dewatering and silt removal             | 12 18 35   | 480+6   | ^        | ~ground
                B60 | Survey of the old foundation in the dry | 5 8        | 60      | ^        |
                C10 | Strengthen the old piles                | 12 18 30   | 520     | B60      |
                C20 | Extract the old piles                   | 15 22 40   | 640     | B60      | ~ground
                C30 | Drive new piles                         | 20 28 48   | 1350+8  | ^        | @marine ~ground piling-rig*1
                C40 | Demolition of the old chamber           | triangular 24 34 55 | 900+7   | B50      |
                C50 | Sealing slab under water                | 12 16 28   | 1400+8  | C10, C30, C40 | ~weather dive-teams*1
                C60 | Chamber floor                           | 28 38 58   | 2600+10 | ^        | ~materials
                C70 | Chamber wall, west                      | 38 52 80   | 3100+11 | ^        | ~materials
                C80 | Chamber wall, east                      | 38 52 80   | 3100+11 | ^ SS+15  | ~materials
                C90 | Upper sill and gate recess              | 20 28 42   | 1500+8  | C60      |
                C95 | Lower sill and gate recess              | 20 28 42   | 1500+8  | ^        |
                D10 | Fabrication of upper gate               | lognormal 110 22 | 2400    | M10      | ~materials
                D20 | Fabrication of lower gate               | lognormal 120 25 | 2700    | ^ SS+20  | ~materials
                D30 | Manufacture of hydraulic drives         | 80 100 150 | 1300    | M10      |
                E10 | Installation of upper gate              | 6 8 14     | 420+18  | C70, C90, D10 | ~weather heavy-lift-crane*1
                E20 | Installation of lower gate              | 6 8 14     | 420+18  | C80, C95, D20, ^ | ~weather heavy-lift-crane*1
                E30 | Drives, cables and controls             | 25 35 55   | 780+4   | D30, E20 | ~labour
                E40 | Removal of cofferdams                   | 18 24 40   | 520+7   | E20      | @marine dive-teams*1
                E50 | First filling and leakage tests         | 8 10 18    | 110+2   | E30, ^   | commissioning-engineers*2
                E60 | Banks, fenders and guide walls          | 25 34 50   | 1250    | E40      |
                F10 | Weir flap gates refurbishment           | 45 60 95   | 3300+6  | E10      | ~weather
                F20 | Weir control building                   | 50 65 90   | 1450    | B20      |
                """,
            Forks =
            [
                ProjectPlan.Fork("old-piles", "State of the old piles", ("reuse", 0.65, ["C10"]), ("replace", 0.35, ["C20", "C30"])),
            ],
        },
        new("canal-bridge", "Lifting bridge over the canal", StartWeek: -52, Priority: 40)
        {
            Region = "town", Funding = "own means", Correlation = 0.25, OverheadPerDay = 4, Size = (0.9, 0.8),
            Survey = "Topographic and traffic survey", Permits = "Road and navigation permits", WorksEnd = "E20, E30",
            Works = """
                B10 | Site set-up and temporary footbridge | 14 20 34   | 480    | M10      |
                B20 | Diversion of cables and mains        | 20 30 70   | 640    | ^        | ~utilities
                B30 | Removal of the old bridge            | 8 10 16    | 350+12 | ^        | heavy-lift-crane*1
                C10 | Abutment piles, west                 | 12 16 28   | 720+8  | B30      | ~ground piling-rig*1
                C20 | Abutment piles, east                 | 12 16 28   | 720+8  | ^        | ~ground piling-rig*1
                C30 | Abutment and counterweight pit, west | 35 45 70   | 1500+5 | C10      |
                C40 | Abutment, east                       | 28 36 55   | 1100+5 | C20      |
                D10 | Steel leaf: workshop drawings        | 18 24 36   | 130    | M10      | ~design
                D20 | Steel leaf: fabrication              | 85 105 150 | 3200   | ^        | ~materials
                D30 | Lifting machinery                    | lognormal@10:90 80 135 | 1650   | M10      |
                E10 | Float in and set the leaf            | 4 5 9      | 380+20 | C30, C40, D20, weir-lock/E20 | ~weather heavy-lift-crane*1
                E20 | Machinery, controls and barriers     | 24 32 50   | 720+4  | ^, D30   | ~labour
                E30 | Road surfacing and approaches        | 20 26 40   | 640    | E10      | ~weather
                """,
        },
        new("fish-pass", "Fish pass and residual-flow turbine", StartWeek: -22, Priority: 80)
        {
            Region = "river", Funding = "environment fund", Correlation = 0.2, OverheadPerDay = 2, Size = (0.8, 0.5),
            Survey = "Fish and flow survey", Permits = "Fisheries and water act permits", WorksEnd = "D20, D30",
            Works = """
                B10 | Access track and site set-up      | 8 10 16    | 160   | M10      |
                B20 | Sheet piles for the pass          | 10 14 24   | 420+7 | ^        | ~ground piling-rig*1
                B30 | Excavation                        | 15 20 36   | 380   | ^        | ~ground ~weather
                C10 | Concrete pools 1–8                | 24 30 44   | 620+4 | ^        |
                C20 | Concrete pools 9–16               | 24 30 44   | 620+4 | C10 SS+12 |
                C30 | Boulders and planting             | 10 18      | 140   | C20      | ~weather
                D10 | Turbine manufacture               | percentiles 0:70 50:95 90:130 100:170 | 980   | M10      | ~market
                D20 | Turbine installation              | 12 16 26   | 220+4 | ^, C10   | commissioning-engineers*1
                D30 | Inlet screen and diver inspection | 8 10 16    | 150+3 | C20      | dive-teams*1
                """,
        },
    ];
}
