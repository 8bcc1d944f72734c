"""Which side of the separatrix a pushed market ends on, by scipy, twice over.

Reads one JSON list of cases on standard input,
    {"system": {r1, r2, k1, k2, alpha, beta}, "start": [n1, n2], "firm": 1 or 2, "length": months},
each a market in which the head start decides and a pulse of recruits of one firm from month 0 to `length`. Prints one JSON list with, for
each case, {"pulse": u, "side": s}: the recruits per month at which the market stands on the separatrix when the pulse ends, and the firm
that wins without a pulse. The separatrix is traced backwards from the saddle along its stable eigenvector (numpy's eigenvectors); the
pulse is found by brentq on the height of the pushed state above it; the winner by integrating the market to its end.
"""
import json
import sys

import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

TIGHT = dict(method="DOP853", rtol=1e-12, atol=1e-12)


def growth(s, state, recruits=(0.0, 0.0)):
    x, y = state[0] / s["k1"], state[1] / s["k2"]
    return [
        s["r1"] * state[0] * (1 - x - s["alpha"] * y) + recruits[0],
        s["r2"] * state[1] * (1 - y - s["beta"] * x) + recruits[1],
    ]


def saddle(s):
    d = 1 - s["alpha"] * s["beta"]
    return np.array([s["k1"] * (1 - s["alpha"]) / d, s["k2"] * (1 - s["beta"]) / d])


def jacobian(s, at):
    a, b = at
    return np.array([
        [s["r1"] * (1 - 2 * a / s["k1"] - s["alpha"] * b / s["k2"]), -s["r1"] * s["alpha"] * a / s["k2"]],
        [-s["r2"] * s["beta"] * b / s["k1"], s["r2"] * (1 - 2 * b / s["k2"] - s["beta"] * a / s["k1"])],
    ])


def separatrix(s, reach):
    """log n2 against log n1 along the stable manifold, from far inside to `reach` users of firm 1."""
    point = saddle(s)
    values, vectors = np.linalg.eig(jacobian(s, point))
    direction = vectors[:, np.argmin(values)].real
    direction *= np.sign(direction[0])
    branches = []
    for sign in (-1, 1):
        first = point + sign * 1e-7 * np.linalg.norm(point) * direction
        stop = lambda t, y: y[0] - (1e-3 * point[0] if sign < 0 else reach)
        stop.terminal = True
        back = lambda t, y: [-v for v in growth(s, y)]
        run = solve_ivp(back, (0, 1e5), first, events=stop, dense_output=True, **TIGHT)
        times = np.linspace(0, run.t[-1], 20001)
        branches.append(run.sol(times))
    curve = np.hstack([branches[0][:, ::-1], branches[1]])
    return np.log(curve)


def height(curve, state):
    return np.log(state[1]) - np.interp(np.log(state[0]), curve[0], curve[1])


def pushed(s, start, firm, size, length):
    recruits = (size, 0.0) if firm == 1 else (0.0, size)
    return solve_ivp(lambda t, y: growth(s, y, recruits), (0, length), start, **TIGHT).y[:, -1]


def winner(s, start):
    end = solve_ivp(lambda t, y: growth(s, y), (0, 5000), start, method="LSODA", rtol=1e-10, atol=1e-10).y[:, -1]
    return 1 if end[0] / s["k1"] > end[1] / s["k2"] else 2


def solve(case):
    s, start, firm, length = case["system"], case["start"], case["firm"], case["length"]
    curve = separatrix(s, 3 * max(s["k1"], start[0]))
    gap = lambda size: height(curve, pushed(s, start, firm, size, length))
    pulse = brentq(gap, 0, 2 * max(s["k1"], s["k2"]), xtol=1e-10, rtol=1e-12)
    return {"pulse": pulse, "side": winner(s, start)}


json.dump([solve(case) for case in json.load(sys.stdin)], sys.stdout)
