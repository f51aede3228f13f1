"""Clones through an encounter by SciPy's DOP853, all of them as one vector: the reference of the bench.

Standard input: JSON with the bodies' places (tables in time), their GM, the clones' states and the
instants. Point masses only: less to do than the core has. Standard output: JSON with the seconds it
took and the error against its own tight run, km.
"""
import json
import sys
import time

import numpy as np
from scipy.integrate import solve_ivp
from scipy.interpolate import CubicHermiteSpline

task = json.load(sys.stdin)
gm = np.array(task["gm"])
times = np.array(task["times"])
path = CubicHermiteSpline(times, np.array(task["places"]), np.array(task["velocities"]))
clones = np.array(task["states"])
count = len(clones)


def rate(t, y):
    state = y.reshape(6, count)
    out = np.empty_like(state)
    out[:3] = state[3:]
    pull = np.zeros((3, count))
    for body, place in enumerate(path(t).reshape(-1, 3)):
        d = place[:, None] - state[:3]
        d2 = np.einsum("ij,ij->j", d, d)
        pull += gm[body] / (d2 * np.sqrt(d2)) * d
    out[3:] = pull
    return out.ravel()


def carry(rtol):
    start = time.perf_counter()
    # Places in km, velocities in km/s: one absolute tolerance for each, scaled by the relative one.
    atol = np.repeat([rtol * 1e4, rtol * 1.0], 3 * count)
    result = solve_ivp(rate, (times[0], task["end"]), clones.T.ravel(), "DOP853", rtol=rtol, atol=atol)
    return time.perf_counter() - start, result.y[:, -1].reshape(6, count)


tight = carry(1e-13)[1]
answers = []
for rtol in task["tolerances"]:
    seconds = min(carry(rtol)[0] for _ in range(2))
    state = carry(rtol)[1]
    error = float(np.max(np.linalg.norm(state[:3] - tight[:3], axis=0)))
    answers.append({"rtol": rtol, "seconds": seconds, "errorKm": error})
json.dump(answers, sys.stdout)
