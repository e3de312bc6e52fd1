using Portfolio.Engine.Inputs;

namespace Portfolio.Engine.Networks;

/// <summary>
/// Latest finishes, which order work at the pools: a backward pass over base values without pools from each project's own base finish,
/// through links into other projects too; finished work and work not in the base bound nothing (contract section 4, item 7).
/// </summary>
internal static class LatestFinish
{
    /// <summary>By activity, minutes, moved back to the end of work on the activity's calendar.</summary>
    public static int[] Of(Network network, BaseInputs inputs)
    {
        var rows = PoolFree(network, inputs);
        var latest = new int[network.Count];
        var projectFinish = ProjectFinishes(network, inputs, rows);
        for (var o = network.Count - 1; o >= 0; o--)
        {
            var activity = network.Order[o];
            latest[activity] = projectFinish[network.ProjectOf[activity]];
            foreach (var successor in network.SuccessorsOf(activity))
            {
                if (!network.Finished(successor) && inputs.InBase(successor))
                    latest[activity] = Math.Min(latest[activity], Bound(network, rows, latest, activity, successor));
            }
        }
        for (var a = 0; a < network.Count; a++)
            latest[a] = network.Calendar[a].At(network.Calendar[a].Worked(latest[a]));
        return latest;
    }

    private static ScheduleRows PoolFree(Network network, BaseInputs inputs)
    {
        var rows = new ScheduleRows(RowLayout.Full(network.Count), 1);
        var pass = new ForwardPass(network, rows, inputs);
        foreach (var activity in network.Order)
        {
            inputs.Durations(activity, rows.Work(activity, 1));
            pass.Place(activity);
        }
        return rows;
    }

    private static int[] ProjectFinishes(Network network, BaseInputs inputs, ScheduleRows rows)
    {
        var finish = new int[network.Projects.Count];
        Array.Fill(finish, int.MinValue);
        for (var a = 0; a < network.Count; a++)
        {
            if (inputs.InBase(a))
                finish[network.ProjectOf[a]] = Math.Max(finish[network.ProjectOf[a]], rows.Finish(a, 1)[0]);
        }
        return finish;
    }

    // The latest finish of an activity that the links to one successor allow.
    private static int Bound(Network network, ScheduleRows rows, int[] latest, int activity, int successor)
    {
        var calendar = network.Calendar[successor];
        var latestStart = calendar.Back(latest[successor], rows.Work(successor, 1)[0]);
        var bound = int.MaxValue;
        foreach (ref readonly var link in network.LinksOf(successor))
        {
            if (link.Predecessor != activity)
                continue;
            var allowed = calendar.Shift(link.ToStart ? latestStart : latest[successor], -link.Lag);
            bound = Math.Min(bound, link.FromFinish ? allowed : network.Calendar[activity].Add(allowed, rows.Work(activity, 1)[0]));
        }
        return bound;
    }
}
