using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>Programme <c>flood-protection</c>: barrier, dyke and the pumps behind them.</summary>
internal static class FloodProtection
{
    public static readonly IReadOnlyList<ProjectPlan> Projects =
    [
        new("storm-barrier", "Storm-surge barrier refurbishment", StartWeek: -78, Priority: 1)
        {
            Region = "coast", Funding = "state grant", Correlation = 0.4, OverheadPerDay = 8, Size = (1.05, 1.8), Drivers = ["weather"],
            Survey = "Condition survey of gates and piers", Permits = "Flood protection consent", WorksEnd = "D40, E40, E50, F20",
            Works = """
                B10 | Mobilisation and work platform         | 14 20 34   | 1200   | M10      |
                B20 | Diver inspection of all sills          | 14 18 30   | 260+5  | ^        | @marine dive-teams*1
                B30 | Stop-log sets: fabrication             | 70 90 130  | 2600   | M10      | ~materials
                B40 | Gate bearings: opening and measurement | 8 10 18    | 140    | B20, ^   |
                C10 | Bearings: refurbishment in place       | 30 40 60   | 900    | B40      | ~labour
                C20 | Bearings: new forgings                 | lognormal@10:90 110 190 | 2300   | B40      | ~market
                C30 | Bearings: replacement                  | 24 32 50   | 1100+8 | ^        | heavy-lift-crane*1
                C40 | Gate 1: lift out and blast             | 14 18 30   | 520+14 | B40      | @marine heavy-lift-crane*1
                C50 | Gate 1: steel repair and coating       | 45 58 90   | 2200+6 | ^        | ~materials
                C60 | Gate 1: refit                          | 8 10 18    | 340+14 | ^, C10, C30 | @marine heavy-lift-crane*1 dive-teams*1
                C70 | Gate 2: lift out and blast             | 14 18 30   | 520+14 | C60      | @marine heavy-lift-crane*1
                C80 | Gate 2: steel repair and coating       | 45 58 90   | 2200+6 | ^        | ~materials
                C90 | Gate 2: refit                          | 8 10 18    | 340+14 | ^        | @marine heavy-lift-crane*1 dive-teams*1
                D10 | Hydraulic power packs: manufacture     | 90 115 165 | 3400   | M10      | ~market
                D20 | Cylinder overhaul, set 1               | triangular 30 40 65 | 980    | C50      | ~labour
                D30 | Cylinder overhaul, set 2               | triangular 30 40 65 | 980    | ^, C80   | ~labour
                D40 | Power packs: installation              | 20 26 42   | 560+4  | D10, D20 | ~labour
                E10 | Control system: specification          | 24 32 50   | 280    | M10      | ~design
                E20 | Control system: software               | pert@10:90 60 80 130 | 1700   | ^        | ~design
                E30 | Control system: factory test           | 8 15       | 110    | ^        | commissioning-engineers*2
                E40 | Control system: installation           | 24 32 50   | 620+3  | ^, D40, D30 | ~labour
                E50 | Sill repair and bed protection         | 24 32 60   | 2900+9 | B20      | @marine dive-teams*1 ~ground
                F10 | Piers: concrete repair                 | 55 70 110  | 2400+5 | B20      |
                F20 | Piers: sheet pile apron                | 16 22 38   | 1400+9 | ^, E50   | @marine ~ground piling-rig*1
                M50 | Barrier closable on gate 1             | milestone  |        | C60, D20 | !
                M60 | Barrier closable on both gates         | milestone  |        | C90, D30, D40 | !
                """,
            Forks =
            [
                ProjectPlan.Fork("bearings", "State of the gate bearings", ("sound", 0.6, ["C10"]), ("worn", 0.4, ["C20", "C30"])),
            ],
        },
        new("dyke-east", "Raising of the east dyke", StartWeek: -64, Priority: 35)
        {
            Region = "coast", Funding = "state grant", Correlation = 0.25, OverheadPerDay = 5, Size = (1, 1),
            Survey = "Dyke levels and property survey", Permits = "Planning approval of the dyke", WorksEnd = "D20, D30",
            Works = """
                B10 | Construction roads            | 18 25 40  | 640    | M10      | ~weather
                B20 | Soil stripping and clearance  | 14 18 32  | 380    | ^        | ~weather
                B30 | Cut-off wall km 0–2           | 20 26 45  | 1500+9 | B10      | ~ground piling-rig*1
                B40 | Cut-off wall km 2–4           | 20 26 45  | 1500+9 | ^        | ~ground piling-rig*1
                C10 | Clay supply contract          | 30 45     | 2100   | M10      | ~materials
                C20 | Embankment km 0–2, core       | 35 46 80  | 2200+6 | B20, B30, ^ | @earthworks ~weather ~ground
                C30 | Embankment km 0–2, clay cover | 20 28 48  | 1100   | ^        | @earthworks ~weather
                C40 | Embankment km 2–4, core       | 35 46 80  | 2200+6 | B40, C20 | @earthworks ~weather ~ground
                C50 | Embankment km 2–4, clay cover | 20 28 48  | 1100   | ^        | @earthworks ~weather
                C60 | Sluice: structure             | 40 52 80  | 1700+5 | B20      | ~materials
                C70 | Sluice: gates and drives      | 24 32 50  | 820    | ^        |
                C80 | Settlement readings           | 10        | 40     | C50      |
                C85 | Preload berm and waiting time | 40 60 100 | 620    | C50      | ~ground
                D10 | Drainage ditch and filter     | 20 26 42  | 540    | C40      | ~weather
                D20 | Dyke road                     | 24 30 46  | 980    | ^, C80, C85 | ~weather
                D30 | Seeding and fencing           | 12 20     | 260    | C30, C50, C70 | ~weather
                M50 | Dyke closed to design level   | milestone |        | C50, C70 | !
                """,
            Forks =
            [
                ProjectPlan.Fork("settlement", "How the new dyke settles", ("as-predicted", 0.7, ["C80"]), ("slowly", 0.3, ["C85"])),
            ],
        },
        new("pumping-station-marsh", "Marsh pumping station", StartWeek: -70, Priority: 45)
        {
            Region = "marsh", Funding = "own means", Correlation = 0.3, OverheadPerDay = 4, Size = (0.9, 0.9),
            Permits = "Water act permit", WorksEnd = "D70",
            Works = """
                B10 | Site set-up and access bridge           | 12 16 26   | 320    | M10      |
                B20 | Sheet pile pit                          | 14 20 34   | 980+9  | ^        | ~ground piling-rig*1
                B30 | Excavation and under-water concrete     | 18 24 42   | 1100+6 | ^        | ~ground dive-teams*1
                C10 | Substructure: floor and suction bays    | 32 42 64   | 1500+5 | ^        | ~materials
                C20 | Substructure: walls                     | 30 38 58   | 1250+5 | ^        | ~materials
                C30 | Superstructure                          | 40 50 75   | 1200   | ^        | ~labour
                C40 | Outfall through the dyke                | 24 32 56   | 980+6  | C10, dyke-east/B40 | ~ground ~weather
                D10 | Pumps and motors: manufacture           | lognormal 130 28 | 3100   | M10      | ~market
                D20 | Pumps and motors: installation          | 22 28 45   | 420+5  | C20, ^   | ~labour heavy-lift-crane*1
                D30 | Switchgear and controls                 | 28 36 55   | 860+3  | C30, D20 | ~labour
                D40 | Trash rack and inlet channel            | 24 32 50   | 720    | C20, C40 |
                D50 | Grid connection by the network operator | discrete 60:0.55 90:0.3 140:0.15 | 480    | M10      | ~permitting
                D60 | Dry tests                               | 8 10 16    | 60+2   | D30, ^   | commissioning-engineers*2
                D70 | Wet tests                               | 8 12 22    | 80+2   | ^, D40   | commissioning-engineers*2
                """,
        },
    ];
}
