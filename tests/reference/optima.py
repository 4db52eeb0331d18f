"""Writes optima.json: depths, least effort and least amounts by SciPy's general optimisers.

    python optima.py [COUNT]

Each question is put as it stands, angles and amounts all free at once, to `minimize` (SLSQP) from
several starts:

- depth: the largest thigh angle with the centre of mass between two marks on the floor;
- least effort at a depth: the least sum of squared efforts with the centre of mass on the aim;
- what it would take: the least amount of one change with which the goal is steady; where none is
  enough, the greatest depth anywhere in the amount's range.

SLSQP knows nothing of gaps on the way down and may stop at a local optimum. So every depth is
also walked to from standing, half a degree at a time, with `minimize_scalar` for the shank angle and
`brentq` for the end; every least effort is also looked for by `minimize_scalar` over short
pieces of shank angles; and every least amount is proved by the walk. Where the two ways are more
than 0.001 degrees of depth apart, or a gap stands in the way, the line says so in `loose` and
the walk counts.
"""

import math
import sys
from collections import Counter
from dataclasses import replace
from itertools import pairwise

import numpy as np
import scipy
from scipy.optimize import brentq, minimize, minimize_scalar

import chain
import random_clients
import ron
from fixture import digits, drawn, header, write

SEED = 20261109
COUNT = 64
SOURCES = ("optima.py",)
SHANK_FROM, SHANK_TO = math.radians(-10.0), math.radians(89.0)
LEAST_RISE = 0.0002 * 180.0 / math.pi  # m per rad
RIGHT = math.pi / 2
METRE = 10.0  # metres against radians in a vector of margins
EASY = 1e-9  # a margin this little below zero is rounding
KINDS = ("HeelRaise", "WiderStance", "Counterweight", "Ankle", "Hip")


# ---- What must hold ---------------------------------------------------------------------------


def com_x(c, legs, thigh, lean):
    """x of the COM above standing legs."""
    foot, ankle, knee, hip = legs
    kg, cm = c.kg, c.cm
    thigh_x = hip[0] + cm["thigh"] * (knee[0] - hip[0])
    shank_x = knee[0] + cm["shank"] * (ankle[0] - knee[0])
    low = 2.0 * (kg["foot"] * foot[0] + kg["shank"] * shank_x + kg["thigh"] * thigh_x)
    masses, _ = chain.above_hip(c, thigh, lean)
    return (low + sum(m * (hip[0] + x) for m, x, _ in masses)) / c.whole


def rise(c, thigh, lean):
    """How fast the COM moves forward with the lean, m/rad: what turns swings about its pivot."""
    masses, low = chain.above_hip(c, thigh, lean)
    bent = thigh + lean > c.hip_to
    pivot = low[1] if bent else 0.0
    shoulder = low[1] + (c.trunk - c.low_back) * math.cos(lean)
    row = chain.TABLES["placements"][c.placement]
    turns = row["frame"] == "trunk" or (row["frame"] == "overhead" and lean > c.reach - math.pi)
    moved = 0.0 if bent else masses[0][0] * masses[0][2]
    for at, (m, _, y) in enumerate(masses[1:], 1):
        swings = turns or at in (1, 2) or (at == 6 and row["load"] != "hands")
        moved += m * ((y if swings else shoulder) - pivot)
    return moved / c.whole


def lean_end(c, thigh):
    """Most lean: the limit, hip and bend, and where leaning further hardly helps any more."""
    by_hip = c.hip_to + c.bend - thigh
    if by_hip < chain.LEAN_FROM:
        return by_hip
    end = min(c.lean_to, by_hip)

    def spare(lean):
        return rise(c, thigh, lean) - LEAST_RISE

    kinks = [k + d for k in (c.hip_to - thigh, c.reach - math.pi) for d in (0.0, 1e-12)]
    stops = sorted([k for k in kinks if chain.LEAN_FROM < k < end])
    stops = [chain.LEAN_FROM, *stops, end]
    for start, stop in pairwise(stops):
        steps = max(1, math.ceil((stop - start) / math.radians(6.0)))
        leans = [start + (stop - start) * k / steps for k in range(steps + 1)]
        for before, lean in pairwise(leans):
            if spare(before) < 0.0:
                return before
            if spare(lean) < 0.0:
                return brentq(spare, before, lean, xtol=1e-14)
    return end


def straight(c):
    """Shank angle of the straight leg."""
    o = chain.side(c, 0.0)
    return math.asin(o * math.tan(c.toe_out) / math.sqrt(c.shank**2 - o**2))


def leg_margins(c, legs, shank, thigh):
    """Knee, folding, and both ends of the shank's range, rad."""
    _, ankle, knee, hip = legs
    return [
        c.knee_to - chain.knee_flexion(ankle, knee, hip),
        math.pi - shank - thigh,
        shank - max(SHANK_FROM, straight(c) - thigh),
        min(c.ankle_to + c.pitch, SHANK_TO) - shank,
    ]


def margins(c, back, front, angles):
    """Everything that must not be negative at three free angles, in one vector."""
    shank, thigh, lean = angles
    legs = chain.leg(c, shank, thigh)
    if legs is None:
        return np.full(10, -1.0)
    x = com_x(c, legs, thigh, lean)
    reach = c.thigh - abs(c.hip_z - legs[2][2])
    return np.array(
        [
            METRE * (x - back),
            METRE * (front - x),
            METRE * reach,
            METRE * (rise(c, thigh, lean) - LEAST_RISE),
            c.hip_to + c.bend - thigh - lean,
            c.lean_to - lean,
            *leg_margins(c, legs, shank, thigh),
        ]
    )


# ---- Depth, walked to ---------------------------------------------------------------------------


def margin_at(c, shank, thigh, end, back, front):
    """Least margin at a shank angle with the best lean for it."""
    legs = chain.leg(c, shank, thigh)
    if legs is None:
        return -1.0
    most = com_x(c, legs, thigh, end) - back
    least = front - com_x(c, legs, thigh, chain.LEAN_FROM)
    return min(most, least, *leg_margins(c, legs, shank, thigh)[:2])


def best_shank(c, thigh, back, front, near=None):
    """(margin, shank) where the least margin is greatest; any shank that is free with `near`."""
    end = lean_end(c, thigh)
    low = max(SHANK_FROM, straight(c) - thigh)
    high = min(c.ankle_to + c.pitch, SHANK_TO)
    if end < chain.LEAN_FROM or high < low:
        return max(min(end - chain.LEAN_FROM, high - low), -1.0), low

    def short(shank):
        return -margin_at(c, shank, thigh, end, back, front)

    if near is not None:
        shank = min(max(near, low), high)
        # freely in: no need to look for the best
        if short(shank) <= -1e-4:
            return -short(shank), shank
    ends = np.linspace(low, high, 7)
    found = [(-short(s), s) for s in ends]
    at = max(range(7), key=lambda k: found[k][0])
    pieces = [(ends[k], ends[k + 1]) for k in {max(at - 1, 0), min(at, 5)}]
    # a narrow piece lies between the marks of a wide range: look about the shank of the depth before
    pieces += [] if near is None else [(max(near - 0.02, low), min(near + 0.02, high))]
    for piece in pieces:
        if piece[0] < piece[1]:
            options = {"xatol": 1e-12}
            top = minimize_scalar(short, bounds=piece, method="bounded", options=options)
            found.append((-top.fun, top.x))
    return max(found)


def walked(c, back, front):
    """Depth from standing without a gap, and the shank there; None: no standing."""

    def room(thigh, near=None):
        return best_shank(c, thigh, back, front, near)[0] + EASY

    thigh = next((t for t in np.radians(np.arange(0.0, 10.01, 0.25)) if room(t) >= 0.0), None)
    if thigh is None:
        return None, None
    shank = best_shank(c, thigh, back, front)[1]
    step = math.radians(0.5)
    while thigh + step < math.pi:
        margin, next_shank = best_shank(c, thigh + step, back, front, shank)
        if margin + EASY < 0.0:
            thigh = brentq(lambda t, s=shank: room(t, s), thigh, thigh + step, xtol=1e-12)
            return thigh, best_shank(c, thigh, back, front, shank)[1]
        thigh, shank = thigh + step, next_shank
    return math.pi, shank


# ---- The optimisers -----------------------------------------------------------------------------


def slsqp(goal, start, bounds, hold, on=None):
    """One run; None where it did not end at a place where everything holds."""
    must = [{"type": "ineq", "fun": hold}]
    must += [{"type": "eq", "fun": on}] if on else []
    found = minimize(
        goal,
        start,
        method="SLSQP",
        bounds=bounds,
        constraints=must,
        options={"ftol": 1e-13, "maxiter": 300},
    )
    if hold(found.x).min() < -1e-7 or (on and abs(on(found.x)) > 1e-7):
        return None
    return found.x


def starts(c, thigh, shank):
    """Shanks about a good one, each with a low, middle and high lean."""
    end = max(lean_end(c, thigh), chain.LEAN_FROM)
    for s in (shank, shank - 0.05, shank + 0.05):
        for share in (0.98, 0.6, 0.2):
            yield s, chain.LEAN_FROM + share * (end - chain.LEAN_FROM)


ANGLES = [(SHANK_FROM, SHANK_TO), (0.0, math.pi), (chain.LEAN_FROM, RIGHT)]


def deepest(c, marks, near, shank):
    """Largest thigh angle by SLSQP from several starts around a walked depth."""
    best = None
    for s, lean in starts(c, max(near - 0.05, 0.0), shank):
        x = slsqp(
            lambda a: -a[1],
            [s, max(near - 0.05, 0.0), lean],
            ANGLES,
            lambda a: margins(c, *marks, a),
        )
        if x is not None and (best is None or x[1] > best):
            best = x[1]
    return best


def depth(c, marks):
    """Depth in degrees, and what makes it loose."""
    walk, shank = walked(c, *marks)
    if walk is None:
        return None, None, []
    found = deepest(c, marks, walk, shank)
    if found is None:
        return walk, shank, ["no optimum found"]
    apart = math.degrees(found - walk)
    if abs(apart) > 1e-3:
        return walk, shank, [f"the optimiser ends {apart:+.4f} deg of the walk"]
    return max(found, walk), shank, []


# ---- Effort -------------------------------------------------------------------------------------


def capacity(c, joint, flexion):
    size = c.mass * chain.G * c.stature
    rows = chain.TABLES["capacity"][joint][c.sex]
    if joint == "lumbosacral":
        return rows * size

    def fitted(row):
        c1, c2, c3, end = rows[row]
        return c1 * math.cos(c2 * ((flexion if end is None else min(flexion, end)) - c3)) * size

    ages = [25.0, 60.0, 70.0]
    return float(np.interp(c.age, ages, [fitted(r) for r in ("young", "older", "eldest")]))


def effort(c, shank, thigh, lean):
    """Sum of squared efforts of ankle, knee, hip and low back."""
    w = chain.weigh(c, shank, thigh, lean)
    bent = {"ankle": 0.0, "knee": w["knee_flexion"], "hip": w["hip_flexion"], "lumbosacral": 0.0}
    own = {**c.strength, "lumbosacral": c.strength["low_back"]}
    return sum((w["moments"][j] / capacity(c, j, bent[j]) / own[j]) ** 2 for j in bent)


def least_effort(c, thigh):
    """(effort, shank) with the COM on the aim; None where it cannot be brought there."""
    aim = c.on_floor(c.fractions[2])
    margin, best = best_shank(c, thigh, aim, aim)
    if margin < 1e-4:
        return None
    end = lean_end(c, thigh)
    low = max(SHANK_FROM, straight(c) - thigh)
    high = min(c.ankle_to + c.pitch, SHANK_TO)

    def free(shank):
        return margin_at(c, shank, thigh, end, aim, aim)

    ends = [brentq(free, e, best) if free(e) < 0.0 else e for e in (low, high)]

    def lean_at(shank):
        legs = chain.leg(c, shank, thigh)

        def miss(lean):
            return com_x(c, legs, thigh, lean) - aim

        # at the very ends the aim is reached to rounding only
        if miss(chain.LEAN_FROM) >= 0.0:
            return chain.LEAN_FROM
        return end if miss(end) <= 0.0 else brentq(miss, chain.LEAN_FROM, end, xtol=1e-14)

    found = []
    pieces = np.linspace(*ends, 13)
    for a, b in pairwise(pieces):
        options = {"xatol": 1e-11}
        one = minimize_scalar(
            lambda s: effort(c, s, thigh, lean_at(s)),
            bounds=(a, b),
            method="bounded",
            options=options,
        )
        found += [(one.fun, one.x), (effort(c, a, thigh, lean_at(a)), a)]
    found.append((effort(c, ends[1], thigh, lean_at(ends[1])), ends[1]))
    # and with both angles free; then brought back to the aim exactly
    for start in np.linspace(*ends, 5):
        x = slsqp(
            lambda a: effort(c, a[0], thigh, a[1]),
            [start, lean_at(start)],
            [ANGLES[0], ANGLES[2]],
            lambda a: margins(c, aim - 1.0, aim + 1.0, [a[0], thigh, a[1]]),
            lambda a: METRE * (com_x(c, chain.leg(c, a[0], thigh), thigh, a[1]) - aim),
        )
        if x is not None:
            shank = min(max(x[0], ends[0]), ends[1])
            found.append((effort(c, shank, thigh, lean_at(shank)), shank))
    return min(found)


# ---- What it would take -------------------------------------------------------------------------


def changed(c, kind, amount):
    """The chain after a change by an amount in mm, cm, kg or degrees."""
    if kind == "HeelRaise":
        raised = c.ball * math.sin(c.pitch) + amount / 1000.0
        return replace(c, pitch=math.asin(raised / c.ball))
    if kind == "WiderStance":
        out = math.degrees(c.toe_out)
        out = max(out, min(out + 0.5 * amount, 35.0))
        return replace(c, half_stance=c.half_stance + amount / 200.0, toe_out=math.radians(out))
    if kind == "Counterweight":
        return replace(c, placement="ArmsForward", load=amount)
    more = math.radians(amount)
    if kind == "Ankle":
        return replace(c, ankle_to=c.ankle_to + more)
    return replace(c, hip_to=c.hip_to + more)


def usual_shank(c, slope, thigh):
    start = math.radians(chain.FIXED["usual_shank_at_standing_deg"])
    return min(start + slope * thigh, c.ankle_to + c.pitch)


def open_shanks(c, thigh, low, high):
    """The upper piece of shank angles that stance and knee allow, or None."""

    def free(shank):
        legs = chain.leg(c, shank, thigh)
        return -1.0 if legs is None else min(leg_margins(c, legs, shank, thigh)[:2])

    grid = list(np.linspace(high, low, 121))
    top = next((k for k, s in enumerate(grid) if free(s) >= 0.0), None)
    if top is None:
        return None
    end = next((k for k in range(top, 121) if free(grid[k]) < 0.0), None)
    upper = grid[0] if top == 0 else brentq(free, grid[top], grid[top - 1], xtol=1e-13)
    lower = grid[-1] if end is None else brentq(free, grid[end - 1], grid[end], xtol=1e-13)
    return lower, upper


def usual_at(c, slope, thigh):
    """The usual shank angle among those with the COM nearest the zone; None where none is free."""
    back, front = marks(c)[0]
    end = lean_end(c, thigh)
    low = max(SHANK_FROM, straight(c) - thigh)
    high = min(c.ankle_to + c.pitch, SHANK_TO)
    piece = open_shanks(c, thigh, low, high) if end >= chain.LEAN_FROM and high >= low else None
    if piece is None:
        return None

    def inside(shank):
        legs = chain.leg(c, shank, thigh)
        if legs is None:
            return -1.0
        most = com_x(c, legs, thigh, end) - back
        return min(most, front - com_x(c, legs, thigh, chain.LEAN_FROM))

    grid = np.linspace(*piece, 13)
    at = max(range(13), key=lambda k: inside(grid[k]))
    around = (grid[max(at - 1, 0)], grid[min(at + 1, 12)])
    best = grid[at]
    if around[0] < around[1]:
        options = {"xatol": 1e-12}
        found = minimize_scalar(
            lambda s: -inside(s), bounds=around, method="bounded", options=options
        )
        best = max((inside(s), s) for s in (best, found.x))[1]
    if inside(best) <= 0.0:
        return best
    wish = min(max(usual_shank(c, slope, thigh), piece[0]), piece[1])
    return wish if inside(wish) >= 0.0 else brentq(inside, wish, best)


def twist(c, slope, thigh):
    """How far knees point from feet in the usual posture; NaN where there is none."""
    shank = usual_at(c, slope, thigh)
    legs = None if shank is None else chain.leg(c, shank, thigh)
    if legs is None:
        return math.nan
    _, _, knee, hip = legs
    return abs(math.atan2(knee[2] - hip[2], knee[0] - hip[0]) - c.toe_out)


def widest(c, slope, goal):
    """Most widening in cm: to 0.36 of stature, and no further than knees and feet point together."""
    most = max(100.0 * (0.36 * c.stature - 2.0 * c.half_stance), 0.0)
    if goal < math.radians(30.0) or most == 0.0:
        return most

    def over(cm):
        value = twist(changed(c, "WiderStance", cm), slope, goal)
        return 1.0 if math.isnan(value) else value - math.radians(15.0)

    if over(most) <= 0.0:
        return most
    steps = np.linspace(0.0, most, 41)
    for below, above in reversed(list(pairwise(steps))):
        if over(below) <= 0.0:
            return brentq(over, below, above, xtol=1e-10)
    return 0.0


def marks(c):
    """Back and front of the zone, and of the support."""
    edge_back, zone_back, _, zone_front, edge_front = (c.on_floor(f) for f in c.fractions)
    return (zone_back, zone_front), (edge_back, edge_front)


def amount_starts(c, kind, most, goal):
    for share in (0.05, 0.3, 0.55, 0.8, 1.0):
        c2 = changed(c, kind, share * most)
        _, shank = best_shank(c2, goal, *marks(c2)[0])
        end = max(lean_end(c2, goal), chain.LEAN_FROM)
        yield share, shank, end


def reaches(c, goal):
    """Whether the walk gets to the goal, to a millionth of a degree."""
    walk, _ = walked(c, *marks(c)[0])
    return walk is not None and walk >= goal - math.radians(1e-5)


def least_amount(c, kind, most, goal):
    """Least share of a range with which the goal holds, all at once; None where none does."""

    def hold(a):
        c2 = changed(c, kind, a[0] * most)
        return margins(c2, *marks(c2)[0], [a[1], goal, a[2]])

    bounds = [(0.0, 1.0), ANGLES[0], ANGLES[2]]
    found = []
    for share, shank, lean in amount_starts(c, kind, most, goal):
        x = slsqp(lambda a: a[0], [share, shank, lean], bounds, hold)
        found += [x[0]] if x is not None else []
    return min(found, default=None)


def greatest_depth(c, kind, most):
    """Greatest steady depth anywhere in a range; None where nowhere is any."""
    found = []
    bounds = [(0.0, 1.0), *ANGLES]

    def hold(a):
        c2 = changed(c, kind, a[0] * most)
        return margins(c2, *marks(c2)[0], a[1:])

    for share in (0.0, 0.25, 0.5, 0.75, 1.0):
        c2 = changed(c, kind, share * most)
        walk, shank = walked(c2, *marks(c2)[0])
        if walk is None:
            continue
        found.append((walk, share))
        x = slsqp(
            lambda a: -a[2], [share, shank, walk - 0.02, lean_end(c2, walk - 0.02)], bounds, hold
        )
        if x is not None:
            found.append((x[2], x[0]))
    if not found:
        return None
    best, share = max(found)
    c2 = changed(c, kind, share * most)
    walk, _ = walked(c2, *marks(c2)[0])
    if walk is None or abs(walk - best) > math.radians(1e-3):
        # a gap stands before it, or not even standing is steady there: only the walk tells
        best = greatest_walk(c, kind, most)
    return best


def greatest_walk(c, kind, most):
    """Greatest depth walked to in a range: samples, then a bounded search about the best."""

    def short(share):
        c2 = changed(c, kind, share * most)
        return -(walked(c2, *marks(c2)[0])[0] or 0.0)

    shares = np.linspace(0.0, 1.0, 21)
    depths = [short(s) for s in shares]
    at = int(np.argmin(depths))
    around = (shares[max(at - 1, 0)], shares[min(at + 1, 20)])
    found = minimize_scalar(short, bounds=around, method="bounded", options={"xatol": 1e-7})
    return -min(found.fun, depths[at])


def take(c, kind, slope, goal, caps):
    """What one change would take."""
    most = {"HeelRaise": 50.0, "Counterweight": 10.0, "Ankle": 10.0, "Hip": 10.0}.get(kind)
    if kind == "WiderStance":
        most = widest(c, slope, goal)
    if kind == "Counterweight" and caps.get("load_kg") is not None:
        most = min(most, caps["load_kg"])
    if kind == "Hip" and caps.get("hip_deg") is not None:
        most = min(most, max(caps["hip_deg"] - math.degrees(c.hip_to), 0.0))
    line = {"most": most, "enough": None, "depth_deg": None, "loose": []}
    if reaches(changed(c, kind, 0.0), goal):
        return {**line, "enough": 0.0}
    share = least_amount(c, kind, most, goal) if most > 1e-9 else None
    if share is not None:
        if not reaches(changed(c, kind, min(share + 1e-7, 1.0) * most), goal):
            line["loose"] = ["a gap stands before the goal"]
        return {**line, "enough": share * most}
    greatest = greatest_depth(c, kind, most)
    return {**line, "depth_deg": None if greatest is None else math.degrees(greatest)}


# ---- The file -----------------------------------------------------------------------------------


def prepared(client, dice):
    """A client with the usual posture and a goal near its own depth; None where it has no depth."""
    task = client["visits"][0]["tasks"][0]
    if chain.entry(task["rule"])[0] != "Usual":
        task["rule"] = {"Usual": {"slope": dice.between(0.1, 0.6, 2)}}
    c = chain.chain_of(client["visits"][0], task)
    walk, _ = walked(c, *marks(c)[0])
    beyond = dice.between(-2.0, 16.0)
    if walk is None or math.degrees(walk) < 12.0:
        return None
    task["goal_thigh_deg"] = round(min(max(math.degrees(walk) + beyond, 5.0), 138.0), 1)
    return c


def slope_of(task):
    """Explicit, else from the squat seen from 20 degrees on, else the usual."""
    explicit = task["rule"]["Usual"]["slope"]
    if explicit is not None:
        return explicit
    seen = task.get("seen")
    if seen is None or seen["thigh_deg"] < 20.0:
        return chain.FIXED["usual_shank_per_thigh"]
    start = chain.FIXED["usual_shank_at_standing_deg"]
    return min(max((seen["shank_deg"] - start) / seen["thigh_deg"], 0.0), 0.8)


def case(client, c):
    visit = client["visits"][0]
    task = visit["tasks"][0]
    goal = math.radians(task["goal_thigh_deg"])
    (steady, _, loose), (balance, _, more) = (depth(c, m) for m in marks(c))
    efforts = []
    for degrees in sorted({20.0, 60.0, round(0.9 * math.degrees(steady), 1)}):
        found = least_effort(c, math.radians(degrees))
        if found is not None:
            efforts.append(
                {"thigh_deg": degrees, "effort": found[0], "shank_deg": math.degrees(found[1])}
            )
    slope = slope_of(task)
    takes = {kind: take(c, kind, slope, goal, visit["caps"]) for kind in KINDS}
    return {
        "code": client["code"],
        "ron": ron.write(client).strip(),
        "steady_depth_deg": digits(math.degrees(steady), 10),
        "balance_depth_deg": digits(math.degrees(balance), 10),
        "loose": loose + more,
        "least_effort": [{k: digits(v, 10) for k, v in e.items()} for e in efforts],
        "takes": {
            kind: {
                k: v if v is None or isinstance(v, list) else digits(v, 10) for k, v in t.items()
            }
            for kind, t in takes.items()
        },
    }


def kinds(line):
    yield from (["loose depth"] if line["loose"] else [])
    yield from ["least effort" for _ in line["least_effort"]]
    for kind, t in line["takes"].items():
        yield f"{kind}, " + (
            "not by itself"
            if t["enough"] is None
            else "enough"
            if t["enough"]
            else "nothing needed"
        )
        yield from (["loose amount"] if t["loose"] else [])


def main(count):
    dice = random_clients.Dice(SEED + 1)
    lines, covered = [], Counter()
    for client in drawn(SEED, 2 * count):
        c = prepared(client, dice)
        if c is None or len(lines) == count:
            continue
        lines.append(case(client, c))
        covered.update(kinds(lines[-1]))
        print(
            lines[-1]["code"],
            lines[-1]["loose"],
            [t["loose"] for t in lines[-1]["takes"].values() if t["loose"]],
            flush=True,
        )
    packages = {"scipy": scipy.__version__, "numpy": np.__version__}
    head = header(SOURCES, SEED, len(lines), packages)
    head["covered"] = dict(sorted(covered.items()))
    write("optima.json", head, lines)
    print(dict(sorted(covered.items())))


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else COUNT)
