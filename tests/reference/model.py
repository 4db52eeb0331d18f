"""A plain second reading of the squat model: body, chain of segments, balance, readings.

Written for clarity, apart from the program and without its code, so that the two can be held
against each other. Metres, kilograms, newtons and radians inside; degrees only where a name ends
in `_deg`. Angles may be numpy arrays; everything broadcasts.

Frame: x forward, y up, z to the client's right; origin on the floor under the back of the heel.
Direction at inclination a from the vertical: (sin a, cos a).
"""

import json
from dataclasses import dataclass
from functools import cached_property, lru_cache
from pathlib import Path

import numpy as np

TABLES = json.loads((Path(__file__).parent / "tables.json").read_text())
CONSTANTS = TABLES["constants"]
GRAVITY = 9.80665
LEAN_FLOOR = np.radians(-5.0)
LEAN_DEFAULT_LIMIT_DEG = 85.0
LEAN_LEAST_RISE = 0.2e-3 / np.radians(1.0)  # m of x_com per rad: 0.2 mm per degree
SHANK_FLOOR = np.radians(-10.0)
SHANK_CEILING = np.radians(89.0)
ZONE_TOLERANCE = 1e-4
BEND_DEG = {"KeepSmall": 15.0, "KeepSome": 30.0, "Free": 45.0}
HIP_NOT_MEASURED_DEG = {"m": 95.0, "f": 107.0}
KNEE_NOT_MEASURED_DEG = 140.0
KNEE_TO_WALL_NOT_MEASURED_CM = 10.0
AGE_NOT_GIVEN = 30.0
SEGMENT_TABLES = {
    "DeLeva": "segments",
    "DempsterWinter": "segments_dempster_winter",
    "Dumas": "segments_dumas",
}


# ---- Body ----------------------------------------------------------------------------------


@dataclass(frozen=True)
class Body:
    """Lengths between joint centres (m), body mass and stature; `trunk` is hip to shoulder."""

    sex: str
    age: float
    stature: float
    mass: float
    shank: float
    thigh: float
    trunk: float
    foot: float
    ankle_height: float
    heel_to_ankle: float
    upper_arm: float
    forearm: float
    hand: float
    segments: str

    @property
    def ball(self):
        return CONSTANTS["heel_to_ball"] * self.foot

    @property
    def hip_half_spacing(self):
        return CONSTANTS["hip_half_spacing"] * self.stature

    @property
    def lumbosacral_height(self):
        return CONSTANTS["lumbosacral_height"][self.sex] * self.trunk

    @cached_property
    def table(self):
        return TABLES[SEGMENT_TABLES[self.segments]][self.sex]

    @cached_property
    def masses(self):
        """Kilograms of each part, both sides together, scaled to the body mass."""
        paired = ("thigh", "shank", "foot", "upper_arm", "forearm", "hand")
        parts = {n: row["mass"] * (2 if n in paired else 1) for n, row in self.table.items()}
        whole = sum(parts.values())
        return {n: share / whole * self.mass for n, share in parts.items()}


def length_from_stature(part, sex, stature_m):
    """ln(length mm) = a + b ln(stature mm)."""
    a, b = TABLES["estimate_from_stature"][sex][part]
    return np.exp(a + b * np.log(stature_m * 1000.0)) / 1000.0


def body_of(visit):
    """Landmark lengths as measured, else estimated; then joint centres."""
    sex = "m" if visit["sex_model"] == "Male" else "f"
    stature = visit["stature_cm"] / 100.0

    def length(field, part):
        given = visit["build"].get(field)
        return length_from_stature(part, sex, stature) if given is None else given / 100.0

    foot = length("foot_cm", "foot")
    heel = visit["build"].get("heel_to_ankle_cm")
    upper_arm = length("upper_arm_cm", "upper_arm")
    drop = CONSTANTS["shoulder_centre_below_acromion"] * upper_arm
    age = visit.get("age_years")
    return Body(
        sex=sex,
        age=AGE_NOT_GIVEN if age is None else float(age),
        stature=stature,
        mass=visit["mass_kg"],
        shank=length("shank_cm", "shank"),
        thigh=length("thigh_cm", "thigh"),
        trunk=length("trunk_cm", "trunk") - drop,
        foot=foot,
        ankle_height=length("ankle_height_cm", "malleolus"),
        heel_to_ankle=CONSTANTS["heel_to_ankle"] * foot if heel is None else heel / 100.0,
        upper_arm=upper_arm - drop,
        forearm=length("forearm_cm", "forearm"),
        hand=length("hand_cm", "hand"),
        segments=visit.get("segments", "DeLeva"),
    )


# ---- Ranges of the joints -------------------------------------------------------------------


def lesser_side(entry):
    """The smaller of the sides that were measured, or None."""
    given = [value for value in entry.values() if value is not None]
    return min(given) if given else None


def knee_to_wall_angle(body, wall_cm):
    """Dorsiflexion with the knee's front at the wall: a right triangle over the shank."""
    reach = body.foot + wall_cm / 100.0 - CONSTANTS["knee_front"] * body.stature
    sine = (reach - body.heel_to_ankle) / body.shank
    if abs(sine) > 1.0:
        raise ValueError("knee to wall does not fit the lengths")
    return np.arcsin(sine)


def split(entry):
    """Kind and content of an entry: "NotMeasured" or {"Kind": content}."""
    return (entry, {}) if isinstance(entry, str) else next(iter(entry.items()))


def ankle_limit(body, entry):
    kind, sides = split(entry)
    least = lesser_side(sides)
    if kind == "Degrees" and least is not None:
        return np.radians(least)
    return knee_to_wall_angle(body, KNEE_TO_WALL_NOT_MEASURED_CM if least is None else least)


def hip_limit(body, entry, cap_deg):
    kind, sides = split(entry)
    least = lesser_side(sides)
    if least is None:
        least = HIP_NOT_MEASURED_DEG[body.sex]
    elif kind == "KneeToChest":
        least -= CONSTANTS["knee_to_chest_less"][body.sex]
    return np.radians(least if cap_deg is None else min(least, cap_deg))


def knee_limit(entry, cap_deg):
    _, sides = split(entry)
    least = lesser_side(sides)
    least = KNEE_NOT_MEASURED_DEG if least is None else least
    return np.radians(least if cap_deg is None else min(least, cap_deg))


# ---- Case: one body, one task ---------------------------------------------------------------


@dataclass(frozen=True, eq=False)
class Case:
    """Everything a posture depends on; a memo key by identity."""

    body: Body
    ankle_limit: float
    hip_limit: float
    knee_limit: float
    reach: float
    placement: str
    load: float
    pitch: float
    half_stance: float
    toe_out: float
    bend: float
    lean_limit: float
    fractions: tuple  # edge back, zone back, aim, zone front, edge front
    strength: dict
    rule: tuple  # kind, number
    usual_slope: float

    @cached_property
    def heel_edge(self):
        return self.body.ball * (1.0 - np.cos(self.pitch))

    @cached_property
    def marks(self):
        """x of edge back, zone back, aim, zone front, edge front."""
        span = self.body.foot - self.heel_edge
        return tuple((self.heel_edge + f * span) * np.cos(self.toe_out) for f in self.fractions)

    @cached_property
    def total_mass(self):
        return self.body.mass + self.load


def support_edges(age):
    """Edges for young adults up to 55 years, for older ones from 65, linear between."""
    return (
        float(np.interp(age, [55.0, 65.0], [0.15, 0.26])),
        float(np.interp(age, [55.0, 65.0], [0.80, 0.76])),
    )


def fractions_of(task, age):
    support = task.get("support") or {}
    back, front = support_edges(age)
    given = (support.get("edge_back"), support.get("edge_front"))
    return (
        back if given[0] is None else given[0],
        support.get("zone_back", 0.40),
        support.get("aim", 0.50),
        support.get("zone_front", 0.60),
        front if given[1] is None else given[1],
    )


def usual_slope_of(task):
    """Explicit slope first, then the one of a seen squat (thigh 20 deg or more), then the usual."""
    kind, content = split(task["rule"])
    explicit = content.get("slope") if kind == "Usual" and content else None
    if explicit is not None:
        return explicit
    seen = task.get("seen")
    if seen is not None and seen["thigh_deg"] >= 20.0:
        start = CONSTANTS["usual_shank_at_standing_deg"]
        return float(np.clip((seen["shank_deg"] - start) / seen["thigh_deg"], 0.0, 0.8))
    return CONSTANTS["usual_shank_per_thigh"]


def rule_of(task):
    kind, content = split(task["rule"])
    return (kind, content if kind in ("ArmRatio", "HeldShank") else None)


def case_of(visit, task):
    """Case of one visit and task given with the field names and units of a client file."""
    body = body_of(visit)
    joints, caps = visit["joints"], visit["caps"]
    raised = (task["heel_raise_mm"] + task["footwear_drop_mm"]) / 1000.0
    width = task.get("stance_width_cm")
    lean = task.get("lean_limit_deg")
    bend_kind, bend = split(task["bend"])
    strength = {"ankle": 1.0, "knee": 1.0, "hip": 1.0, "low_back": 1.0} | visit.get("strength", {})
    return Case(
        body=body,
        ankle_limit=ankle_limit(body, joints["ankle"]),
        hip_limit=hip_limit(body, joints["hip"], caps.get("hip_deg")),
        knee_limit=knee_limit(joints["knee"], caps.get("knee_deg")),
        reach=np.radians(joints["reach_limit_deg"]),
        placement=task["placement"],
        load=task["load_kg"],
        pitch=np.arcsin(raised / body.ball),
        half_stance=body.hip_half_spacing if width is None else width / 200.0,
        toe_out=np.radians(task["toe_out_deg"]),
        bend=np.radians(BEND_DEG.get(bend_kind, bend)),
        lean_limit=np.radians(LEAN_DEFAULT_LIMIT_DEG if lean is None else lean),
        fractions=fractions_of(task, body.age),
        strength=strength,
        rule=rule_of(task),
        usual_slope=usual_slope_of(task),
    )


# ---- Legs -----------------------------------------------------------------------------------


def along_foot(case, back_of_ball, height):
    """Place along the foot and above the floor of a point of the foot pitched about the ball."""
    sine, cosine = np.sin(case.pitch), np.cos(case.pitch)
    along = case.body.ball - back_of_ball * cosine + height * sine
    return along, back_of_ball * sine + height * cosine


def side_offset(case, thigh):
    """How far the shank leans sideways out of the foot's plane; it fades with cos^2 of the thigh."""
    body = case.body
    share = body.shank / (body.shank + body.thigh)
    full = (body.hip_half_spacing - case.half_stance) * np.cos(case.toe_out) * share
    return np.where(thigh < np.pi / 2, full * np.cos(thigh) ** 2, 0.0)


def straight_shank(case):
    """Shank angle of the straight leg at thigh 0: sin = offset x tan(toe-out) / length in plane."""
    offset = side_offset(case, 0.0)
    in_plane = np.sqrt(case.body.shank**2 - offset**2)
    return float(np.arcsin(offset * np.tan(case.toe_out) / in_plane))


def legs(case, shank, thigh):
    """Joint places of a leg, true knee flexion, and whether the stance is possible at all."""
    body, turn = case.body, case.toe_out
    ankle_s, ankle_y = along_foot(case, body.ball - body.heel_to_ankle, body.ankle_height)
    offset = side_offset(case, thigh)
    in_plane = np.sqrt(np.maximum(body.shank**2 - offset**2, 0.0))
    forward, up = in_plane * np.sin(shank), in_plane * np.cos(shank)
    knee_x = (ankle_s + forward) * np.cos(turn) - offset * np.sin(turn)
    knee_z = case.half_stance + forward * np.sin(turn) + offset * np.cos(turn)
    across = body.hip_half_spacing - knee_z
    sagittal = np.sqrt(np.maximum(body.thigh**2 - across**2, 0.0))
    shank_line = (knee_x - ankle_s * np.cos(turn), up, knee_z - case.half_stance)
    thigh_line = (-sagittal * np.sin(thigh), sagittal * np.cos(thigh), across)
    return {
        "ankle": (ankle_s * np.cos(turn), ankle_y),
        "knee": (knee_x, ankle_y + up),
        "hip": (knee_x + thigh_line[0], ankle_y + up + thigh_line[1]),
        "knee_z": knee_z,
        "sagittal": sagittal,
        "knee_flexion": angle_between(shank_line, thigh_line),
        "possible": (np.abs(offset) < body.shank) & (np.abs(across) < body.thigh),
    }


def angle_between(a, b):
    """Angle of two space vectors from cross and dot product (exact near 0 and 180 degrees)."""
    cross = (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0])
    dot = a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
    return np.arctan2(np.sqrt(cross[0] ** 2 + cross[1] ** 2 + cross[2] ** 2), dot)


def twist(case, leg, thigh):
    """Angle between where the knees point and where the feet point."""
    sideways = leg["knee_z"] - case.body.hip_half_spacing
    return np.abs(np.arctan2(sideways, leg["sagittal"] * np.sin(thigh)) - case.toe_out)


# ---- Trunk, arms, load ----------------------------------------------------------------------


def direction(angle):
    return np.sin(angle), np.cos(angle)


def step(start, length, angle):
    """The point `length` from `start` at an inclination."""
    x, y = direction(angle)
    return start[0] + length * x, start[1] + length * y


def bend_beyond_hip(case, thigh, lean):
    """What is needed beyond the hip joint's own flexion (works on complex leans, see lean_rise)."""
    over = thigh + lean - case.hip_limit
    return np.where(np.real(over) > 0.0, over, 0.0)


def arm_directions(case, lean):
    """Inclinations of upper arm and forearm."""
    row = TABLES["placements"][case.placement]
    if row["frame"] == "overhead":
        beyond = np.pi - case.reach  # least angle of the arm from the trunk line
        vertical = np.real(-lean) > beyond
        arm = np.where(vertical, 0.0 * lean, lean + beyond)
        return arm, arm
    base = lean if row["frame"] == "trunk" else 0.0 * lean
    return base + np.radians(row["upper_arm"]), base + np.radians(row["forearm"])


def upper(case, thigh, lean):
    """Points and (kilograms, point) masses above the hip, measured from the hip centre."""
    body, rows = case.body, case.body.table
    pelvis_line = lean - bend_beyond_hip(case, thigh, lean)
    hip = (0.0 * lean, 0.0 * lean)
    lumbosacral = step(hip, body.lumbosacral_height, pelvis_line)
    above = body.trunk - body.lumbosacral_height
    shoulder = step(lumbosacral, above, lean)
    upper_arm, forearm = arm_directions(case, lean)
    elbow = step(shoulder, body.upper_arm, upper_arm)
    wrist = step(elbow, body.forearm, forearm)
    thorax_cm = rows["thorax"]["cm"] * body.trunk - body.lumbosacral_height
    head_cm = rows["head"]["above_shoulder"] * body.stature
    kg = body.masses
    masses = {
        "pelvis": (kg["pelvis"], step(hip, rows["pelvis"]["cm"] * body.trunk, pelvis_line)),
        "thorax": (kg["thorax"], step(lumbosacral, thorax_cm, lean)),
        "head": (kg["head"], step(shoulder, head_cm, lean)),
        "upper_arm": (
            kg["upper_arm"],
            step(shoulder, rows["upper_arm"]["cm"] * body.upper_arm, upper_arm),
        ),
        "forearm": (kg["forearm"], step(elbow, rows["forearm"]["cm"] * body.forearm, forearm)),
        "hand": (kg["hand"], step(wrist, rows["hand"]["cm"] * body.hand, forearm)),
        "load": (case.load, load_point(case, shoulder, wrist, lean, forearm)),
    }
    return {"lumbosacral": lumbosacral, "shoulder": shoulder, "masses": masses}


def load_point(case, shoulder, wrist, lean, forearm):
    """In the hands, or at a place on the trunk given along and forward of the trunk line."""
    place = TABLES["placements"][case.placement]["load"]
    if place == "hands":
        return step(wrist, CONSTANTS["grip"] * case.body.hand, forearm)
    along, ahead = (share * case.body.stature for share in place)
    return step(step(shoulder, along, lean), ahead, lean + np.pi / 2)


def upper_moment(case, thigh, lean):
    """Sum of m x above the hip, about the hip centre (kg m)."""
    return sum(m * point[0] for m, point in upper(case, thigh, lean)["masses"].values())


# ---- The whole chain ------------------------------------------------------------------------


def leg_masses(case, leg):
    """(kilograms, point) of both feet, shanks and thighs."""
    body, rows = case.body, case.body.table
    foot_s, foot_y = along_foot(
        case, body.ball - rows["foot"]["cm"] * body.foot, body.ankle_height / 2.0
    )

    def between(start, end, share):
        return tuple(a + share * (b - a) for a, b in zip(start, end))

    return {
        "foot": (body.masses["foot"], (foot_s * np.cos(case.toe_out), foot_y)),
        "shank": (body.masses["shank"], between(leg["knee"], leg["ankle"], rows["shank"]["cm"])),
        "thigh": (body.masses["thigh"], between(leg["hip"], leg["knee"], rows["thigh"]["cm"])),
    }


def place(case, shank, thigh, lean):
    """Joints, masses and COM in the world for any three angles."""
    leg = legs(case, shank, thigh)
    top = upper(case, thigh, lean)
    hip = leg["hip"]

    def from_hip(point):
        return hip[0] + point[0], hip[1] + point[1]

    masses = leg_masses(case, leg)
    masses |= {name: (m, from_hip(point)) for name, (m, point) in top["masses"].items()}
    com = tuple(
        sum(m * point[axis] for m, point in masses.values()) / case.total_mass for axis in (0, 1)
    )
    joints = {name: leg[name] for name in ("ankle", "knee", "hip")}
    joints |= {name: from_hip(top[name]) for name in ("lumbosacral", "shoulder")}
    return {"leg": leg, "joints": joints, "masses": masses, "com": com}


def com_x(case, shank, thigh, lean):
    """x of the COM of body and load, by the sum over every mass."""
    return place(case, shank, thigh, lean)["com"][0]


# ---- Balance --------------------------------------------------------------------------------


def lean_rise(case, thigh, lean):
    """d x_com / d lean in m/rad, by a complex step (exact to rounding)."""
    tiny = 1e-30
    return np.imag(upper_moment(case, thigh, lean + 1j * tiny)) / tiny / case.total_mass


def lean_kinks(case, thigh):
    """Leans at which the rise may jump: bend beyond the hip begins, arms leave the vertical."""
    return [case.hip_limit - thigh, case.reach - np.pi]


def lean_of_least_rise(case, thigh):
    """First lean from the floor up where x_com rises by less than 0.2 mm per degree."""
    ceiling = np.radians(90.0)
    around = [k + d for k in lean_kinks(case, thigh) for d in (-1e-10, 1e-10)]
    grid = np.linspace(LEAN_FLOOR, ceiling, 381)
    grid = np.sort(np.append(grid, [k for k in around if LEAN_FLOOR < k < ceiling]))
    for _ in range(8):
        low = np.flatnonzero(lean_rise(case, thigh, grid) < LEAN_LEAST_RISE)
        if low.size == 0:
            return ceiling
        if low[0] == 0:
            return float(grid[0])
        grid = np.linspace(grid[low[0] - 1], grid[low[0]], 65)
    return float(grid[32])


@lru_cache(maxsize=4096)
def lean_ceiling(case, thigh):
    """Most lean at a thigh angle; below the floor means that the hip refuses the depth."""
    by_hip = case.hip_limit + case.bend - thigh
    if by_hip < LEAN_FLOOR:
        return by_hip
    return min(case.lean_limit, by_hip, lean_of_least_rise(case, thigh))


def com_interval(case, shank, thigh, ceiling):
    """x_com at the least and at the most lean."""
    return com_x(case, shank, thigh, LEAN_FLOOR), com_x(case, shank, thigh, ceiling)


def balanced_lean(case, shank, thigh, ceiling):
    """Lean with the COM on the aim, else the end of the range nearest to it; by halving."""
    shank = np.asarray(shank, dtype=float)
    aim = case.marks[2]
    low, high = np.full(shank.shape, LEAN_FLOOR), np.full(shank.shape, ceiling)
    for _ in range(54):
        middle = 0.5 * (low + high)
        behind = com_x(case, shank, thigh, middle) < aim
        low, high = np.where(behind, middle, low), np.where(behind, high, middle)
    at_floor, at_ceiling = com_interval(case, shank, thigh, ceiling)
    lean = 0.5 * (low + high)
    return np.where(at_floor >= aim, LEAN_FLOOR, np.where(at_ceiling <= aim, ceiling, lean))


# ---- Readings -------------------------------------------------------------------------------


def static_moment(placed, joint, names):
    """g times the sum of m (x - x_joint) over the named masses."""
    x = placed["joints"][joint][0]
    return GRAVITY * sum(placed["masses"][n][0] * (placed["masses"][n][1][0] - x) for n in names)


def demands(case, placed):
    """Extensor demand: ankle, knee and hip per leg, the low back whole (N m)."""
    back = ("thorax", "head", "upper_arm", "forearm", "hand", "load")
    hip = ("pelvis",) + back
    knee = ("thigh",) + hip
    ankle = ("shank",) + knee
    own_axis = 2.0 * np.cos(case.toe_out)
    return {
        "ankle": static_moment(placed, "ankle", ankle) / own_axis,
        "knee": -static_moment(placed, "knee", knee) / own_axis,
        "hip": static_moment(placed, "hip", hip) / 2.0,
        "lumbosacral": static_moment(placed, "lumbosacral", back),
    }


def capacity(body, joint, flexion):
    """What a typical untrained adult of this sex, age and size can hold at a joint angle (N m)."""
    size = body.mass * GRAVITY * body.stature
    if joint == "lumbosacral":
        return TABLES["capacity"][joint][body.sex] * size
    rows = TABLES["capacity"][joint][body.sex]

    def at(row):
        c1, c2, c3, most = rows[row]
        angle = flexion if most is None else np.minimum(flexion, most)
        return c1 * np.cos(c2 * (angle - c3)) * size

    young, older, eldest = at("young"), at("older"), at("eldest")
    to_older = np.clip((body.age - 25.0) / 35.0, 0.0, 1.0)
    to_eldest = np.clip((body.age - 60.0) / 10.0, 0.0, 1.0)
    return young + to_older * (older - young) + to_eldest * (eldest - older)


def efforts(case, demand, flexions):
    """Demand over capacity and over the client's own strength factor."""
    factor = dict(case.strength, lumbosacral=case.strength["low_back"])
    return {
        joint: value / capacity(case.body, joint, flexions[joint]) / factor[joint]
        for joint, value in demand.items()
    }


def readings(case, shank, thigh, lean):
    """Everything read off one posture; radians and metres."""
    placed = place(case, shank, thigh, lean)
    bend = bend_beyond_hip(case, thigh, lean)
    flexions = {
        "ankle": shank - case.pitch,
        "knee": placed["leg"]["knee_flexion"],
        "hip": thigh + lean - bend,
        "lumbosacral": bend,
    }
    demand = demands(case, placed)
    effort = efforts(case, demand, flexions)
    joints, x = placed["joints"], placed["com"][0]
    back, zone_back, _, zone_front, front = case.marks
    return {
        "shank": shank,
        "thigh": thigh,
        "trunk": lean,
        "pelvis": lean - bend,
        "bend": bend,
        "flexions": flexions,
        "joints": joints,
        "com": placed["com"],
        "heel_margin": x - back,
        "toe_margin": front - x,
        "zone": (x - zone_back, zone_front - x),
        "knee_arm": joints["knee"][0] - x,
        "hip_arm": x - joints["hip"][0],
        "moments": demand,
        "effort": effort,
        "cost": sum(e**2 for e in effort.values()),
        "seat_height": joints["hip"][1] - CONSTANTS["hip_above_seat"],
        "twist": twist(case, placed["leg"], thigh),
    }


def kind_of(reading):
    """steady (zone, to 0.1 mm), drifting (support), TipsBack or TipsForward."""
    if min(reading["zone"]) >= -ZONE_TOLERANCE:
        return "steady"
    if reading["heel_margin"] < 0.0:
        return "TipsBack"
    return "drifting" if reading["toe_margin"] >= 0.0 else "TipsForward"
