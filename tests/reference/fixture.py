"""What statics.py and optima.py share: the clients, and the form of the files of numbers."""

import hashlib
import json
import platform
from pathlib import Path

import chain
import random_clients

HERE = Path(__file__).parent
# every file that the numbers come from, beside the script itself; model.py only for its draws
SOURCES = ("chain.py", "fixture.py", "random_clients.py", "model.py", "ron.py", "tables.json")


def digits(value, count=13):
    if isinstance(value, dict):
        return {k: digits(v, count) for k, v in value.items()}
    if isinstance(value, (list, tuple)):
        return [digits(v, count) for v in value]
    if hasattr(value, "tolist") and getattr(value, "ndim", 0):
        return digits(value.tolist(), count)
    value = float(value)
    # what is nothing but rounding is written as nothing
    return 0.0 if abs(value) < 1e-14 else float(f"{value:.{count}g}")


def fits(client):
    """Whether both knee-to-wall distances fit foot and shank."""
    visit = client["visits"][0]
    try:
        chain.chain_of(visit, visit["tasks"][0])
    except ValueError:
        return False
    return True


def drawn(seed, count):
    """Random clients with no input error."""
    return [c for c in random_clients.clients(seed, count + 20) if fits(c)][:count]


def header(sources, seed, count, packages):
    return {
        "seed": seed,
        "count": count,
        "python": platform.python_version(),
        **packages,
        "sha256": {
            n: hashlib.sha256((HERE / n).read_bytes()).hexdigest() for n in (*sources, *SOURCES)
        },
    }


def write(name, head, lines):
    text = [json.dumps(line, separators=(",", ":"), allow_nan=False) for line in lines]
    head = json.dumps(head, separators=(",", ":"))
    (HERE / name).write_text('{"header":' + head + ',\n"cases":[\n' + ",\n".join(text) + "\n]}\n")
