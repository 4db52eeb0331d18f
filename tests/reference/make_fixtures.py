"""Writes clients.json: random clients with the results of this reference.

    python make_fixtures.py [COUNT]

The header holds seed, package versions and the SHA-256 of every file the numbers come from, so
that a test can tell when a script changed and the fixture did not.
"""

import hashlib
import json
import platform
import sys
from collections import Counter
from pathlib import Path

import numpy as np
import scipy

import model
import random_clients
import ron
import rules

SEED = 20261103
COUNT = 240
DIGITS = 7
HERE = Path(__file__).parent
SOURCES = (
    "make_fixtures.py",
    "model.py",
    "random_clients.py",
    "ron.py",
    "rules.py",
    "tables.json",
)
MAIN_JOINTS = ("ankle", "knee", "hip", "lumbosacral", "shoulder")


def rounded(value):
    """Plain floats to 1e-7, through lists and dicts."""
    if isinstance(value, dict):
        return {key: rounded(item) for key, item in value.items()}
    if isinstance(value, (list, tuple)):
        return [rounded(item) for item in value]
    if isinstance(value, (float, np.floating, np.ndarray)):
        return round(float(value), DIGITS) + 0.0
    return value


def degrees(angle):
    return None if angle is None else np.degrees(angle)


def figures(reading):
    """Readings under the names of the program's figures; degrees, metres, newton metres."""
    flexions, knee_arm = reading["flexions"], reading["knee_arm"]
    return {
        "shank_deg": degrees(reading["shank"]),
        "trunk_deg": degrees(reading["trunk"]),
        "pelvis_deg": degrees(reading["pelvis"]),
        "bend_deg": degrees(reading["bend"]),
        "ankle_deg": degrees(flexions["ankle"]),
        "knee_flexion_deg": degrees(flexions["knee"]),
        "hip_flexion_deg": degrees(flexions["hip"]),
        "com": reading["com"],
        "heel_margin": reading["heel_margin"],
        "toe_margin": reading["toe_margin"],
        "zone": reading["zone"],
        "knee_arm": knee_arm,
        "hip_arm": reading["hip_arm"],
        "ratio": None if abs(knee_arm) < 1e-3 else reading["hip_arm"] / knee_arm,
        "moments": reading["moments"],
        "effort": reading["effort"],
        "cost": reading["cost"],
        "joints": {name: reading["joints"][name] for name in MAIN_JOINTS},
        "seat_height": reading["seat_height"],
        "twist_deg": degrees(reading["twist"]),
    }


def result_at(case, thigh_deg):
    """What the rule gives at one thigh angle."""
    found = rules.posture(case, np.radians(thigh_deg))
    result = {"thigh_deg": thigh_deg, "kind": found["kind"], "refused_by": found["refused_by"]}
    if found["kind"] == "refused":
        result["tips_by"] = found["tips_by"]
    else:
        result |= figures(found["reading"])
    return result | marked(found["loose"])


def marked(reasons):
    return {"loose": True, "why": "; ".join(reasons)} if reasons else {}


def body_numbers(case):
    body = case.body
    return {
        "trunk": body.trunk,
        "shank": body.shank,
        "thigh": body.thigh,
        "foot": body.foot,
        "ankle_limit_deg": degrees(case.ankle_limit),
        "hip_limit_deg": degrees(case.hip_limit),
        "knee_limit_deg": degrees(case.knee_limit),
        "mass": body.mass,
        "stature": body.stature,
    }


def check_depths_agree(case, steady, results):
    """A rule that chooses is steady everywhere from standing to the steady depth."""
    if steady is None or case.rule[0] == "HeldShank":
        return
    for result in results:
        if 10.0 < result["thigh_deg"] < np.degrees(steady) - 1e-6:
            assert result["kind"] == "steady", result


def fixture(client):
    """One line of the file."""
    visit = client["visits"][0]
    text = ron.write(client)
    assert ron.read(text) == client, client["code"]
    case = model.case_of(visit, visit["tasks"][0])
    steady, balance = rules.depths(case)
    thighs = (0.0, 30.0, 60.0, visit["tasks"][0]["goal_thigh_deg"])
    results = [result_at(case, thigh) for thigh in thighs]
    check_depths_agree(case, steady.thigh, results)
    return {
        "client": client,
        "ron": text,
        "body": rounded(body_numbers(case)),
        "steady_depth_deg": rounded(degrees(steady.thigh)),
        "balance_depth_deg": rounded(degrees(balance.thigh)),
        "depths": marked(steady.loose + balance.loose),
        "results": rounded(results),
    }


def header(count):
    return {
        "seed": SEED,
        "count": count,
        "python": platform.python_version(),
        "numpy": np.__version__,
        "scipy": scipy.__version__,
        "sha256": {n: hashlib.sha256((HERE / n).read_bytes()).hexdigest() for n in SOURCES},
    }


def summary(fixtures):
    results = [r for f in fixtures for r in f["results"]]
    yield Counter(r["refused_by"] or r["kind"] for r in results)
    yield {"loose results": sum("loose" in r for r in results)}
    yield {"loose depths": sum(bool(f["depths"]) for f in fixtures)}
    yield {"no depth": sum(f["steady_depth_deg"] is None for f in fixtures)}


def main(count):
    fixtures = []
    for client in random_clients.clients(SEED, count):
        fixtures.append(fixture(client))
    lines = [json.dumps(f, separators=(",", ":"), allow_nan=False) for f in fixtures]
    head = json.dumps(header(count), separators=(",", ":"))
    text = '{"header":' + head + ',\n"clients":[\n' + ",\n".join(lines) + "\n]}\n"
    (HERE / "clients.json").write_text(text)
    for line in summary(fixtures):
        print(line)


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else COUNT)
