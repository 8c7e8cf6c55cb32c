"""turn_case.py KENTLEDGE WORK_DIR CASE...: a case turned about the vertical is the same case.

Every point of a case, and every direction that it states, is turned in plan by an angle that is no
part of a right one; both are run. Every vector of the results must have turned by that angle, every
azimuth with it, and no size, force, length or word may have changed.
"""
import json
import math
import pathlib
import re
import subprocess
import sys

ANGLE = 0.7391  # rad, counted from east to north: about 42.3 degrees
TOLERANCE = 1e-8  # relative, or of a thousandth of the largest number of the same name
LEAST = 1e-3  # of its SI unit: a smaller number is nil

POINT = re.compile(r'x = "(-?[\d.]+) m";(\s+)y = "(-?[\d.]+) m"')
DIRECTION = re.compile(r"direction = \[ (-?[\d.]+), (-?[\d.]+), (-?[\d.]+) \]")


def turned(x, y):
    c, s = math.cos(ANGLE), math.sin(ANGLE)
    return c * x - s * y, s * x + c * y


def turn_text(text):
    """The case in the turned world."""
    def point(match):
        x, y = turned(float(match[1]), float(match[3]))
        return f'x = "{x:.12f} m";{match[2]}y = "{y:.12f} m"'

    def direction(match):
        x, y = turned(float(match[1]), float(match[2]))
        return f"direction = [ {x:.15f}, {y:.15f}, {match[3]} ]"

    text, points = POINT.subn(point, text)
    return DIRECTION.sub(direction, text), points


def run(program, folder, name, text):
    case = folder / name
    case.write_text(text, encoding="utf-8")
    done = subprocess.run([program, "run", case.name, "--format", "json", "--no-files", "--quiet"],
                          cwd=folder, stdout=subprocess.PIPE, stderr=subprocess.PIPE,
                          encoding="utf-8", timeout=600)
    if done.returncode != 0:
        sys.exit(f"{case}: status {done.returncode}\n{done.stderr}")
    return json.loads(done.stdout)


def is_vector(value):
    return (isinstance(value, list) and len(value) == 3
            and all(isinstance(v, (int, float)) and not isinstance(v, bool) for v in value))


def leaves(tree, path, turn, out):
    """Everything by its path; vectors in plan are turned where asked."""
    if isinstance(tree, dict):
        for key, value in tree.items():
            if key in ("case_checksum", "cautions", "assumed", "completeness"):
                continue  # words, in which the last digit printed may be either
            if key == "time_s" or key.endswith("_at_s") or key.startswith("history_"):
                continue  # where a peak is flat, rounding says which instants show it
            if key == "azimuth_deg" and isinstance(value, (int, float)):
                value = (value - math.degrees(ANGLE) if turn else value) % 360.0
                out[f"{path}.{key}.cos"] = math.cos(math.radians(value))
                out[f"{path}.{key}.sin"] = math.sin(math.radians(value))
                continue
            if is_vector(value) and (key.endswith("direction") or key.endswith("thrust_N")):
                x, y = turned(value[0], value[1]) if turn else value[:2]
                value = [x, y, value[2]]
            leaves(value, f"{path}.{key}", turn, out)
    elif isinstance(tree, list):
        out[f"{path}.length"] = len(tree)
        for i, value in enumerate(tree):
            leaves(value, f"{path}.{i}", turn, out)
    else:
        out[path] = tree


def compare(first, second, complaints):
    a, b, scale = {}, {}, {}
    leaves(first, "", True, a)
    leaves(second, "", False, b)
    for path, value in a.items():
        if isinstance(value, float):
            kind = re.sub(r"\.\d+", "", path)
            scale[kind] = max(scale.get(kind, 0.0), abs(value))
    if a.keys() != b.keys():
        complaints.append(f"keys differ: {sorted(a.keys() ^ b.keys())[:5]}")
    worst, where = 0.0, ""
    for path in a.keys() & b.keys():
        x, y = a[path], b[path]
        if isinstance(x, (int, float)) and isinstance(y, (int, float)) and not isinstance(x, bool):
            size = max(abs(x), abs(y), scale.get(re.sub(r"\.\d+", "", path), 0.0) * 1e-3, LEAST)
            gap = abs(x - y) / size
            if not math.isfinite(gap) or gap > TOLERANCE:
                complaints.append(f"{path}: {x!r} turned, {y!r} in the turned case")
            if gap > worst:
                worst, where = gap, path
        elif x != y:
            complaints.append(f"{path}: {x!r} turned, {y!r} in the turned case")
    return worst, where, len(a)


def main():
    program, work = pathlib.Path(sys.argv[1]).resolve(), pathlib.Path(sys.argv[2])
    work.mkdir(parents=True, exist_ok=True)
    failed = False
    for name in sys.argv[3:]:
        path = pathlib.Path(name)
        text = path.read_text(encoding="utf-8")
        other, points = turn_text(text)
        if points < 3:
            sys.exit(f"{name}: {points} points in plan, hardly a case")
        as_it_is = run(program, work, f"{path.stem}.cfg", text)
        complaints = []
        worst, where, count = compare(as_it_is, run(program, work, f"{path.stem}-turned.cfg", other),
                                      complaints)
        thrusts = sum(1 for f in as_it_is["fittings"] if (f.get("horizontal_N") or 0.0) > 1e3)
        print(f"{path.stem}: {points} points, {thrusts} fittings pushed in plan, {count} values, "
              f"worst {worst:.2g} at {where}")
        for complaint in complaints[:20]:
            print(f"  {complaint}")
        failed = failed or bool(complaints) or thrusts == 0
    sys.exit(1 if failed else 0)


if __name__ == "__main__":
    main()
