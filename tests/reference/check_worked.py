"""Holds this reference against a folder of worked cases: NAME.ron files and expected.json.

    python check_worked.py FOLDER

Prints the largest difference of each quantity and every one over its tolerance.
"""

import json
import sys
from pathlib import Path

import numpy as np

import model
import ron
import rules

ANGLES = {"shank": "shank", "thigh": "thigh", "trunk": "trunk", "pelvis": "pelvis", "bend": "bend"}
FLEXIONS = {"ankle": "ankle", "knee_flexion": "knee", "hip_flexion": "hip"}
JOINTS = {"ankle_pt": "ankle", "knee": "knee", "hip": "hip", "shoulder": "shoulder"}
LENGTHS = ("heel_margin", "toe_margin", "knee_arm", "hip_arm")


class Report:
    """Collects differences and keeps the largest of each quantity."""

    def __init__(self):
        self.worst, self.over = {}, []

    def compare(self, where, quantity, ours, expected, tolerance):
        off = abs(ours - expected)
        self.worst[quantity] = max(self.worst.get(quantity, 0.0), off)
        if not off <= tolerance:
            self.over.append(f"{where} {quantity}: here {ours:.5f}, expected {expected}")

    def show(self):
        for quantity, off in sorted(self.worst.items()):
            print(f"{quantity:24s} largest difference {off:.6f}")
        print("\n".join(self.over) if self.over else "everything within tolerance")


def compare_posture(report, where, reading, expected):
    """Angles to 0.05 deg (0.3 where drifting), lengths to 0.5 mm, moments to 0.5 %."""
    angle = 0.05 if expected["steady"] else 0.3
    for key, name in ANGLES.items():
        report.compare(where, key, np.degrees(reading[name]), expected[key], angle)
    for key, name in FLEXIONS.items():
        report.compare(where, key, np.degrees(reading["flexions"][name]), expected[key], angle)
    for key in LENGTHS:
        report.compare(where, key, reading[key], expected[key], 5e-4)
    report.compare(where, "seat", reading["seat_height"], expected["seat"], 5e-4)
    points = {key: reading["joints"][name] for key, name in JOINTS.items()} | {
        "com": reading["com"]
    }
    for key, point in points.items():
        for axis in (0, 1):
            report.compare(where, f"{key}[{axis}]", point[axis], expected[key][axis], 5e-4)
    for side in (0, 1):
        report.compare(where, f"zone[{side}]", reading["zone"][side], expected["zone"][side], 5e-4)
    for group in ("moments", "effort"):
        for joint, value in expected[group].items():
            room = max(0.005 * abs(value), 6e-5)
            report.compare(where, f"{group}.{joint}", reading[group][joint], value, room)
    report.compare(where, "cost", reading["cost"], expected["cost"], 0.005)
    steady = model.kind_of(reading) == "steady"
    report.compare(where, "steady", float(steady), float(expected["steady"]), 0.0)


def check(report, name, client, expected):
    visit = client["visits"][-1]
    case = model.case_of(visit, visit["tasks"][0])
    for key, value in (("ankle_limit_deg", case.ankle_limit), ("hip_limit_deg", case.hip_limit)):
        report.compare(name, key, np.degrees(value), expected[key], 0.05)
    report.compare(name, "T_m", case.body.trunk, expected["T_m"], 5e-4)
    for key, value in zip(("steady_depth_deg", "balance_depth_deg"), rules.depths(case)):
        report.compare(name, key, np.degrees(value.thigh), expected[key], 0.1)
    at_goal = rules.posture(case, np.radians(expected["thigh_deg"]))
    compare_posture(report, f"{name} goal", at_goal["reading"], expected["posture"])
    at_sixty = rules.posture(case, np.radians(60.0))
    compare_posture(report, f"{name} 60", at_sixty["reading"], expected["rule_at_60"])
    one = expected["held_shank_at_60"]
    held = rules.held(case, np.radians(one["shank_deg"]), np.radians(60.0))
    if held["refused_by"] != one["refused_by"]:
        report.over.append(f"{name} held: here {held['refused_by']}, expected {one['refused_by']}")
    elif one["posture"] is not None:
        compare_posture(report, f"{name} held", held["reading"], one["posture"])


def main(folder):
    report = Report()
    for name, expected in json.loads((folder / "expected.json").read_text()).items():
        check(report, name, ron.read((folder / f"{name}.ron").read_text()), expected)
    report.show()
    return bool(report.over)


if __name__ == "__main__":
    sys.exit(main(Path(sys.argv[1])))
