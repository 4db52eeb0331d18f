"""A small reader and writer for the RON that client files use.

Values become plain Python: structs are dicts, lists are lists, `None` is None, `Some(x)` is x,
a bare variant is its name ("Free") and a variant with content is a dict with one key
({"Degrees": 25.0}, {"KneeToWall": {"left_cm": 5.0, "right_cm": 6.0}}).
"""

import re

TOKEN = re.compile(
    r"""\s*(?://[^\n]*\s*)*(?:
        (?P<text>"(?:[^"\\]|\\.)*") | (?P<number>[-+]?\d[\d_]*\.?\d*(?:[eE][-+]?\d+)?)
      | (?P<name>[A-Za-z_][A-Za-z0-9_]*) | (?P<mark>[()\[\]:,]))""",
    re.VERBOSE,
)


def _tokens(source):
    at, found = 0, []
    source = source.rstrip()
    while at < len(source):
        match = TOKEN.match(source, at)
        if match is None:
            raise ValueError(f"not understood: {source[at : at + 30]!r}")
        found.append((match.lastgroup, match.group(match.lastgroup)))
        at = match.end()
    return found


class _Reader:
    """Recursive descent over the token list."""

    def __init__(self, source):
        self.tokens = _tokens(source)
        self.at = 0

    def peek(self, ahead=0):
        where = self.at + ahead
        return self.tokens[where] if where < len(self.tokens) else (None, None)

    def take(self, expected=None):
        kind, text = self.peek()
        if expected is not None and text != expected:
            raise ValueError(f"expected {expected!r}, found {text!r}")
        self.at += 1
        return kind, text

    def value(self):
        kind, text = self.take()
        if kind == "text":
            return text[1:-1].replace('\\"', '"').replace("\\\\", "\\")
        if kind == "number":
            return float(text) if any(c in text for c in ".eE") else int(text)
        if text == "[":
            return self.items("]")
        if text == "(":
            return self.fields()
        if kind == "name":
            return self.variant(text)
        raise ValueError(f"unexpected {text!r}")

    def variant(self, name):
        constants = {"None": None, "true": True, "false": False}
        if name in constants:
            return constants[name]
        if self.peek()[1] != "(":
            return name
        self.take("(")
        content = self.fields() if self.peek(1)[1] == ":" else self.items(")")[0]
        return content if name == "Some" else {name: content}

    def items(self, end):
        found = []
        while self.peek()[1] != end:
            found.append(self.value())
            if self.peek()[1] == ",":
                self.take()
        self.take(end)
        return found

    def fields(self):
        found = {}
        while self.peek()[1] != ")":
            _, name = self.take()
            self.take(":")
            found[name] = self.value()
            if self.peek()[1] == ",":
                self.take()
        self.take(")")
        return found


def read(source):
    """The value a RON text stands for."""
    reader = _Reader(source)
    value = reader.value()
    if reader.at != len(reader.tokens):
        raise ValueError("text after the end")
    return value


# Fields whose type is Option<…>: a value present is wrapped in Some(…).
OPTIONAL = {
    "age_years",
    "shank_cm",
    "thigh_cm",
    "trunk_cm",
    "foot_cm",
    "ankle_height_cm",
    "heel_to_ankle_cm",
    "upper_arm_cm",
    "forearm_cm",
    "hand_cm",
    "left_cm",
    "right_cm",
    "left",
    "right",
    "knee_deg",
    "hip_deg",
    "stance_width_cm",
    "lean_limit_deg",
    "weight_left_percent",
    "slope",
    "seen",
    "edge_back",
    "edge_front",
    "pain_0_10",
    "pain_from_thigh_deg",
    "stopped_by",
}
# Fields of this name are optional in `caps` only; a task's load is always given.
OPTIONAL_IN_CAPS = {"load_kg"}
TEXTS = {"code", "date", "source", "name", "note"}


def write(client):
    """The RON text of a client held as plain Python."""
    return _struct(client, "") + "\n"


def _struct(fields, owner):
    return "(" + ", ".join(f"{k}: {_field(k, v, owner)}" for k, v in fields.items()) + ")"


def _field(name, value, owner):
    if value is None:
        return "None"
    written = f'"{value}"' if name in TEXTS else _plain(value, name)
    optional = name in OPTIONAL or (owner == "caps" and name in OPTIONAL_IN_CAPS)
    return f"Some({written})" if optional else written


# Structs inside an enum variant or an Option keep their fields; these hold a single bare value.
VARIANTS = {
    "KneeToWall",
    "Degrees",
    "PelvisHeld",
    "RockBack",
    "KneeToChest",
    "Usual",
    "ArmRatio",
    "HeldShank",
}


def _plain(value, name):
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, (int, float, str)):
        return str(value)
    if isinstance(value, list):
        return "[" + ", ".join(_plain(v, name) for v in value) + "]"
    variant = next(iter(value))
    if len(value) == 1 and variant in VARIANTS:
        content = value[variant]
        inner = _struct(content, variant) if isinstance(content, dict) else f"({content})"
        return variant + inner
    return _struct(value, name)
