"""Files of multi-precision reference cases: how they are written, and how a sample is checked."""
import json
import sys

from mpmath import mp, mpf

PRINTED_DIGITS = 25


def text(value):
    """JSON in which doubles keep their shortest exact form and mp numbers have 25 digits."""
    if isinstance(value, mpf):
        return mp.nstr(value, PRINTED_DIGITS, min_fixed=0, max_fixed=0)
    if isinstance(value, dict):
        return "{" + ", ".join(f"{json.dumps(k)}: {text(v)}" for k, v in value.items()) + "}"
    if isinstance(value, list):
        return "[" + ", ".join(text(v) for v in value) + "]"
    return json.dumps(value)


def write_cases(path, note, cases):
    lines = [text(case) for case in cases]
    with open(path, "w", encoding="ascii") as file:
        file.write('{"note": ' + json.dumps(note) + ',\n"cases": [\n')
        file.write(",\n".join(lines) + "\n]}\n")
    print(f"wrote {len(lines)} cases")


def differences(fresh, stored, where, exact):
    """Places where two parsed documents differ by more than 20 digits (or at all if exact)."""
    if isinstance(fresh, dict) and isinstance(stored, dict) and fresh.keys() == stored.keys():
        loose = ("results", "depth_m", "index_weight", "strain_weight", "in_plane_weight")
        return [d for key in fresh for d in differences(
            fresh[key], stored[key], f"{where}/{key}", exact and key not in loose)]
    if isinstance(fresh, list) and isinstance(stored, list) and len(fresh) == len(stored):
        return [d for j, pair in enumerate(zip(fresh, stored))
                for d in differences(*pair, f"{where}/{j}", exact)]
    if fresh == stored:
        return []
    if not exact and isinstance(fresh, str) and isinstance(stored, str):
        if abs(mpf(fresh) - mpf(stored)) <= mpf(10) ** -20 * abs(mpf(fresh)):
            return []
    return [f"{where}: regenerated {fresh}, stored {stored}"]


def check_sample(path, makers, every):
    """Makes every `every`-th case again; `makers` are functions without arguments, one a case."""
    with open(path, encoding="ascii") as file:
        stored = json.load(file, parse_float=str)["cases"]
    found = [] if len(stored) == len(makers) else ["another number of cases"]
    chosen = list(zip(makers, stored))[::every]
    for make, kept in chosen:
        fresh = json.loads(text(make()), parse_float=str)
        found += differences(fresh, kept, kept["name"], True)
    for line in found:
        print(line, file=sys.stderr)
    print(f"checked {len(chosen)} cases")
    return 1 if found else 0
