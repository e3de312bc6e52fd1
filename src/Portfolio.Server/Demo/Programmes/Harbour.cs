using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>Programme <c>harbour</c>: deeper water, longer quays and a new ferry berth.</summary>
internal static class Harbour
{
    public static readonly IReadOnlyList<ProjectPlan> Projects =
    [
        new("quay-wall-north", "North quay wall", StartWeek: -88, Priority: 20)
        {
            Region = "harbour", Funding = "harbour dues", Correlation = 0.35, OverheadPerDay = 9, Size = (1, 1.6), Drivers = ["labour"],
            Survey = "Bathymetric and ordnance survey", Permits = "Port works and environmental permits", WorksEnd = "E20, E40, E50, F30",
            Works = """
                B10 | Mobilisation of marine plant          | 12 16 28   | 1100    | M10      |
                B20 | Ordnance clearance of the pile line   | 15 22 45   | 620+9   | ^        | @marine ~ground dive-teams*1
                B30 | Test piles and load tests             | 10 14 24   | 480     | ^        | @marine ~ground piling-rig*1
                B40 | Supply of tubular piles               | 60 78 120  | 7400    | M10      | ~materials
                C10 | Piling bays 1–4                       | 24 32 54   | 2100+12 | B30, B40 | @marine ~ground ~weather piling-rig*1
                C20 | Piling bays 5–8                       | 24 32 54   | 2100+12 | ^        | @marine ~ground ~weather piling-rig*1
                C30 | Piling bays 9–12                      | 24 32 54   | 2100+12 | ^        | @marine ~ground ~weather piling-rig*1
                C40 | Ground anchors                        | 28 38 65   | 2900+6  | C30      | ~ground
                C50 | Excavation for dead-man wall          | 16 22 36   | 900     | C30      | ~ground
                C60 | Dead-man wall and tie rods            | 34 45 70   | 3400+6  | ^        | ~materials
                C70 | Backfill behind the wall              | 20 28 46   | 1700    | C40, C60 | ~weather
                D10 | Capping beam bays 1–4                 | 22 28 42   | 1450+5  | C10      | ~materials
                D20 | Capping beam bays 5–8                 | 22 28 42   | 1450+5  | ^, C20   | ~materials
                D30 | Capping beam bays 9–12                | 22 28 42   | 1450+5  | ^, C40, C60 | ~materials
                D40 | Relieving platform                    | 45 60 90   | 3600+8  | D20, C70 | ~materials
                E10 | Dredging of the berth pocket          | 14 20 34   | 1300+16 | D30      | @marine ~weather dredging-plant*1
                E20 | Scour protection                      | 14 18 30   | 1500+7  | ^        | @marine ~weather dive-teams*1
                E30 | Fenders and bollards: supply          | 60 80      | 1250    | M10      | ~market
                E40 | Fenders and bollards: installation    | 12 16 26   | 340+4   | D30, ^   |
                E50 | Crane rails and foundations           | 30 40 62   | 2200+5  | D40      | ~materials
                F10 | Drainage, ducts and quay surfacing    | 32 42 65   | 2100    | D40      | ~weather
                F20 | Shore power substation: supply        | percentiles 0:90 50:125 80:150 100:220 | 1800    | M10      | ~market
                F30 | Shore power: installation and cabling | 20 28 42   | 640+3   | F10, ^   | ~labour
                M50 | Quay ready for the ferry berth works  | milestone  |         | D30, C70 | !
                """,
            Forks =
            [
                ProjectPlan.Fork("anchorage", "How the wall is held", ("ground-anchors", 0.7, ["C40"]), ("dead-man", 0.3, ["C50", "C60"])),
            ],
        },
        new("dredging-approach", "Deepening of the approach channel", StartWeek: -44, Priority: 30)
        {
            Region = "harbour", Funding = "harbour dues", Correlation = 0.3, OverheadPerDay = 5, Size = (0.85, 0.9),
            Survey = "Multibeam survey of the channel", Permits = "Sea disposal and dredging licence", WorksEnd = "C60, D20, D30",
            Works = """
                B10 | Sediment sampling campaign        | 10 16      | 210     | M10      | @marine
                B20 | Laboratory analysis               | discrete 15:0.6 20:0.3 35:0.1 | 90      | ^        |
                C10 | Dredging section 1, outer bar     | 22 30 55   | 2400+28 | B20      | @marine ~weather dredging-plant*1
                C20 | Dredging section 2, channel       | 26 34 60   | 2900+28 | ^        | @marine ~weather dredging-plant*1
                C30 | Disposal of silt at sea           | 18 24 36   | 700     | C10 SS+8 | ~weather
                C40 | Silt treatment plant set-up       | 25 35 60   | 1600    | B20      | ~permitting
                C50 | Silt treatment                    | 50 70 110  | 3200+6  | ^, C10   |
                C60 | Dredging section 3, turning basin | 20 26 48   | 2100+28 | C20, C30, C50 | @marine ~weather ~ground dredging-plant*1
                D10 | Boulder removal by divers         | 8 12 30    | 320+5   | C20      | @marine ~ground dive-teams*1
                D20 | Buoys, leading lights and marks   | 14 20 32   | 560     | C60      | ~weather
                D30 | Bank protection along the channel | 26 34 54   | 1450    | C20, C60 FF+8 | ~weather
                M50 | Channel open at the new depth     | milestone  |         | C60, D10 | !
                """,
            Forks =
            [
                ProjectPlan.Fork("silt", "Class of the dredged silt", ("clean", 0.75, ["C30"]), ("polluted", 0.25, ["C40", "C50"])),
            ],
        },
        new("ferry-terminal", "Ferry terminal and ro-ro berth", StartWeek: -30, Priority: 50)
        {
            Region = "harbour", Funding = "regional fund", Correlation = 0.3, OverheadPerDay = 6, Size = (0.95, 1.1),
            Survey = "Site, traffic and wave survey", Permits = "Building and port permits", WorksEnd = "C70, D50, E30, E40",
            Works = """
                B10 | Site clearance and hoarding             | 10 14 24   | 280    | M10      |
                B20 | Diversion of sewers and cables          | 18 25 60   | 520    | ^        | ~utilities
                C10 | Dolphin piles 1–3                       | 14 18 32   | 980+10 | B10, quay-wall-north/M50 | @marine ~ground ~weather piling-rig*1
                C20 | Dolphin piles 4–6                       | 14 18 32   | 980+10 | ^        | @marine ~ground ~weather piling-rig*1
                C30 | Bank seat and abutment                  | 28 36 56   | 1300+5 | C10      | ~materials
                C40 | Link span: fabrication                  | lognormal 115 24 | 3900   | M10      | ~materials
                C50 | Link span: float in and installation    | 5 6 12     | 420+22 | C20, C30, ^, dredging-approach/M50 | ~weather heavy-lift-crane*1
                C60 | Link span: hydraulics and controls      | 20 26 42   | 560+4  | ^        | ~labour
                C70 | Fenders and mooring equipment           | 12 16 26   | 620    | C20      |
                D10 | Terminal building: foundations          | 20 26 42   | 740+4  | B20      | ~ground
                D20 | Terminal building: frame and roof       | 40 50 75   | 1900+5 | ^        | ~materials
                D30 | Terminal building: envelope             | 35 45 66   | 1500   | ^ SS+25  | ~labour
                D40 | Terminal building: services             | 45 58 85   | 1650+3 | D20      | ~labour
                D50 | Terminal building: fit-out              | 35 44 64   | 1200   | D30, ^   | ~labour
                E05 | Marshalling yard: lime stabilisation    | 8 10 18    | 240    | B20      | ~weather
                E06 | Marshalling yard: removal of oily soil  | 15 24 50   | 780    | B20      | ~ground
                E07 | Marshalling yard: clean fill            | 10 14 24   | 310    | ^        |
                E10 | Marshalling yard: earthworks            | 22 30 52   | 860    | E05, E07 | ~ground ~weather
                E20 | Marshalling yard: drainage and lighting | 22 28 44   | 720    | ^        |
                E30 | Marshalling yard: paving                | 20 26 40   | 980    | ^        | ~weather
                E40 | Passenger walkway                       | 25 32 50   | 840    | D20, C30 |
                """,
            Forks =
            [
                ProjectPlan.Fork("yard-soil", "State of the soil below the yard", ("clean", 0.75, ["E05"]), ("oily", 0.25, ["E06", "E07"])),
            ],
        },
    ];
}
