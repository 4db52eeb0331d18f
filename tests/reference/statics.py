"""Writes statics.json: centre of mass and static joint torques by two rigid-body engines.

    python statics.py [COUNT]

Every client becomes a two-legged body in space, in Pinocchio and in MuJoCo: a free pelvis, two legs
of ball joints with their true lengths, feet turned out and pitched, a hinge at L5/S1, arms, load.
The pose is set by joint angles, and the ground pushes up under each foot, on the foot's own line,
level with the centre of mass. What is written are the engines' own centre of mass and joint
torques. Before that is done for a client, these must hold, or the run stops:

- both engines agree to 1e-9, and with the plain sums of chain.py;
- the legs close: each foot comes to stand on the floor where the model puts it;
- nothing is left over at the free pelvis: the whole body is in balance over the ground's push.

From torques to the model's quantities: hip per leg and L5/S1 are the torques about the mediolateral
axis; the ankle's is the one about the joint's own axis, which stands square to the foot; the
knee's is the one whose mediolateral part is the engine's. Where the shank leans in the foot's own
plane the two ways are the same, and that is checked too. The leg that carries the share p of the
weight has 2 p times the even demand.

The clients are drawn by random_clients.py, the postures here: any shank, thigh and trunk angle
that the legs can span, in balance or not.
"""

import math
import sys
from collections import Counter

import mujoco
import numpy as np
import pinocchio as pin

import chain
import random_clients
import ron
from fixture import digits, drawn, header, write

SEED = 20261107
COUNT = 400
AGREE = 1e-9
SOURCES = ("statics.py",)
SHOULDER_HALF = 0.11  # of stature; no torque about a mediolateral axis depends on it
SIDES = {"right": 1.0, "left": -1.0}


# ---- The body, once for both engines --------------------------------------------------------


class Part:
    """A rigid part: its parent, where its joint sits in the parent's frame, kind, mass, centre."""

    def __init__(self, name, parent, at, kind, kg, centre, rest):
        self.name, self.parent, self.kind = name, parent, kind
        self.at, self.centre = np.array(at), np.array(centre)
        self.kg, self.rest = kg, rest  # rest: orientation in the world of this posture


def turn_z(inclination):
    """Rotation that brings the upward axis to an inclination, forward positive."""
    s, k = math.sin(inclination), math.cos(inclination)
    return np.array([[k, s, 0.0], [-s, k, 0.0], [0.0, 0.0, 1.0]])


def along(direction, forward):
    """Rotation whose downward axis is a direction in space; x stays near `forward`."""
    y = -np.array(direction) / np.linalg.norm(direction)
    x = np.array(forward) - np.dot(forward, y) * y
    x /= np.linalg.norm(x)
    return np.column_stack([x, y, np.cross(x, y)])


def parts(c, shank, thigh, lean):
    """Parts from the pelvis outward with their orientations in this posture."""
    _, ankle, knee, hip = chain.leg(c, shank, thigh)
    bend = chain.bend_of(c, thigh, lean)
    pelvis, upright = turn_z(lean - bend), turn_z(lean)
    found = [
        Part(
            "pelvis",
            None,
            hip[:2] + (0.0,),
            "free",
            c.kg["pelvis"],
            (0, c.cm["pelvis"] * c.trunk, 0),
            pelvis,
        )
    ]
    above = c.trunk - c.low_back
    thorax_centre = (0, c.cm["thorax"] * c.trunk - c.low_back, 0)
    found.append(
        Part(
            "thorax", "pelvis", (0, c.low_back, 0), "hinge", c.kg["thorax"], thorax_centre, upright
        )
    )
    head = (0, c.cm["head"] * c.stature, 0)
    found.append(Part("head", "thorax", (0, above, 0), "fixed", c.kg["head"], head, upright))
    where = chain.TABLES["placements"][c.placement]["load"]
    in_hands = where == "hands"
    if c.load > 0.0 and not in_hands:
        spot = (where[1] * c.stature, above + where[0] * c.stature, 0)
        found.append(Part("load", "thorax", spot, "fixed", c.load, (0, 0, 0), upright))
    for name, z in SIDES.items():
        found += arm(c, name, z, above, lean, c.load / 2.0 if in_hands else 0.0)
        found += lower(c, name, z, ankle, knee, hip)
    return found


def arm(c, name, z, above, lean, in_hand):
    """Upper arm, and forearm with the hand; the far end is up their own axis."""
    upper, fore = (turn_z(a) for a in chain.arms(c, lean))
    at = (0, above, z * SHOULDER_HALF * c.stature)
    yield Part(
        f"{name} upper arm",
        "thorax",
        at,
        "hinge",
        c.kg["upper_arm"],
        (0, c.cm["upper_arm"] * c.upper_arm, 0),
        upper,
    )
    yield Part(
        f"{name} forearm",
        f"{name} upper arm",
        (0, c.upper_arm, 0),
        "hinge",
        c.kg["forearm"],
        (0, c.cm["forearm"] * c.forearm, 0),
        fore,
    )
    yield Part(
        f"{name} hand",
        f"{name} forearm",
        (0, c.forearm, 0),
        "fixed",
        c.kg["hand"],
        (0, c.cm["hand"] * c.hand, 0),
        fore,
    )
    if in_hand > 0.0:
        grip = (0, c.forearm + chain.FIXED["grip"] * c.hand, 0)
        yield Part(f"{name} load", f"{name} forearm", grip, "fixed", in_hand, (0, 0, 0), fore)


def lower(c, name, z, ankle, knee, hip):
    """Thigh, shank and foot, each on a ball joint, the far end down its own axis."""
    mirror = np.array([1.0, 1.0, z])
    ahead = np.array([math.cos(c.toe_out), 0.0, z * math.sin(c.toe_out)])
    thigh_line = (np.array(knee) - np.array(hip)) * mirror
    shank_line = (np.array(ankle) - np.array(knee)) * mirror
    yield Part(
        f"{name} thigh",
        "pelvis",
        (0, 0, z * c.hip_z),
        "ball",
        c.kg["thigh"],
        (0, -c.cm["thigh"] * c.thigh, 0),
        along(thigh_line, (1, 0, 0)),
    )
    yield Part(
        f"{name} shank",
        f"{name} thigh",
        (0, -c.thigh, 0),
        "ball",
        c.kg["shank"],
        (0, -c.cm["shank"] * c.shank, 0),
        along(shank_line, (1, 0, 0)),
    )
    # foot frame: x from heel to toes along the sole, which points down at the toes on a raised heel
    sole = ahead * math.cos(c.pitch) + np.array([0.0, -math.sin(c.pitch), 0.0])
    up = ahead * math.sin(c.pitch) + np.array([0.0, math.cos(c.pitch), 0.0])
    centre = (c.cm["foot"] * c.foot - c.heel_to_ankle, c.ankle_height / 2.0 - c.ankle_height, 0)
    rest = np.column_stack([sole, up, np.cross(sole, up)])
    yield Part(
        f"{name} foot", f"{name} shank", (0, -c.shank, 0), "ball", c.kg["foot"], centre, rest
    )


def relative(body):
    """Rotation of each part against its parent."""
    rest = {p.name: p.rest for p in body}
    return {p.name: rest[p.parent].T @ p.rest if p.parent else p.rest for p in body}


# ---- Pinocchio ------------------------------------------------------------------------------


def in_pinocchio(body, push):
    model = pin.Model()
    model.gravity.linear = np.array([0.0, -chain.G, 0.0])
    kinds = {
        "free": pin.JointModelFreeFlyer,
        "ball": pin.JointModelSpherical,
        "hinge": pin.JointModelRZ,
    }
    turned, joint, q = relative(body), {}, []
    for p in body:
        inertia = pin.Inertia(p.kg, p.centre.astype(float), 1e-3 * p.kg * np.eye(3))
        if p.kind == "fixed":
            model.appendBodyToJoint(
                joint[p.parent], inertia, pin.SE3(np.eye(3), p.at.astype(float))
            )
            continue
        parent = joint[p.parent] if p.parent else 0
        at = pin.SE3(np.eye(3), p.at.astype(float) if p.parent else np.zeros(3))
        joint[p.name] = model.addJoint(parent, kinds[p.kind](), at, p.name)
        model.appendBodyToJoint(joint[p.name], inertia, pin.SE3.Identity())
        r = turned[p.name]
        place = list(p.at) if p.kind == "free" else []
        q += (
            [math.atan2(r[1, 0], r[0, 0])]
            if p.kind == "hinge"
            else place + list(pin.Quaternion(r).coeffs())
        )
    data, q, still = model.createData(), np.array(q), np.zeros(model.nv)
    com = pin.centerOfMass(model, data, q).copy()
    force, points = push(com)
    outside = [pin.Force.Zero() for _ in range(model.njoints)]
    for name, point in points.items():
        at = data.oMi[joint[name]]
        outside[joint[name]] = at.actInv(pin.Force(force, np.cross(point, force)))
    tau = pin.rnea(model, data, q, still, still, outside)
    torque = {"left over": np.array(tau[:6])}
    place = {}
    for name, j in joint.items():
        at, k = model.joints[j].idx_v, model.joints[j].nv
        turn = data.oMi[j].rotation
        own = tau[at : at + k]
        place[name] = data.oMi[j]
        if k == 3:
            torque[name] = turn @ own
        elif k == 1:
            torque[name] = np.array([0.0, 0.0, own[0]])
    return com, torque, {n: (m.translation.copy(), m.rotation.copy()) for n, m in place.items()}


# ---- MuJoCo ---------------------------------------------------------------------------------


def numbers(values):
    return " ".join(repr(float(v)) for v in values)


def xml(body):
    """The body as MuJoCo's text."""
    kinds = {
        "free": "<freejoint/>",
        "ball": '<joint type="ball"/>',
        "hinge": '<joint axis="0 0 1"/>',
        "fixed": "",
    }

    def inside(parent):
        text = ""
        for p in (p for p in body if p.parent == parent):
            inertia = numbers([1e-3 * p.kg] * 3)
            text += f'<body name="{p.name}" pos="{numbers(p.at)}">{kinds[p.kind]}'
            text += f'<inertial mass="{p.kg!r}" pos="{numbers(p.centre)}" diaginertia="{inertia}"/>'
            text += inside(p.name) + "</body>"
        return text

    gravity = numbers([0.0, -chain.G, 0.0])
    return f'<mujoco><option gravity="{gravity}"/><worldbody>{inside(None)}</worldbody></mujoco>'


def in_mujoco(body, push):
    model = mujoco.MjModel.from_xml_string(xml(body))
    data = mujoco.MjData(model)
    turned = relative(body)
    for p in body:
        if p.kind == "fixed":
            continue
        at = model.jnt_qposadr[model.body_jntadr[model.body(p.name).id]]
        r = turned[p.name]
        if p.kind == "hinge":
            data.qpos[at] = math.atan2(r[1, 0], r[0, 0])
            continue
        if p.kind == "free":
            data.qpos[at : at + 3] = p.at
            at += 3
        quaternion = np.zeros(4)
        mujoco.mju_mat2Quat(quaternion, r.flatten())
        data.qpos[at : at + 4] = quaternion
    mujoco.mj_forward(model, data)
    com = data.subtree_com[model.body("pelvis").id].copy()
    tau = data.qfrc_bias.copy()
    force, points = push(com)
    for name, point in points.items():
        moving = np.zeros((3, model.nv))
        mujoco.mj_jac(model, data, moving, None, point, model.body(name).id)
        tau -= moving.T @ force
    torque, place = {"left over": tau[:6]}, {}
    for p in body:
        at = model.body(p.name).id
        turn = data.xmat[at].reshape(3, 3)
        place[p.name] = (data.xpos[at].copy(), turn.copy())
        first = model.body_dofadr[at]
        if p.kind == "ball":
            torque[p.name] = turn @ tau[first : first + 3]
        elif p.kind == "hinge":
            torque[p.name] = np.array([0.0, 0.0, tau[first]])
    return com, torque, place


# ---- From the engines to the model's quantities ---------------------------------------------


def ground(c, shank, thigh):
    """Half the weight under each foot, on the foot's own line, level with the COM."""
    _, ankle, _, _ = chain.leg(c, shank, thigh)
    force = np.array([0.0, chain.G * c.whole / 2.0, 0.0])

    def push(com):
        ahead = com[0] - ankle[0]
        out = ankle[2] + ahead * math.tan(c.toe_out)
        return force, {f"{n} foot": np.array([com[0], 0.0, z * out]) for n, z in SIDES.items()}

    return push


def quantities(c, com, torque, place):
    """Extensor demands of the heavier leg and the low back, knee point, knee flexion."""
    square = np.array([-math.sin(c.toe_out), 0.0, math.cos(c.toe_out)])
    own = 2.0 * c.heavier
    knee, turn = place["right shank"]
    lines = (place["right thigh"][1][:, 1], turn[:, 1])
    bent = math.atan2(np.linalg.norm(np.cross(*lines)), np.dot(*lines))
    return {
        "com": com,
        "moments": {
            "ankle": -own * np.dot(torque["right foot"], square),
            "knee": own * torque["right shank"][2] / math.cos(c.toe_out),
            "hip": -own * torque["right thigh"][2],
            "lumbosacral": torque["thorax"][2],
        },
        "knee": knee,
        "knee_flexion": bent,
    }


def near(what, a, b, size):
    worst = float(np.max(np.abs(np.asarray(a) - np.asarray(b))))
    if not worst <= AGREE * size:
        raise SystemExit(f"{what}: {a} against {b}")
    return worst / size


def checked(c, code, angles):
    """The engines' numbers for one posture, after everything that must hold."""
    body = parts(c, *angles)
    push = ground(c, *angles[:2])
    size = chain.G * c.whole  # N m: the weight one metre off
    both = [engine(body, push) for engine in (in_pinocchio, in_mujoco)]
    for _, torque, place in both:
        near(f"{code} left over", torque["left over"], np.zeros(6), size)
        feet_stand(c, code, place)
    first, second = (quantities(c, *one) for one in both)
    plain = chain.weigh(c, *angles)
    worst = 0.0
    for other in (second, plain):
        worst = max(worst, near(f"{code} com", first["com"][:2], other["com"][:2], 1.0))
        worst = max(worst, near(f"{code} knee", first["knee"], other["knee"], 1.0))
        # the angle of two almost parallel lines is known to half the digits less
        worst = max(worst, near(f"{code} bent", first["knee_flexion"], other["knee_flexion"], 1.0))
        for joint, value in first["moments"].items():
            worst = max(worst, near(f"{code} {joint}", value, other["moments"][joint], size))
    if chain.side(c, angles[1]) == 0.0:
        axis = np.array([-math.sin(c.toe_out), 0.0, math.cos(c.toe_out)])
        about = 2.0 * c.heavier * np.dot(both[0][1]["right shank"], axis)
        near(f"{code} knee's own axis", about, first["moments"]["knee"], size)
    return first, worst


def feet_stand(c, code, place):
    """The ball of each foot on the floor, where heel, foot and turn put it."""
    s, _ = chain.pitched(c, c.ball - c.heel_to_ankle, c.ankle_height)
    for name, z in SIDES.items():
        at, turn = place[f"{name} foot"]
        ball = at + turn @ np.array([c.ball - c.heel_to_ankle, -c.ankle_height, 0.0])
        out = c.half_stance + (c.ball - s) * math.sin(c.toe_out)
        near(f"{code} {name} foot", ball, [c.ball * math.cos(c.toe_out), 0.0, z * out], 1.0)


# ---- The file -------------------------------------------------------------------------------


def postures(dice, c):
    """Any angles the legs can span."""
    while True:
        angles = (
            dice.between(-8.0, 50.0, 2),
            dice.between(0.0, 140.0, 2),
            dice.between(-5.0, 85.0, 2),
        )
        if chain.leg(c, *(math.radians(a) for a in angles[:2])) is not None:
            return angles


def case(client, dice):
    visit = client["visits"][0]
    task = visit["tasks"][0]
    if dice.chance(0.15):
        task["weight_left_percent"] = dice.between(20.0, 80.0)
    c = chain.chain_of(visit, task)
    degrees = postures(dice, c)
    found, worst = checked(c, client["code"], [math.radians(a) for a in degrees])
    line = {
        "code": client["code"],
        "ron": ron.write(client).strip(),
        "shank_deg": degrees[0],
        "thigh_deg": degrees[1],
        "trunk_deg": degrees[2],
        **digits(found),
    }
    return line, worst, kinds(c, visit, degrees)


def kinds(c, visit, degrees):
    """What a case covers."""
    _, thigh, lean = (math.radians(a) for a in degrees)
    yield c.sex
    yield c.placement
    yield visit["segments"]
    yield from (["heel raised"] if c.pitch > 0.0 else [])
    yield from (["toes out"] if c.toe_out != 0.0 else [])
    yield from (["shank out of the foot's plane"] if chain.side(c, thigh) != 0.0 else [])
    yield from (["bend beyond the hip"] if chain.bend_of(c, thigh, lean) > 0.0 else [])
    yield from (["loaded"] if c.load > 0.0 else [])
    yield from ([f"{c.placement}, loaded"] if c.load > 0.0 else [])
    yield from (["uneven weight"] if c.heavier > 0.5 else [])
    short = c.placement == "Overhead" and abs(chain.arms(c, lean)[0]) > 1e-9
    yield from (["overhead short of vertical"] if short else [])


def main(count):
    dice = random_clients.Dice(SEED + 1)
    lines, worst, covered = [], 0.0, Counter()
    for client in drawn(SEED, count):
        line, apart, kind = case(client, dice)
        lines.append(line)
        worst = max(worst, apart)
        covered.update(kind)
    packages = {"pin": pin.__version__, "mujoco": mujoco.__version__, "numpy": np.__version__}
    head = header(SOURCES, SEED, count, packages)
    head["covered"] = dict(sorted(covered.items()))
    write("statics.json", head, lines)
    print(f"{count} cases, the engines at most {worst:.1e} apart")
    print(dict(covered))


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else COUNT)
