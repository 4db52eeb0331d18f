"""Which posture at a depth, and how deep: dense scans, refined by zooming in.

Shank angles that a depth allows are one interval. Every rule is a choice by two numbers in order:
first how far the COM is from where it should be, then the rule's own cost. Both are evaluated on
a dense grid of shank angles; each dip is then scanned again, a hundred times finer, until the
grid is at rounding.
"""

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

import model
from model import CONSTANTS, LEAN_FLOOR, SHANK_CEILING, SHANK_FLOOR

GRID = 721
ZOOM = 101
ZOOMS = 5
DEPTH_STEP = np.radians(0.5)
DEPTH_END = np.radians(179.0)
STANDING_END = np.radians(10.0)


# ---- Allowed shank angles -------------------------------------------------------------------


def shank_range(case, thigh):
    """Range before stance and knee are looked at: straight leg to the ankle limit or 89 degrees."""
    low = max(SHANK_FLOOR, model.straight_shank(case) - thigh)
    return low, min(case.ankle_limit + case.pitch, SHANK_CEILING)


def knee_excess(case, shank, thigh):
    """Above zero where the knee refuses: flexion over its limit or thigh folded past the shank."""
    flexion = model.legs(case, shank, thigh)["knee_flexion"]
    return np.maximum(flexion - case.knee_limit, shank + thigh - np.pi)


def open_to(case, shank, thigh):
    """Where stance and knee allow the shank angle."""
    return model.legs(case, shank, thigh)["possible"] & (knee_excess(case, shank, thigh) <= 0.0)


def refine_edge(case, thigh, inside, outside):
    """Edge of the allowed piece between a shank angle inside it and one outside."""
    for _ in range(52):
        middle = 0.5 * (inside + outside)
        if open_to(case, np.array(middle), thigh):
            inside = middle
        else:
            outside = middle
    return inside


def least_excess(case, thigh, grid):
    """Shank angle of least knee excess where the stance is possible, to find very short pieces."""
    for _ in range(ZOOMS):
        excess = knee_excess(case, grid, thigh)
        excess = np.where(model.legs(case, grid, thigh)["possible"], excess, np.inf)
        best = int(np.argmin(excess))
        grid = np.linspace(grid[max(best - 1, 0)], grid[min(best + 1, len(grid) - 1)], ZOOM)
    return grid[ZOOM // 2]


@lru_cache(maxsize=4096)
def allowed(case, thigh):
    """The (upper) interval of shank angles that stance, ankle and knee allow, or None."""
    low, high = shank_range(case, thigh)
    if high < low:
        return None
    grid = np.linspace(low, high, GRID)
    free = open_to(case, grid, thigh)
    if not free.any():
        grid = np.sort(np.append(grid, least_excess(case, thigh, grid)))
        free = open_to(case, grid, thigh)
    if not free.any():
        return None
    last = int(np.flatnonzero(free)[-1])
    shut = np.flatnonzero(~free[:last])
    first = 0 if shut.size == 0 else int(shut[-1]) + 1
    start = grid[0] if first == 0 else refine_edge(case, thigh, grid[first], grid[first - 1])
    end = (
        grid[-1] if last == len(grid) - 1 else refine_edge(case, thigh, grid[last], grid[last + 1])
    )
    return float(start), float(end)


# ---- Refusals -------------------------------------------------------------------------------


def refused_at(case, shank, thigh):
    """What refuses one shank angle before balance, in the order Stance, Ankle, Knee, Hip."""
    leg = model.legs(case, np.array(shank), thigh)
    low, high = shank_range(case, thigh)
    if not leg["possible"]:
        return "Stance"
    if shank > high:
        return "Ankle"
    piece = allowed(case, thigh)
    below = shank < (low if piece is None else piece[0])
    if below or knee_excess(case, np.array(shank), thigh) > 0.0:
        return "Knee"
    return "Hip" if model.lean_ceiling(case, thigh) < LEAN_FLOOR else None


def refused_depth(case, thigh):
    """What refuses a whole depth before balance, in the order Hip, Stance, Ankle, Knee."""
    if model.lean_ceiling(case, thigh) < LEAN_FLOOR:
        return "Hip"
    low, high = shank_range(case, thigh)
    grid = np.linspace(low, high if high >= low else SHANK_CEILING, GRID)
    if not model.legs(case, grid, thigh)["possible"].any():
        return "Stance"
    if high < low:
        return "Ankle"
    return "Knee" if allowed(case, thigh) is None else None


# ---- Choosing -------------------------------------------------------------------------------


def distance(case, shank, thigh, ceiling, back, front):
    """How far the COM stays from the stretch back..front at best; exactly 0 where it reaches it."""
    at_floor, at_ceiling = model.com_interval(case, shank, thigh, ceiling)
    return np.maximum(np.maximum(at_floor - front, back - at_ceiling), 0.0)


def usual_target(case, thigh):
    """The usual shank angle at this depth, no more than the ankle allows."""
    start = np.radians(CONSTANTS["usual_shank_at_standing_deg"])
    return min(start + case.usual_slope * thigh, case.ankle_limit + case.pitch)


def cost(case, shank, thigh, ceiling):
    """The rule's own cost of shank angles: angle off the usual, effort, or arm share off the aim."""
    kind, number = case.rule
    if kind == "Usual":
        return np.abs(shank - usual_target(case, thigh))
    lean = model.balanced_lean(case, shank, thigh, ceiling)
    reading = model.readings(case, shank, thigh, lean)
    if kind == "LeastEffort":
        return reading["cost"]
    if thigh == 0.0:
        return np.abs(reading["hip_arm"])
    arms = reading["hip_arm"] + reading["knee_arm"]
    return np.abs(reading["hip_arm"] / arms - number / (1.0 + number))


def dips(off, own):
    """Indices of grid points no worse than both neighbours by (distance, cost)."""
    last = len(off) - 1

    def worse(i, j):
        return (off[i], own[i]) > (off[j], own[j])

    return [
        i
        for i in range(last + 1)
        if not (i > 0 and worse(i, i - 1)) and not (i < last and worse(i, i + 1))
    ]


@dataclass
class Dip:
    """One local best: shank angle, COM distance, the rule's cost."""

    shank: float
    off: float
    own: float


def zoom(score, low, high):
    """Best point by (distance, cost) in an interval, scanned ever finer about the best."""
    grid = np.linspace(low, high, ZOOM)
    for _ in range(ZOOMS):
        off, own = score(grid)
        best = int(np.lexsort((own, off))[0])
        found = Dip(float(grid[best]), float(off[best]), float(own[best]))
        grid = np.linspace(grid[max(best - 1, 0)], grid[min(best + 1, ZOOM - 1)], ZOOM)
    return found


def choices(case, thigh, ceiling):
    """Every dip of the rule over the allowed shank angles, best first."""
    low, high = allowed(case, thigh)
    _, zone_back, aim, zone_front, _ = case.marks
    back, front = (aim, aim) if case.rule[0] == "LeastEffort" else (zone_back, zone_front)

    def score(shanks):
        off = distance(case, shanks, thigh, ceiling, back, front)
        return off, cost(case, shanks, thigh, ceiling)

    grid = np.linspace(low, high, GRID)
    off, own = score(grid)
    found = [
        zoom(score, grid[max(i - 1, 0)], grid[min(i + 1, GRID - 1)])
        for i in best_dips(dips(off, own), off, own)
    ]
    found.sort(key=lambda dip: (dip.off, dip.own))
    return found, flat_width(grid, off, own, found[0])


def best_dips(places, off, own, most=8):
    """The most promising dips; neighbours of one flat stretch count once."""
    places = sorted(places, key=lambda i: (off[i], own[i]))
    kept = []
    for place in places:
        if all(abs(place - other) > 1 for other in kept):
            kept.append(place)
    return kept[:most]


def flat_width(grid, off, own, best):
    """Width in radians of the shank angles that the rule can hardly tell from the best."""
    near = (off <= best.off + 1e-9) & (own <= best.own * (1.0 + 1e-9) + 1e-12)
    return float(np.ptp(grid[near])) if near.any() else 0.0


# ---- Posture --------------------------------------------------------------------------------


def tipping_place(case, thigh, ceiling):
    """The allowed shank angle whose COM is nearest the support."""
    low, high = allowed(case, thigh)
    back, front = case.marks[0], case.marks[4]

    def score(shanks):
        off = distance(case, shanks, thigh, ceiling, back, front)
        return off, np.zeros_like(off)

    grid = np.linspace(low, high, GRID)
    best = int(np.argmin(score(grid)[0]))
    return zoom(score, grid[max(best - 1, 0)], grid[min(best + 1, GRID - 1)]).shank


def read_at(case, shank, thigh, ceiling):
    """Readings of the balanced posture at one shank angle."""
    lean = float(model.balanced_lean(case, shank, thigh, ceiling))
    return model.readings(case, shank, thigh, lean)


def refusal(reason, tips_by=None):
    return {"kind": "refused", "refused_by": reason, "tips_by": tips_by, "loose": []}


def verdict(reading, loose):
    """A posture with its kind, or the tipping with how far the COM is outside the support."""
    kind = model.kind_of(reading)
    loose = loose + near_edge(reading)
    if kind.startswith("Tips"):
        beyond = -min(reading["heel_margin"], reading["toe_margin"])
        return {**refusal(kind, float(beyond)), "loose": loose}
    return {"kind": kind, "refused_by": None, "reading": reading, "loose": loose}


def near_edge(reading):
    """Reasons to compare kinds loosely: the COM within a micrometre of where the kind changes."""
    found = []
    if abs(min(reading["zone"]) + model.ZONE_TOLERANCE) < 1e-6:
        found.append("COM at the zone's tolerance")
    if abs(min(reading["heel_margin"], reading["toe_margin"])) < 1e-6:
        found.append("COM at the edge of the support")
    return found


def posture(case, thigh):
    """The posture of the task's rule at a thigh angle (rad), or the refusal."""
    if case.rule[0] == "HeldShank":
        return held(case, np.radians(case.rule[1]), thigh)
    reason = refused_depth(case, thigh)
    if reason is not None:
        return refusal(reason)
    ceiling = model.lean_ceiling(case, thigh)
    found, flat = choices(case, thigh, ceiling)
    reading = read_at(case, found[0].shank, thigh, ceiling)
    if model.kind_of(reading).startswith("Tips"):
        shank = tipping_place(case, thigh, ceiling)
        return verdict(read_at(case, shank, thigh, ceiling), [])
    return verdict(reading, ties(found, flat))


def held(case, shank, thigh):
    """The shank angle itself, judged by the refusals and the balance at that angle."""
    reason = refused_at(case, shank, thigh)
    if reason is not None:
        depth_reason = refused_depth(case, thigh)
        differs = depth_reason not in (None, reason)
        loose = [f"the depth as a whole is refused by {depth_reason}"] if differs else []
        return {**refusal(reason), "loose": loose}
    return verdict(read_at(case, shank, thigh, model.lean_ceiling(case, thigh)), [])


def ties(found, flat):
    """Reasons to compare the chosen shank angle loosely."""
    reasons = []
    if flat > np.radians(0.25):
        reasons.append(f"cost flat over {np.degrees(flat):.2f} deg of shank")
    best = found[0]
    for other in found[1:]:
        apart = abs(other.shank - best.shank) > np.radians(0.05)
        close = other.own - best.own < 1e-5 * max(abs(best.own), 1e-2)
        if apart and other.off - best.off < 1e-7 and close:
            reasons.append(f"another dip {np.degrees(other.shank):.4f} deg of shank is as good")
    return reasons


# ---- Depths ---------------------------------------------------------------------------------


def slack(case, thigh, back, front):
    """Greatest margin by which some allowed posture has its COM within back..front; -1 refused."""
    ceiling = model.lean_ceiling(case, thigh)
    piece = allowed(case, thigh)
    if ceiling < LEAN_FLOOR or piece is None:
        return -1.0
    grid = np.linspace(*piece, 65)
    for _ in range(6):
        at_floor, at_ceiling = model.com_interval(case, grid, thigh, ceiling)
        margins = np.minimum(at_ceiling - back, front - at_floor)
        best = int(np.argmax(margins))
        grid = np.linspace(grid[max(best - 1, 0)], grid[min(best + 1, 64)], 65)
        if margins[best] > 0.02:
            break
    return float(margins[best])


def edge_between(free, good, bad):
    """Last thigh angle that is free, between one that is and one that is not; by halving."""
    for _ in range(40):
        middle = 0.5 * (good + bad)
        if free(middle) >= 0.0:
            good = middle
        else:
            bad = middle
    return good


def least_slack(free, start, end):
    """Thigh angle and value of the least slack in an interval, or of the first below zero."""
    grid = np.linspace(start, end, 21)
    for _ in range(3):
        values = [free(thigh) for thigh in grid]
        best = int(np.argmin(values))
        if values[best] < 0.0:
            break
        grid = np.linspace(grid[max(best - 1, 0)], grid[min(best + 1, 20)], 21)
    return float(grid[best if values[best] < 0.0 else 10]), values[best]


def standing(free):
    """Least thigh angle up to 10 degrees with slack, or None."""
    grid = np.linspace(0.0, STANDING_END, 41)
    for before, thigh in zip(np.append(0.0, grid), grid):
        if free(thigh) >= 0.0:
            return 0.0 if thigh == 0.0 else edge_between(free, thigh, before)
    return None


@dataclass
class Depth:
    """Depth in radians or None, and reasons to compare it loosely."""

    thigh: float | None
    loose: list


def depth(case, back, front):
    """Largest thigh angle reached from standing without a gap; None where standing has none."""

    def free(thigh):
        return slack(case, thigh, back, front)

    start = standing(free)
    if start is None:
        return Depth(None, [])
    loose, thighs, values = [], [start], [free(start)]
    while thighs[-1] + DEPTH_STEP < DEPTH_END:
        thighs.append(thighs[-1] + DEPTH_STEP)
        values.append(free(thighs[-1]))
        if values[-1] < 0.0:
            return Depth(edge_between(free, thighs[-2], thighs[-1]), loose)
        if len(values) > 2 and values[-2] <= min(values[-3], values[-1]) and values[-2] < 0.01:
            place, least = least_slack(free, thighs[-3], thighs[-1])
            if abs(least) < 2e-5:
                loose.append(f"a dip to {least:.1e} m of slack at {np.degrees(place):.2f} deg")
            if least < 0.0:
                return Depth(edge_between(free, thighs[-3], place), loose)
    return Depth(thighs[-1], loose)


def depths(case):
    """Steady depth and balance depth."""
    edge_back, zone_back, _, zone_front, edge_front = case.marks
    return depth(case, zone_back, zone_front), depth(case, edge_back, edge_front)
