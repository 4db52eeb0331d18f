"""Random but valid clients, as plain dicts with the field names and units of a client file."""

import numpy as np

import model

PLACEMENTS = list(model.TABLES["placements"])
RULES = ("Usual", "LeastEffort", "ArmRatio", "HeldShank")
SEGMENTS = list(model.SEGMENT_TABLES)
# Fields of `build`: the part of the estimate, smallest and largest entry in cm.
BUILD = {
    "shank_cm": ("shank", 20.0, 65.0),
    "thigh_cm": ("thigh", 20.0, 65.0),
    "trunk_cm": ("trunk", 25.0, 75.0),
    "foot_cm": ("foot", 14.0, 36.0),
    "ankle_height_cm": ("malleolus", 3.0, 14.0),
    "heel_to_ankle_cm": ("foot", 2.0, 12.0),
    "upper_arm_cm": ("upper_arm", 15.0, 50.0),
    "forearm_cm": ("forearm", 12.0, 40.0),
    "hand_cm": ("hand", 10.0, 27.0),
}


class Dice:
    """Draws rounded to what a person would type."""

    def __init__(self, seed):
        self.rng = np.random.default_rng(seed)

    def chance(self, share):
        return bool(self.rng.random() < share)

    def pick(self, options):
        return options[int(self.rng.integers(len(options)))]

    def between(self, low, high, digits=1):
        return round(float(self.rng.uniform(low, high)), digits)

    def near(self, middle, spread, low, high, digits=1):
        value = self.rng.normal(middle, spread)
        return round(float(np.clip(value, low, high)), digits)

    def maybe(self, share, draw):
        return draw() if self.chance(share) else None


def build(dice, sex, stature_cm):
    """Each length measured in half of the clients, within about 6 % of the average."""

    def length(field):
        part, low, high = BUILD[field]
        average = 100.0 * model.length_from_stature(part, sex, stature_cm / 100.0)
        average *= model.CONSTANTS["heel_to_ankle"] if field == "heel_to_ankle_cm" else 1.0
        return dice.near(average, 0.06 * average, low, high)

    return {field: length(field) if dice.chance(0.5) else None for field in BUILD}


def sides(dice, names, middle, spread, low, high):
    """Both sides, or one of them only."""
    values = [dice.near(middle, spread, low, high) for _ in names]
    missing = int(dice.rng.integers(6))
    return {n: None if at == missing else v for at, (n, v) in enumerate(zip(names, values))}


def joints(dice):
    """Every kind of entry for ankle, hip and knee, one-sided ones included."""
    left_right = ("left", "right")
    ankles = [
        "NotMeasured",
        {"KneeToWall": sides(dice, ("left_cm", "right_cm"), 9.0, 5.0, -6.0, 22.0)},
        {"KneeToWall": sides(dice, ("left_cm", "right_cm"), 9.0, 5.0, -6.0, 22.0)},
        {"Degrees": sides(dice, left_right, 33.0, 11.0, -5.0, 60.0)},
    ]
    hips = ["NotMeasured"] + [
        {kind: sides(dice, left_right, middle, 13.0, 45.0, 165.0)}
        for kind, middle in (("PelvisHeld", 98.0), ("RockBack", 99.0), ("KneeToChest", 115.0))
    ]
    knees = ["NotMeasured", {"Degrees": sides(dice, left_right, 135.0, 16.0, 40.0, 170.0)}]
    return {
        "ankle": dice.pick(ankles),
        "hip": dice.pick(hips),
        "knee": dice.pick(knees),
        "reach_limit_deg": dice.near(195.0, 22.0, 110.0, 260.0),
    }


def rule(dice, kind):
    if kind == "Usual":
        return {"Usual": {"slope": dice.maybe(0.3, lambda: dice.between(0.0, 0.9, 2))}}
    if kind == "ArmRatio":
        return {"ArmRatio": dice.between(0.3, 5.0, 2)}
    if kind == "HeldShank":
        return {"HeldShank": dice.near(20.0, 11.0, -10.0, 60.0)}
    return kind


def seen(dice):
    return {
        "thigh_deg": dice.between(8.0, 100.0),
        "shank_deg": dice.between(2.0, 45.0),
        "trunk_deg": dice.between(10.0, 65.0),
        "heels_lifted": dice.chance(0.2),
        "pain_0_10": dice.maybe(0.5, lambda: int(dice.rng.integers(11))),
        "pain_from_thigh_deg": None,
        "stopped_by": dice.pick([None, "Pain", "Effort", "Balance", "Stiffness", "Confidence"]),
    }


def support(dice, age):
    """Custom fractions in rising order, with edges given or left to the age."""
    back, front = model.support_edges(age)
    zone_back = dice.between(back + 0.05, 0.44, 2)
    zone_front = dice.between(0.54, front - 0.05, 2)
    return {
        "edge_back": dice.maybe(0.5, lambda: dice.between(0.02, zone_back - 0.04, 2)),
        "zone_back": zone_back,
        "aim": dice.between(zone_back + 0.02, zone_front - 0.02, 2),
        "zone_front": zone_front,
        "edge_front": dice.maybe(0.5, lambda: dice.between(zone_front + 0.04, 0.98, 2)),
    }


def load(dice, placement):
    """None in a third; bars heavier than what is held in front."""
    heavy = {"HighBar": 120.0, "LowBar": 120.0, "FrontRack": 120.0, "AtSides": 120.0}
    most = heavy.get(placement, 60.0 if dice.chance(0.3) else 20.0)
    return 0.0 if dice.chance(0.33) else dice.between(0.5, most)


def task(dice, placement, kind, age):
    """One task; more than half of the stances of their own width."""
    wide = dice.chance(0.6)
    drawn = {
        "name": "main",
        "placement": placement,
        "load_kg": load(dice, placement),
        "footwear_drop_mm": dice.between(0.0, 25.0) if dice.chance(0.3) else 0.0,
        "heel_raise_mm": dice.between(0.0, 50.0) if dice.chance(0.3) else 0.0,
        "stance_width_cm": dice.near(34.0, 17.0, 5.0, 80.0) if wide else None,
        "toe_out_deg": dice.between(-10.0, 45.0) if dice.chance(0.7) else 0.0,
        "bend": dice.pick(["KeepSmall", "KeepSome", "Free", {"Degrees": dice.between(0.0, 80.0)}]),
        "lean_limit_deg": dice.maybe(0.3, lambda: dice.between(15.0, 80.0)),
        "goal_thigh_deg": dice.between(0.0, 130.0),
        "weight_left_percent": None,
        "rule": rule(dice, kind),
        "seen": dice.maybe(0.35, lambda: seen(dice)),
    }
    if dice.chance(0.2):
        drawn["support"] = support(dice, age)
    return drawn


def make_hard(dice, visit):
    """Turns a client into one whose stance is very wide, or whose hips and bend are small."""
    chosen = visit["tasks"][0]
    if dice.chance(0.5):
        chosen["stance_width_cm"] = dice.between(60.0, 115.0)
        chosen["toe_out_deg"] = dice.between(20.0, 45.0)
        return
    limit = dice.between(45.0, 80.0)
    visit["joints"]["hip"] = {"PelvisHeld": {"left": limit, "right": limit}}
    chosen["bend"] = {"Degrees": dice.between(0.0, 15.0)}


def caps(dice, load_kg):
    return {
        "knee_deg": dice.maybe(0.15, lambda: dice.between(60.0, 130.0)),
        "hip_deg": dice.maybe(0.15, lambda: dice.between(60.0, 120.0)),
        "load_kg": dice.maybe(0.15, lambda: round(load_kg + dice.between(0.0, 20.0), 1)),
        "source": "",
    }


def drawn_client(dice, number):
    """One client; placement, rule, sex and segment table go round by number."""
    sex = ("m", "f")[number // 32 % 2]
    placement = PLACEMENTS[number % 8]
    kind = RULES[number // 8 % 4]
    age = dice.maybe(0.95, lambda: int(dice.rng.integers(15, 81)))
    stature = dice.near(176.0 if sex == "m" else 163.0, 8.0, 140.0, 210.0)
    chosen = task(dice, placement, kind, model.AGE_NOT_GIVEN if age is None else age)
    visit = {
        "date": "2026-11-03",
        "sex_model": "Male" if sex == "m" else "Female",
        "age_years": age,
        "stature_cm": stature,
        "mass_kg": dice.near(24.5 * (stature / 100.0) ** 2, 12.0, 38.0, 150.0),
        "scope": [],
        "build": build(dice, sex, stature),
        "joints": joints(dice),
        "caps": caps(dice, chosen["load_kg"]),
        "segments": SEGMENTS[number % 3],
        "strength": {j: dice.between(0.4, 2.5, 2) for j in ("ankle", "knee", "hip", "low_back")}
        if dice.chance(0.3)
        else {"ankle": 1.0, "knee": 1.0, "hip": 1.0, "low_back": 1.0},
        "tasks": [chosen],
        "note": "",
    }
    if dice.chance(0.2):
        make_hard(dice, visit)
    return {"format": 1, "code": f"reference-{number:03d}", "visits": [visit]}


def valid(client):
    """Knee to wall fits the lengths and the ankle limit is one that could be typed as degrees."""
    visit = client["visits"][0]
    try:
        case = model.case_of(visit, visit["tasks"][0])
    except ValueError:
        return False
    return -10.0 <= np.degrees(case.ankle_limit) <= 60.0


def clients(seed, count):
    """The seeded clients, redrawn where the drawn one is not valid."""
    dice, found = Dice(seed), []
    while len(found) < count:
        client = drawn_client(dice, len(found))
        if valid(client):
            found.append(client)
    return found
