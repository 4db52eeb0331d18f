"""Holds the scans of this reference against SciPy's general solvers, by other routes.

    python check_solver.py [COUNT]

Lean by `brentq`, least effort by `minimize_scalar` on many short pieces, steady depth by `minimize`
(SLSQP) over all three angles at once. Prints the largest disagreement of each.
"""

import sys
from itertools import pairwise

import numpy as np
from scipy.optimize import brentq, minimize, minimize_scalar

import model
import random_clients
import rules
from make_fixtures import SEED


def lean_by_root(case, shank, thigh, ceiling):
    """Lean with the COM on the aim by bracketed root, else the nearest end."""

    def miss(lean):
        return float(model.com_x(case, shank, thigh, lean)) - case.marks[2]

    if miss(model.LEAN_FLOOR) >= 0.0:
        return model.LEAN_FLOOR
    if miss(ceiling) <= 0.0:
        return ceiling
    return brentq(miss, model.LEAN_FLOOR, ceiling, xtol=1e-14)


def effort_at(case, shank, thigh, ceiling):
    lean = lean_by_root(case, shank, thigh, ceiling)
    return float(model.readings(case, shank, thigh, lean)["cost"])


def least_effort(case, thigh, pieces=24):
    """Least summed squared effort over the shank angles that put the COM on the aim."""
    ceiling = model.lean_ceiling(case, thigh)
    low, high = rules.allowed(case, thigh)
    aim = case.marks[2]
    grid = np.linspace(low, high, 4001)
    reached = grid[rules.distance(case, grid, thigh, ceiling, aim, aim) == 0.0]
    if reached.size == 0:
        return None
    ends = np.linspace(reached[0], reached[-1], pieces + 1)

    def at(shank):
        return effort_at(case, shank, thigh, ceiling)

    found = [
        minimize_scalar(at, bounds=pair, method="bounded", options={"xatol": 1e-9}).fun
        for pair in pairwise(ends)
    ]
    return min(found + [at(ends[0]), at(ends[-1])])


def deepest_by_optimiser(case, start):
    """Largest thigh angle near `start` with the COM in the zone, all three angles free."""
    zone_back, zone_front = case.marks[1], case.marks[3]

    def room(angles):
        shank, thigh, lean = angles
        low, high = rules.shank_range(case, thigh)
        x = float(model.com_x(case, shank, thigh, lean))
        knee = -float(rules.knee_excess(case, shank, thigh))
        hip = case.hip_limit + case.bend - thigh - lean
        metres = 20.0 * np.array([x - zone_back, zone_front - x])
        across = case.body.hip_half_spacing - float(model.legs(case, shank, thigh)["knee_z"])
        metres = np.append(metres, 20.0 * (case.body.thigh - abs(across)))
        rise = float(model.lean_rise(case, thigh, lean)) - model.LEAN_LEAST_RISE
        angles_room = [knee, hip, shank - low, high - shank, case.lean_limit - lean]
        return np.append(metres, angles_room + [20.0 * rise])

    best = -np.inf
    shanks = np.linspace(*rules.allowed(case, start), 5)
    for shank in shanks:
        lean = lean_by_root(case, shank, start, model.lean_ceiling(case, start))
        found = minimize(
            lambda a: -a[1],
            [shank, start, lean],
            method="SLSQP",
            bounds=[(-0.2, 1.6), (start - 0.05, start + 0.3), (model.LEAN_FLOOR, 1.5)],
            constraints={"type": "ineq", "fun": room},
            options={"ftol": 1e-12, "maxiter": 200},
        )
        if found.success and room(found.x).min() > -1e-7:
            best = max(best, found.x[1])
    return best


def main(count):
    worst = {"lean deg": 0.0, "effort share": 0.0}
    depth_off = []
    for client in random_clients.clients(SEED, count):
        visit = client["visits"][0]
        case = model.case_of(visit, visit["tasks"][0])
        for thigh in np.radians([30.0, 75.0]):
            found = rules.posture(case, thigh)
            if found["kind"] == "refused":
                continue
            reading, ceiling = found["reading"], model.lean_ceiling(case, thigh)
            lean = lean_by_root(case, reading["shank"], thigh, ceiling)
            worst["lean deg"] = max(worst["lean deg"], np.degrees(abs(lean - reading["trunk"])))
            other = least_effort(case, thigh) if case.rule[0] == "LeastEffort" else None
            if other is not None:
                worst["effort share"] = max(worst["effort share"], reading["cost"] / other - 1.0)
        steady = rules.depths(case)[0].thigh
        # Near standing the optimiser's start is not inside.
        if steady is not None and steady > 0.3:
            deepest = deepest_by_optimiser(case, steady - np.radians(2.0))
            depth_off.append((np.degrees(deepest - steady), client["code"]))
    print(worst)
    print("steady depth, optimiser minus scan, deg:")
    depth_off.sort()
    for off, code in depth_off[:3] + depth_off[-3:]:
        print(f"  {code} {off:+.2e}")


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 64)
