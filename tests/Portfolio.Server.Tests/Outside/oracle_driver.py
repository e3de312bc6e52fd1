"""Runs a simulator that stands outside the product on many documents at once.

    oracle_driver.py SIMULATOR.py < jobs.json

Each job is { "document": path, "iterations": n, "seed": s, "levels": [...] }; 0 iterations ask for base values. Prints one
JSON line for each job: { "epoch": day after 1970-01-01 from which times count, "scopes": { scope: { ... } } }.
"""
import datetime as dt
import importlib.util
import json
import math
import multiprocessing
import sys

import numpy as np

WIDTH = 4  # standard errors of the interval given beside each percentile


def load(path):
    spec = importlib.util.spec_from_file_location("simulator", path)
    module = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(module)
    build, known = module.Calendar, {}

    def calendar(stated, epoch, horizon):
        key = (json.dumps(stated, sort_keys=True), epoch, horizon)
        if key not in known:
            known[key] = build(stated, epoch, horizon)
        return known[key]

    module.Calendar = calendar  # documents share their calendars; building one takes longer than a schedule
    return module


def happens(model, scope, values):
    """The iterations in which a milestone happens; those of everything else are all."""
    if not scope.startswith("milestone/"):
        return values
    skip = model.skip.get(model.index[tuple(scope.split("/")[1:])])
    return values if skip is None else values[~np.broadcast_to(skip, values.shape)]


def base(model):
    scopes = {}
    for scope, (finish, cost) in model.outcomes().items():
        kept = happens(model, scope, np.asarray(finish, float))
        if not len(kept):
            continue
        t = float(kept[0])
        if scope.startswith("milestone/"):
            date = model.milestone_date(model.index[tuple(scope.split("/")[1:])], t)
        else:
            date = model.date(t)
        scopes[scope] = {"time": t, "date": date, "cost": None if cost is None else float(cost[0])}
    return scopes


def figures(values, levels):
    """Percentiles as order statistics, each with the order statistics WIDTH standard errors of its rank away."""
    ordered, n = np.sort(values), len(values)
    at = lambda rank: float(ordered[min(max(rank, 1), n) - 1])
    rows = []
    for level in levels:
        rank, reach = math.ceil(level * n / 100 - 1e-9), WIDTH * math.sqrt(n * level / 100 * (1 - level / 100))
        rows.append({"level": level, "value": at(rank), "low": at(math.floor(rank - reach)), "high": at(math.ceil(rank + reach))})
    return {"count": n, "mean": float(values.mean()), "sd": float(values.std()), "levels": rows}


def sampled(model, levels):
    scopes = {}
    for scope, (finish, cost) in model.outcomes().items():
        kept = happens(model, scope, np.broadcast_to(np.asarray(finish, float), (model.n,)))
        if len(kept) * min(min(levels), 100 - max(levels)) < 5000:
            continue  # too few to say anything about the outer levels
        scopes[scope] = {"finish": figures(kept, levels), "cost": None if cost is None else figures(cost, levels)}
    return scopes


def work(job):
    with open(job["document"], encoding="utf-8") as file:
        document = json.load(file)
    model = SIMULATOR.Model(document, max(job["iterations"], 1), job["seed"])
    if job["iterations"]:
        model.sample()
        scopes = sampled(model, job["levels"])
    else:
        model.base()
        scopes = base(model)
    return json.dumps({"epoch": (model.epoch - dt.date(1970, 1, 1)).days, "scopes": scopes})


SIMULATOR = load(sys.argv[1])
if __name__ == "__main__":
    jobs = json.load(sys.stdin)
    with multiprocessing.get_context("fork").Pool(min(2, len(jobs))) as pool:
        for line in pool.imap(work, jobs):
            print(line, flush=True)
