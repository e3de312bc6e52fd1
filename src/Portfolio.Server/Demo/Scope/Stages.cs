namespace Portfolio.Server.Demo.Scope;

/// <summary>What every project of the authority goes through before and after its works, in the form of <see cref="ScopeTable"/>.</summary>
internal static class Stages
{
    /// <summary>From the brief to the award. <c>{survey}</c> and <c>{permits}</c> are named by the project.</summary>
    public const string Preparation = """
        A10  | Project brief and budget         | 10 15 25   | 60      |          |
        A20  | {survey}                         | 12 18 30   | 140     | A10      |
        A30  | Ground investigation             | 20 30 55   | 320     | A10 SS+5 | ~ground
        A40  | Environmental assessment         | 40 55 90   | 180     | A10      | ~permitting
        A50  | Concept design                   | 24 32 50   | 250+1.2 | A20, A30 | ~design
        A55  | Review of buildability and value | 6 12       | 40      | A50      |
        A60  | Detailed design                  | 50 68 110  | 620+2.5 | A55      | ~design
        A65  | Independent check of the design  | 12 16 30   | 70      | ^        |
        A70  | {permits}                        | percentiles 0:45 50:66 80:88 100:150 | 90      | A40, A50 | ~permitting
        A80  | Land and access agreements       | lognormal 45 16 | 150     | A50      |
        A90  | Tender documents                 | 18 24 36   | 120     | A60 SS+45 |
        A100 | Tender, evaluation and award     | triangular 42 52 80 | 80      | A65, A70, A90 | ~market
        M10  | Contract awarded                 | milestone  |         | A80, ^   | !
        """;

    /// <summary>From the end of the works (<c>{works}</c>) to the final account.</summary>
    public const string Completion = """
        Z10 | Integrated tests and commissioning      | 14 20 38   | 160+3 | {works}  | commissioning-engineers*2
        Z20 | Operator training                       | 6 10       | 40    | Z10 SS+5 |
        Z30 | As-built records and manuals            | 20 28 45   | 110   | {works}  |
        Z35 | Acceptance by the supervising authority | discrete 10:0.6 20:0.3 40:0.1 | 30    | Z10      | ~permitting
        Z40 | Trial operation                         | 30         | 90+1  | Z10, Z20 | commissioning-engineers*1
        M90 | In service                              | milestone  |       | Z40, Z30, Z35 | !
        Z50 | Snagging and defects                    | lognormal@10:90 12 38 | 120   | Z40      | ~labour
        Z60 | Final account and close-out             | normal 30 6 | 60    | Z50      |
        """;
}
