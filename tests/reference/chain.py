"""A third reading of the squat model, for the checks from outside: lengths, masses, ranges, points.

Shared by statics.py (rigid-body engines), optima.py (general optimisers) and speed.py. It uses
neither the program nor model.py: plain `math`, one number at a time, points in space (x forward,
y up, z to the client's right; metres, kilograms, radians). statics.py holds every number that it
gives against two rigid-body engines.
"""

import json
import math
from dataclasses import dataclass
from pathlib import Path

TABLES = json.loads((Path(__file__).parent / "tables.json").read_text())
FIXED = TABLES["constants"]
G = 9.80665
SEGMENTS = {
    "DeLeva": "segments",
    "DempsterWinter": "segments_dempster_winter",
    "Dumas": "segments_dumas",
}
BENDS = {"KeepSmall": 15.0, "KeepSome": 30.0, "Free": 45.0}
LEAN_FROM = math.radians(-5.0)
LEAN_TO = math.radians(85.0)


@dataclass
class Chain:
    """One client at one task. `kg` is the mass of one part (one leg, one arm), `cm` its place."""

    sex: str
    age: float
    stature: float
    mass: float
    shank: float
    thigh: float
    trunk: float  # hip centre to shoulder centre
    foot: float
    ankle_height: float
    heel_to_ankle: float
    upper_arm: float  # shoulder centre to elbow
    forearm: float
    hand: float
    kg: dict
    cm: dict
    ankle_to: float  # limits
    hip_to: float
    knee_to: float
    reach: float
    bend: float
    lean_to: float
    placement: str
    load: float
    pitch: float
    half_stance: float
    toe_out: float
    fractions: tuple  # edge back, zone back, aim, zone front, edge front
    strength: dict
    heavier: float  # share of the weight on the leg that carries more

    @property
    def ball(self):
        return FIXED["heel_to_ball"] * self.foot

    @property
    def hip_z(self):
        return FIXED["hip_half_spacing"] * self.stature

    @property
    def low_back(self):
        return FIXED["lumbosacral_height"][self.sex] * self.trunk

    @property
    def whole(self):
        return self.mass + self.load

    def on_floor(self, fraction):
        """x of a fraction of the foot, from the edge the raised heel stands on."""
        heel = self.ball - self.ball * math.cos(self.pitch)
        return (heel + fraction * (self.foot - heel)) * math.cos(self.toe_out)


def from_stature(part, sex, stature):
    a, b = TABLES["estimate_from_stature"][sex][part]
    return math.exp(a + b * math.log(1000.0 * stature)) / 1000.0


def entry(value):
    """An enum of a client file as its name and its content."""
    if isinstance(value, str):
        return value, None
    ((name, content),) = value.items()
    return name, content


def least(sides):
    """The lesser of the sides that were measured."""
    numbers = [v for v in (sides or {}).values() if v is not None]
    return min(numbers) if numbers else None


def segment_rows(sex, table):
    """Mass of each part as a share of the body and the place of its centre of mass."""
    rows = TABLES[SEGMENTS[table]][sex]
    single = ("pelvis", "thorax", "head")
    whole = sum(row["mass"] * (1 if part in single else 2) for part, row in rows.items())
    share = {part: row["mass"] / whole for part, row in rows.items()}
    place = {part: row["above_shoulder" if part == "head" else "cm"] for part, row in rows.items()}
    return share, place


def ankle_range(joints, foot, heel_to_ankle, shank, stature):
    name, sides = entry(joints["ankle"])
    smaller = least(sides)
    if name == "Degrees" and smaller is not None:
        return math.radians(smaller)
    # a distance that does not fit foot and shank is an input error, on whichever side
    walls = [v for v in (sides or {}).values() if v is not None] or [10.0]
    ahead = [foot + wall / 100.0 - FIXED["knee_front"] * stature - heel_to_ankle for wall in walls]
    return min(math.asin(x / shank) for x in ahead)


def hip_range(joints, sex, cap):
    name, sides = entry(joints["hip"])
    smaller = least(sides)
    if smaller is None:
        smaller = {"m": 95.0, "f": 107.0}[sex]
    elif name == "KneeToChest":
        smaller -= FIXED["knee_to_chest_less"][sex]
    return math.radians(smaller if cap is None else min(smaller, cap))


def knee_range(joints, cap):
    smaller = least(entry(joints["knee"])[1])
    smaller = 140.0 if smaller is None else smaller
    return math.radians(smaller if cap is None else min(smaller, cap))


def support(task, age):
    """Fractions of the foot; the edges move in linearly between 55 and 65 years."""
    own = task.get("support") or {}
    old = min(max((age - 55.0) / 10.0, 0.0), 1.0)
    back, front = own.get("edge_back"), own.get("edge_front")
    return (
        0.15 + old * (0.26 - 0.15) if back is None else back,
        own.get("zone_back", 0.40),
        own.get("aim", 0.50),
        own.get("zone_front", 0.60),
        0.80 + old * (0.76 - 0.80) if front is None else front,
    )


def chain_of(visit, task):
    """From the fields of a client file."""
    sex = {"Male": "m", "Female": "f"}[visit["sex_model"]]
    stature, build = visit["stature_cm"] / 100.0, visit["build"]

    def length(field, part):
        typed = build.get(field)
        return from_stature(part, sex, stature) if typed is None else typed / 100.0

    foot, shank = length("foot_cm", "foot"), length("shank_cm", "shank")
    heel = build.get("heel_to_ankle_cm")
    heel = FIXED["heel_to_ankle"] * foot if heel is None else heel / 100.0
    arm = length("upper_arm_cm", "upper_arm")
    below_acromion = FIXED["shoulder_centre_below_acromion"] * arm
    share, place = segment_rows(sex, visit.get("segments", "DeLeva"))
    joints, caps = visit["joints"], visit["caps"]
    age = 30.0 if visit.get("age_years") is None else float(visit["age_years"])
    width, lean = task.get("stance_width_cm"), task.get("lean_limit_deg")
    raised = (task["heel_raise_mm"] + task["footwear_drop_mm"]) / 1000.0
    bend, chosen = entry(task["bend"])
    left = task.get("weight_left_percent")
    even = {"ankle": 1.0, "knee": 1.0, "hip": 1.0, "low_back": 1.0}
    return Chain(
        sex=sex,
        age=age,
        stature=stature,
        mass=visit["mass_kg"],
        shank=shank,
        thigh=length("thigh_cm", "thigh"),
        trunk=length("trunk_cm", "trunk") - below_acromion,
        foot=foot,
        ankle_height=length("ankle_height_cm", "malleolus"),
        heel_to_ankle=heel,
        upper_arm=arm - below_acromion,
        forearm=length("forearm_cm", "forearm"),
        hand=length("hand_cm", "hand"),
        kg={part: s * visit["mass_kg"] for part, s in share.items()},
        cm=place,
        ankle_to=ankle_range(joints, foot, heel, shank, stature),
        hip_to=hip_range(joints, sex, caps.get("hip_deg")),
        knee_to=knee_range(joints, caps.get("knee_deg")),
        reach=math.radians(joints["reach_limit_deg"]),
        bend=math.radians(BENDS[bend] if chosen is None else chosen),
        lean_to=LEAN_TO if lean is None else math.radians(lean),
        placement=task["placement"],
        load=task["load_kg"],
        pitch=math.asin(raised / (FIXED["heel_to_ball"] * foot)),
        half_stance=FIXED["hip_half_spacing"] * stature if width is None else width / 200.0,
        toe_out=math.radians(task["toe_out_deg"]),
        fractions=support(task, age),
        strength={**even, **visit.get("strength", {})},
        heavier=0.5 if left is None else max(left, 100.0 - left) / 100.0,
    )


# ---- Points ---------------------------------------------------------------------------------


def pitched(c, behind_ball, above_sole):
    """Along the foot from its heel and above the floor, of a point of the foot about its ball."""
    s, k = math.sin(c.pitch), math.cos(c.pitch)
    return c.ball - behind_ball * k + above_sole * s, behind_ball * s + above_sole * k


def side(c, thigh):
    """How far the shank stands out of the foot's plane."""
    if thigh >= math.pi / 2:
        return 0.0
    straight = (c.hip_z - c.half_stance) * math.cos(c.toe_out) * c.shank / (c.shank + c.thigh)
    return straight * math.cos(thigh) ** 2


def leg(c, shank, thigh):
    """Foot's centre, ankle, knee and hip of the right leg in space; None: it cannot span."""
    out, k = math.sin(c.toe_out), math.cos(c.toe_out)
    s, up = pitched(c, c.ball - c.heel_to_ankle, c.ankle_height)
    foot_s, foot_up = pitched(c, c.ball - c.cm["foot"] * c.foot, c.ankle_height / 2.0)
    ankle = (s * k, up, c.half_stance)
    foot = (foot_s * k, foot_up, c.half_stance + (foot_s - s) * out)
    o = side(c, thigh)
    in_plane = c.shank**2 - o**2
    if in_plane <= 0.0:
        return None
    ahead, rise = math.sqrt(in_plane) * math.sin(shank), math.sqrt(in_plane) * math.cos(shank)
    knee = (ankle[0] + ahead * k - o * out, up + rise, ankle[2] + ahead * out + o * k)
    across = c.hip_z - knee[2]
    in_view = c.thigh**2 - across**2
    if in_view <= 0.0:
        return None
    span = math.sqrt(in_view)
    hip = (knee[0] - span * math.sin(thigh), knee[1] + span * math.cos(thigh), c.hip_z)
    return foot, ankle, knee, hip


def knee_flexion(ankle, knee, hip):
    """Angle between the lines of shank and thigh in space."""
    a = [q - p for p, q in zip(ankle, knee)]
    b = [q - p for p, q in zip(knee, hip)]
    cross = math.hypot(
        a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]
    )
    return math.atan2(cross, sum(p * q for p, q in zip(a, b)))


def bend_of(c, thigh, lean):
    return max(0.0, thigh + lean - c.hip_to)


def arms(c, lean):
    """Inclinations of upper arm and forearm."""
    row = TABLES["placements"][c.placement]
    if row["frame"] == "overhead":
        arm = lean + max(-lean, -(c.reach - math.pi))
        return arm, arm
    base = lean if row["frame"] == "trunk" else 0.0
    return base + math.radians(row["upper_arm"]), base + math.radians(row["forearm"])


def off(point, length, inclination):
    return point[0] + length * math.sin(inclination), point[1] + length * math.cos(inclination)


def above_hip(c, thigh, lean):
    """(kg, x, y) of every mass above the hip line, pelvis first, and L5/S1, from the hip line."""
    pelvis_line = lean - bend_of(c, thigh, lean)
    hip = (0.0, 0.0)
    low = off(hip, c.low_back, pelvis_line)
    shoulder = off(low, c.trunk - c.low_back, lean)
    upper, fore = arms(c, lean)
    elbow = off(shoulder, c.upper_arm, upper)
    wrist = off(elbow, c.forearm, fore)
    where = TABLES["placements"][c.placement]["load"]
    if where == "hands":
        load = off(wrist, FIXED["grip"] * c.hand, fore)
    else:
        along = off(shoulder, where[0] * c.stature, lean)
        load = off(along, where[1] * c.stature, lean + math.pi / 2)
    kg, cm = c.kg, c.cm
    masses = [
        (kg["pelvis"], off(hip, cm["pelvis"] * c.trunk, pelvis_line)),
        (kg["thorax"], off(low, cm["thorax"] * c.trunk - c.low_back, lean)),
        (kg["head"], off(shoulder, cm["head"] * c.stature, lean)),
        (2.0 * kg["upper_arm"], off(shoulder, cm["upper_arm"] * c.upper_arm, upper)),
        (2.0 * kg["forearm"], off(elbow, cm["forearm"] * c.forearm, fore)),
        (2.0 * kg["hand"], off(wrist, cm["hand"] * c.hand, fore)),
        (c.load, load),
    ]
    return [(m, p[0], p[1]) for m, p in masses], low


def weigh(c, shank, thigh, lean):
    """COM, moments and points by plain sums; None where the legs cannot span the stance."""
    points = leg(c, shank, thigh)
    if points is None:
        return None
    foot, ankle, knee, hip = points
    masses, low = above_hip(c, thigh, lean)
    top = [(m, hip[0] + x, hip[1] + y) for m, x, y in masses]

    def towards(start, end, share):
        return tuple(p + share * (q - p) for p, q in zip(start[:2], end[:2]))

    thighs = (2.0 * c.kg["thigh"], *towards(hip, knee, c.cm["thigh"]))
    shanks = (2.0 * c.kg["shank"], *towards(knee, ankle, c.cm["shank"]))
    feet = (2.0 * c.kg["foot"], *foot[:2])
    every = [feet, shanks, thighs, *top]

    def about(x, parts):
        return G * sum(m * (at - x) for m, at, _ in parts)

    own = 2.0 * c.heavier
    turned = 2.0 * math.cos(c.toe_out)
    return {
        "com": tuple(sum(p[0] * p[axis] for p in every) / c.whole for axis in (1, 2)),
        "moments": {
            "ankle": own * about(ankle[0], [shanks, thighs, *top]) / turned,
            "knee": -own * about(knee[0], [thighs, *top]) / turned,
            "hip": own * about(hip[0], top) / 2.0,
            "lumbosacral": about(hip[0] + low[0], top[1:]),
        },
        "ankle": ankle,
        "knee": knee,
        "hip": hip,
        "knee_flexion": knee_flexion(ankle, knee, hip),
        "hip_flexion": thigh + lean - bend_of(c, thigh, lean),
    }
