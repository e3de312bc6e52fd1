using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>Programme <c>water-and-sewage</c>: storage, the trunk main and the works at its end.</summary>
internal static class WaterAndSewage
{
    public static readonly IReadOnlyList<ProjectPlan> Projects =
    [
        new("reservoir-hill", "Service reservoir on the hill", StartWeek: -48, Priority: 60)
        {
            Region = "hills", Funding = "water charges", Correlation = 0.2, OverheadPerDay = 3, Size = (0.9, 0.8),
            WorksEnd = "D40",
            Works = """
                B10 | Access road                      | 18 24 40   | 520    | M10      | ~weather
                B20 | Rock excavation                  | 24 34 65   | 1100+6 | ^        | ~ground
                B30 | Drainage blanket and blinding    | 12 18      | 280    | ^        | ~weather
                C10 | Cell 1: floor                    | 18 24 36   | 780+4  | ^        | ~materials
                C20 | Cell 1: walls and columns        | 30 38 58   | 1200+4 | ^        | ~materials
                C30 | Cell 1: roof                     | 22 28 42   | 820+4  | ^        | ~materials
                C40 | Cell 2: floor                    | 18 24 36   | 780+4  | C10      | ~materials
                C50 | Cell 2: walls and columns        | 30 38 58   | 1200+4 | ^, C20   | ~materials
                C60 | Cell 2: roof                     | 22 28 42   | 820+4  | ^, C30   | ~materials
                C70 | Valve house                      | 35 44 65   | 740    | C10      | ~labour
                D10 | Inlet and outlet mains           | 30 40 64   | 1350   | B10      | ~ground ~utilities
                D20 | Water tightness test, both cells | normal 24 4 | 60     | C60      |
                D30 | Valves, meters and telemetry     | 20 26 40   | 480+2  | C70, D10 | commissioning-engineers*1
                D40 | Disinfection and sampling        | discrete 10:0.7 18:0.2 30:0.1 | 40     | D20, D30 | commissioning-engineers*1
                D50 | Earth cover and planting         | 16 22 38   | 320    | D20      | ~weather
                """,
        },
        new("sewage-main", "Trunk sewage main", StartWeek: -68, Priority: 15)
        {
            Region = "town", Funding = "water charges", Correlation = 0.35, OverheadPerDay = 6, Size = (1, 1.2), Drivers = ["utilities"],
            Survey = "Route and trial-pit survey", Permits = "Road works and crossing permits", WorksEnd = "D20, D30, E30",
            Works = """
                B10 | Pipe supply                           | 35 46 70   | 5200    | M10      | ~materials
                B20 | Traffic management, section 1         | 6 10       | 160     | M10      |
                B30 | Section 1: trench and pipes           | 40 54 90   | 3100+8  | ^, B10   | ~ground ~weather
                B40 | Section 1: manholes and reinstatement | 22 28 44   | 920     | B30 SS+20 | ~weather
                B50 | Section 2: trench and pipes           | 38 50 85   | 2900+8  | B30      | ~ground ~weather
                B60 | Section 2: manholes and reinstatement | 22 28 44   | 920     | B50 SS+20 | ~weather
                C10 | River crossing: shafts                | 28 36 60   | 1500+7  | M10      | ~ground piling-rig*1
                C20 | River crossing: microtunnel           | pert@10:90 30 42 75 | 3600+14 | ^        | ~ground
                C30 | River crossing: second launch pit     | 18 24 38   | 780     | C10      | ~ground
                C40 | River crossing: drilled twin pipes    | 40 55 90   | 2900+12 | ^        | ~ground
                C50 | River crossing: pipe and grouting     | 16 20 32   | 820     | C20, C40 |
                D10 | Pumping shaft: structure              | 34 44 68   | 1600+5  | C10      | ~ground ~materials
                D20 | Pumping shaft: pumps and controls     | 26 34 52   | 1400+3  | ^        | ~labour ~market
                D30 | Odour treatment                       | 20 28      | 460     | ^        |
                E10 | Section 3: trench and pipes           | 32 42 72   | 2300+8  | B50      | ~ground ~weather
                E20 | Section 3: manholes and reinstatement | 20 26 40   | 780     | E10 SS+18 | ~weather
                E30 | Pressure and camera tests             | 10 14 24   | 140+2   | B40, B60, E20, C50 | commissioning-engineers*1
                M50 | Main ready to receive flow            | milestone  |         | E30, D20 | !
                """,
            Forks =
            [
                ProjectPlan.Fork("crossing", "Way below the river", ("one-drive", 0.8, ["C20"]), ("twin-pipes", 0.2, ["C30", "C40"])),
            ],
        },
        new("treatment-works", "Extension of the sewage treatment works", StartWeek: -58, Priority: 25)
        {
            Region = "marsh", Funding = "water charges", Correlation = 0.35, OverheadPerDay = 7, Size = (1, 1.4), Drivers = ["design"],
            Survey = "Process and site survey", Permits = "Discharge and building permits", WorksEnd = "D20, E50",
            Works = """
                B10 | Site set-up and utilities diversion   | 20 28 60   | 640    | M10      | ~utilities
                B20 | Ground improvement                    | 24 32 56   | 1700+8 | ^        | ~ground piling-rig*1
                C10 | Inlet works: structure                | 40 52 80   | 1800+5 | ^        | ~materials
                C20 | Inlet works: screens and grit removal | 24 30 46   | 1600   | ^        | ~labour
                C30 | Aeration tanks: floor                 | 28 36 55   | 2200+6 | B20      | ~materials
                C40 | Aeration tanks: walls                 | 42 54 82   | 2700+6 | ^        | ~materials
                C50 | Aeration tanks: blowers and diffusers | 34 42 64   | 3600+3 | ^        | ~labour
                C60 | Clarifier 1                           | 38 48 72   | 2300+5 | C30      | ~materials
                C70 | Clarifier 2                           | 38 48 72   | 2300+5 | ^ SS+24  | ~materials
                C80 | Sand filters: structure and media     | 45 56 85   | 2100   | C60      |
                C85 | Membrane filters: supply              | lognormal 120 26 | 4800   | C60      | ~market
                C90 | Membrane filters: installation        | 30 38 58   | 1300+4 | ^        | ~labour
                D10 | Sludge digester: structure            | 50 64 95   | 2600+5 | B20      | ~materials
                D20 | Sludge digester: gas and heat plant   | 40 50 78   | 2900+3 | ^        | ~labour
                E10 | Power supply and transformers         | triangular@10:90 70 90 130 | 1900   | M10      | ~market
                E20 | Process control: software             | percentiles 0:50 50:75 80:95 100:150 | 1250   | M10      | ~design
                E30 | Process control: installation         | 36 45 68   | 980+3  | C20, C50, E10, ^ | commissioning-engineers*1
                E40 | Dry commissioning by process unit     | 20 28 45   | 240+3  | E30, C70, C80, C90 | commissioning-engineers*3
                E50 | Seeding and first sewage              | 20 30 55   | 180+3  | ^, sewage-main/M50 | commissioning-engineers*2
                M50 | Discharge limits met                  | milestone  |        | ^        | !
                """,
            Forks =
            [
                ProjectPlan.Fork("effluent", "Filter that the permit requires", ("sand", 0.6, ["C80"]), ("membrane", 0.4, ["C85", "C90"])),
            ],
        },
    ];
}
