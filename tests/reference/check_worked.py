"""Holds this reference against the worked clients: NAME.ron files and figures.json.

    python check_worked.py ../worked

Prints the largest difference of each quantity and every one over its tolerance.
"""

import json
import sys
from pathlib import Path

import numpy as np

import model
import ron
import rules

ANGLES = {f"{name}_deg": name for name in ("shank", "trunk", "pelvis", "bend")}
FLEXIONS = {"ankle_deg": "ankle", "knee_flexion_deg": "knee", "hip_flexion_deg": "hip"}
LENGTHS = ("heel_margin", "toe_margin", "knee_arm", "hip_arm", "seat_height")


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
    angle = 0.05 if expected["kind"] == "steady" else 0.3
    for key, name in ANGLES.items():
        report.compare(where, key, np.degrees(reading[name]), expected[key], angle)
    for key, name in FLEXIONS.items():
        report.compare(where, key, np.degrees(reading["flexions"][name]), expected[key], angle)
    for key in LENGTHS:
        report.compare(where, key, reading[key], expected[key], 5e-4)
    points = {f"joints.{name}": reading["joints"][name] for name in expected["joints"]}
    points["com"] = reading["com"]
    expected_points = {f"joints.{name}": point for name, point in expected["joints"].items()}
    expected_points["com"] = expected["com"]
    for key, point in points.items():
        for axis in (0, 1):
            report.compare(where, f"{key}[{axis}]", point[axis], expected_points[key][axis], 5e-4)
    for group in ("moments", "effort"):
        for joint, value in expected[group].items():
            room = max(0.005 * abs(value), 6e-5)
            report.compare(where, f"{group}.{joint}", reading[group][joint], value, room)
    steady = model.kind_of(reading) == "steady"
    report.compare(where, "steady", float(steady), float(expected["kind"] == "steady"), 0.0)


def check(report, name, client, expected):
    visit = client["visits"][-1]
    case = model.case_of(visit, visit["tasks"][0])
    body = expected["body"]
    for key, value in (("ankle_limit_deg", case.ankle_limit), ("hip_limit_deg", case.hip_limit)):
        report.compare(name, key, np.degrees(value), body[key], 0.05)
    report.compare(name, "trunk", case.body.trunk, body["trunk"], 5e-4)
    for key, value in zip(("steady_depth_deg", "balance_depth_deg"), rules.depths(case)):
        report.compare(name, key, np.degrees(value.thigh), expected[key], 0.1)
    for key in ("at_goal", "at_60"):
        one = expected[key]
        found = rules.posture(case, np.radians(one["thigh_deg"]))
        compare_posture(report, f"{name} {key}", found["reading"], one)
    one = expected["held_shank_at_60"]
    held = rules.held(case, np.radians(one["shank_deg"]), np.radians(one["thigh_deg"]))
    compare_posture(report, f"{name} held", held["reading"], one)


def main(folder):
    report = Report()
    for name, expected in json.loads((folder / "figures.json").read_text())["clients"].items():
        check(report, name, ron.read((folder / f"{name}.ron").read_text()), expected)
    report.show()
    return bool(report.over)


if __name__ == "__main__":
    sys.exit(main(Path(sys.argv[1])))
