"""The same study in the reference stack (Pinocchio and SciPy) and in Plumbfold, in one run.

    python speed.py [PATH TO THE BUILT EXAMPLE]

Without a path the example is built and started with `cargo run --release -p plumbfold-core --example
study` from the project's folder; with one (`target/release/examples/study`) it is only started. The
client is the long-thighed woman of the program's samples. A study is a descent of 60 postures with
their moments from standing to the steady depth, both depths, and what stops each of them: every
limit lifted alone, and for those that matter what they are worth. Answers must agree to 0.1 degrees
and 0.1 N m before the ratio of the times is printed.

What is compared is a way a person would do it with these libraries, not the fastest possible: the
chain is built once, centre of mass, its Jacobian and the moments are Pinocchio's compiled code,
depths are one SLSQP run each, warm-started from the depth before, leans and shanks `brentq`. Of both,
the least time of many runs counts, so that other work on the machine weighs little.
"""

import math
import subprocess
import sys
import time
from dataclasses import replace
from pathlib import Path

import numpy as np
import pinocchio as pin
from scipy.optimize import brentq, minimize

import chain

ROOT = Path(__file__).parents[2]
COMMAND = ["cargo", "run", "--release", "-q", "-p", "plumbfold-core", "--example", "study"]
POSTURES = 60
REPEATS = 40
LEAST_RISE = 0.0002 * 180.0 / math.pi
SHANK_FROM = math.radians(-10.0)

VISIT = {
    "sex_model": "Female",
    "age_years": 34,
    "stature_cm": 168.0,
    "mass_kg": 61.0,
    "build": {"shank_cm": 39.8, "thigh_cm": 42.4, "trunk_cm": 48.0, "foot_cm": 24.5},
    "joints": {
        "ankle": {"KneeToWall": {"left_cm": 5.0, "right_cm": 6.0}},
        "hip": {"PelvisHeld": {"left": 98.0, "right": 101.0}},
        "knee": "NotMeasured",
        "reach_limit_deg": 200.0,
    },
    "caps": {},
}
TASK = {
    "placement": "ArmsForward",
    "load_kg": 0.0,
    "footwear_drop_mm": 0.0,
    "heel_raise_mm": 0.0,
    "toe_out_deg": 0.0,
    "bend": "Free",
}


class Rig:
    """The chain in the sagittal plane: both legs as one, hinges at ankle, knee, hip, L5/S1, arms."""

    def __init__(self, c):
        self.c, kg, cm = c, c.kg, c.cm
        _, ankle, _, _ = chain.leg(c, 0.0, 0.0)
        self.model = pin.Model()
        self.model.gravity.linear = np.array([0.0, -chain.G, 0.0])
        self.joint = 0
        self.link(ankle, [(2 * kg["shank"], (1.0 - cm["shank"]) * c.shank)])
        self.link((0, c.shank, 0), [(2 * kg["thigh"], (1.0 - cm["thigh"]) * c.thigh)])
        self.link((0, c.thigh, 0), [(kg["pelvis"], cm["pelvis"] * c.trunk)])
        above = c.trunk - c.low_back
        trunk = [(kg["thorax"], cm["thorax"] * c.trunk - c.low_back)]
        trunk += [(kg["head"], above + cm["head"] * c.stature)]
        self.link((0, c.low_back, 0), trunk)
        self.link((0, above, 0), [(2 * kg["upper_arm"], cm["upper_arm"] * c.upper_arm)])
        hand = [(2 * kg["forearm"], cm["forearm"] * c.forearm)]
        hand += [(2 * kg["hand"], c.forearm + cm["hand"] * c.hand)]
        self.link((0, c.upper_arm, 0), hand)
        self.data = self.model.createData()
        foot = chain.leg(c, 0.0, 0.0)[0]
        self.feet = 2.0 * kg["foot"] * foot[0]
        self.moving = c.whole - 2.0 * kg["foot"]
        self.arms = chain.arms(c, 0.0)  # held in the world's frame

    def link(self, at, masses):
        place = pin.SE3(np.eye(3), np.array(at, dtype=float))
        self.joint = self.model.addJoint(self.joint, pin.JointModelRZ(), place, f"{self.joint}")
        for kg, up in masses:
            body = pin.Inertia(kg, np.array([0.0, up, 0.0]), 1e-3 * np.eye(3))
            self.model.appendBodyToJoint(self.joint, body, pin.SE3.Identity())

    def q(self, shank, thigh, lean, hip_to):
        pelvis = lean - max(0.0, thigh + lean - hip_to)
        upper, fore = self.arms
        turned = [-shank, thigh + shank, -pelvis - thigh, pelvis - lean, lean - upper, upper - fore]
        return np.array(turned)

    def com_x(self, shank, thigh, lean, hip_to):
        com = pin.centerOfMass(self.model, self.data, self.q(shank, thigh, lean, hip_to))
        return (self.feet + self.moving * com[0]) / self.c.whole

    def rise(self, thigh, lean, hip_to):
        jacobian = pin.jacobianCenterOfMass(self.model, self.data, self.q(0.0, thigh, lean, hip_to))
        at = 3 if thigh + lean > hip_to else 2
        return (jacobian[0, 4] - jacobian[0, at]) * self.moving / self.c.whole

    def moments(self, shank, thigh, lean, hip_to):
        tau = pin.computeGeneralizedGravity(
            self.model, self.data, self.q(shank, thigh, lean, hip_to)
        )
        return tau[0] / 2.0, -tau[1] / 2.0, tau[2] / 2.0, tau[3]


def depth(rig, c, marks, start):
    """Largest thigh angle with the COM between two marks, by SLSQP from a start."""
    back, front = marks

    def hold(a):
        shank, thigh, lean = a
        x = rig.com_x(shank, thigh, lean, c.hip_to)
        return [
            10.0 * (x - back),
            10.0 * (front - x),
            10.0 * (rig.rise(thigh, lean, c.hip_to) - LEAST_RISE),
            c.hip_to + c.bend - thigh - lean,
            c.knee_to - shank - thigh,
        ]

    found = minimize(
        lambda a: -a[1],
        start,
        jac=lambda _: [0.0, -1.0, 0.0],
        method="SLSQP",
        bounds=[(SHANK_FROM, c.ankle_to), (0.0, math.pi), (chain.LEAN_FROM, c.lean_to)],
        constraints={"type": "ineq", "fun": hold},
        options={"ftol": 1e-10},
    )
    return found.x


def lean_end(rig, c, thigh):
    end = min(c.lean_to, c.hip_to + c.bend - thigh)

    def spare(lean):
        return rig.rise(thigh, lean, c.hip_to) - LEAST_RISE

    return end if spare(end) >= 0.0 else brentq(spare, chain.LEAN_FROM, end)


def posture(rig, c, thigh, marks):
    """Shank nearest the usual with the COM in the zone, the lean that puts it on the aim."""
    end = lean_end(rig, c, thigh)
    low, high = max(SHANK_FROM, -thigh), min(c.ankle_to, c.knee_to - thigh)
    fixed = chain.FIXED
    start = math.radians(fixed["usual_shank_at_standing_deg"])
    shank = start + fixed["usual_shank_per_thigh"] * thigh
    shank = min(max(shank, low), high)

    def behind(s):
        return rig.com_x(s, thigh, end, c.hip_to) - marks[0]

    def before(s):
        return marks[1] - rig.com_x(s, thigh, chain.LEAN_FROM, c.hip_to)

    if behind(shank) < 0.0:
        # at the depth itself the zone is reached by a hair
        shank = brentq(behind, shank, high) if behind(high) > 0.0 else high
    elif before(shank) < 0.0:
        shank = brentq(before, low, shank) if before(low) > 0.0 else low
    aim = c.on_floor(c.fractions[2])

    def miss(lean):
        return rig.com_x(shank, thigh, lean, c.hip_to) - aim

    if miss(end) <= 0.0:
        lean = end
    elif miss(chain.LEAN_FROM) >= 0.0:
        lean = chain.LEAN_FROM
    else:
        lean = brentq(miss, chain.LEAN_FROM, end)
    return shank, lean, rig.moments(shank, thigh, lean, c.hip_to)


LIFTED = {
    "Ankle": "ankle_to",
    "Hip": "hip_to",
    "Knee": "knee_to",
    "Bend": "bend",
    "Lean": "lean_to",
}
LIFTED_TO = {"Ankle": 89.0, "Hip": 179.0, "Knee": 180.0, "Bend": 179.0, "Lean": 89.0}


def stops(rig, c, edge, marks, now):
    """Limits that alone allow half a degree more, the depth without each and its worth."""
    found = {}
    step = math.radians(0.05)
    for name, field in LIFTED.items():
        without = depth(rig, replace(c, **{field: math.radians(LIFTED_TO[name])}), marks, now)[1]
        if without < now[1] + math.radians(0.5):
            continue
        found[f"{edge}_without_{name}"] = math.degrees(without)
        less, more = (
            depth(rig, replace(c, **{field: getattr(c, field) + by}), marks, now)[1]
            for by in (-step, step)
        )
        found[f"{edge}_worth_{name}"] = (more - less) / (2.0 * step)
    if edge == "balance":
        ends = (c.on_floor(0.0), c.on_floor(1.0))
        without = depth(rig, c, ends, now)[1]
        if without >= now[1] + math.radians(0.5):
            found["balance_without_Support"] = math.degrees(without)
            less, more = (
                depth(rig, c, (marks[0] - by, marks[1] + by), now)[1] for by in (-0.0005, 0.0005)
            )
            found["balance_worth_Support"] = math.degrees(more - less) / 0.1
    return found


def study(rig, c):
    edge_back, zone_back, _, zone_front, edge_front = (c.on_floor(f) for f in c.fractions)
    zone, edges = (zone_back, zone_front), (edge_back, edge_front)
    steady = depth(rig, c, zone, [0.3, 1.2, 0.6])
    balance = depth(rig, c, edges, steady)
    found = {
        "steady_depth_deg": math.degrees(steady[1]),
        "balance_depth_deg": math.degrees(balance[1]),
    }
    for at in range(POSTURES):
        shank, lean, moments = posture(rig, c, steady[1] * at / (POSTURES - 1), zone)
        found[f"posture_{at}_shank_deg"] = math.degrees(shank)
        found[f"posture_{at}_trunk_deg"] = math.degrees(lean)
        found[f"posture_{at}_knee_nm"] = moments[1]
        found[f"posture_{at}_hip_nm"] = moments[2]
    found |= stops(rig, c, "steady", zone, steady)
    found |= stops(rig, c, "balance", edges, balance)
    return found


def plumbfold(path):
    """Answers and seconds a study of the program."""
    command = [path] if path else COMMAND
    said = subprocess.run(command, cwd=ROOT, check=True, capture_output=True, text=True).stdout
    found = {name: float(value) for name, value in (line.split() for line in said.splitlines())}
    return found, found.pop("seconds")


def main(path):
    c = chain.chain_of(VISIT, TASK)
    rig = Rig(c)
    theirs = study(rig, c)
    times = []
    for _ in range(REPEATS):
        start = time.perf_counter()
        study(rig, c)
        times.append(time.perf_counter() - start)
    reference = min(times)
    ours, seconds = plumbfold(path)
    if ours.keys() != theirs.keys():
        raise SystemExit(f"not the same answers: {sorted(ours.keys() ^ theirs.keys())}")
    apart = {name: abs(ours[name] - theirs[name]) for name in ours}
    worst = max(apart, key=apart.get)
    print(f"{len(apart)} answers, at most {apart[worst]:.1e} apart ({worst})")
    if not all(value <= 0.1 for value in apart.values()):
        raise SystemExit("the answers differ by more than 0.1")
    print(
        f"steady depth {ours['steady_depth_deg']:.2f}, balance {ours['balance_depth_deg']:.2f} deg"
    )
    print(f"Pinocchio {pin.__version__} and SciPy: {1e3 * reference:.2f} ms a study")
    print(f"Plumbfold: {1e3 * seconds:.4f} ms a study")
    print(f"ratio {reference / seconds:.0f}")


if __name__ == "__main__":
    main(sys.argv[1] if len(sys.argv) > 1 else None)
