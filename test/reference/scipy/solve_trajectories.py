"""Monthly paths of the competitive growth system under pushes, by scipy's DOP853 at tolerance 1e-12.

Reads one JSON list of cases on standard input,
    {"system": {r1, r2, k1, k2, alpha, beta}, "start": [n1, n2], "pushes": [...], "months": m},
and prints one JSON list with, for each case, the states of months 0 to m as [[n1, n2], ...]. The pushes are written out here once more
from their definition (linear ramp, full strength, geometric carry-over), independently of the program that is tested.
"""
import json
import sys

import numpy as np
from scipy.integrate import solve_ivp


def strength(push, t):
    since = t - push["startMonth"]
    length = push["lengthMonths"]
    if since < 0:
        return 0.0
    ramp = push["rampMonths"]
    reach = lambda age: push["size"] * (min(1.0, age / ramp) if ramp > 0 else 1.0)
    if length is None or since < length:
        return reach(since)
    half_life = push["carryOverHalfLifeMonths"]
    return reach(length) * 0.5 ** ((since - length) / half_life) if half_life > 0 else 0.0


def growth(system, pushes, t, state):
    r = [system["r1"], system["r2"]]
    own = [system["r1"] / system["k1"], system["r2"] / system["k2"]]
    taken = [system["r1"] * system["alpha"] / system["k2"], system["r2"] * system["beta"] / system["k1"]]
    recruits = [0.0, 0.0]
    for push in pushes:
        u = strength(push, t)
        i = push["firm"] - 1
        if push["kind"] == "growth-lift":
            r[i] *= 1 + u
        elif push["kind"] == "pull":
            taken[1 - i] *= 1 + u
        elif push["kind"] == "room":
            own[i] /= 1 + u
        else:
            recruits[i] += u
    n1, n2 = state
    return [
        n1 * (r[0] - own[0] * n1 - taken[0] * n2) + recruits[0],
        n2 * (r[1] - own[1] * n2 - taken[1] * n1) + recruits[1],
    ]


def solve(case):
    months = case["months"]
    marks = set(range(months + 1))
    for push in case["pushes"]:
        begin = push["startMonth"]
        marks.update([begin, begin + push["rampMonths"], begin + (push["lengthMonths"] or 0)])
    stops = sorted(t for t in marks if 0 <= t <= months)
    state = np.array(case["start"], float)
    path = [state.tolist()]
    for a, b in zip(stops, stops[1:]):
        # Just inside the segment: at its ends a step has the value of the neighbour.
        inside = lambda t: min(max(t, a + 1e-12), b - 1e-12)
        run = solve_ivp(
            lambda t, y: growth(case["system"], case["pushes"], inside(t), y),
            (a, b), state, method="DOP853", rtol=1e-12, atol=1e-14,
        )
        state = run.y[:, -1]
        if b == int(b):
            path.append(state.tolist())
    return path


json.dump([solve(case) for case in json.load(sys.stdin)], sys.stdout)
