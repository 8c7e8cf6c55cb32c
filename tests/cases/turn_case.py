"""turn_case.py KENTLEDGE WORK_DIR CASE...: a case turned about the vertical is the same case.

Every point of a case, and every direction that it states, is turned in plan by an angle that is no
part of a right one; both are run. Every vector of the results must have turned by that angle, every
azimuth with it, and no size, force, length or word may have changed.
"""
import math
import pathlib
import re
import sys

from same_case import compare, leaves, run

ANGLE = 0.7391  # rad, counted from east to north: about 42.3 degrees
TOLERANCE = 1e-8  # relative, or of a thousandth of the largest number of the same name
LEAST = 1e-3  # of its SI unit: a smaller number is nil

POINT = re.compile(r'x = "(-?[\d.]+) m";(\s+)y = "(-?[\d.]+) m"')
DIRECTION = re.compile(r"direction = \[ (-?[\d.]+), (-?[\d.]+), (-?[\d.]+) \]")


def turned(x, y, by=ANGLE):
    c, s = math.cos(by), math.sin(by)
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


def is_vector(value):
    return (isinstance(value, list) and len(value) == 3
            and all(isinstance(v, (int, float)) and not isinstance(v, bool) for v in value))


def seen_turned(by):
    """How values stand in the turned world: azimuths as cosine and sine, vectors in plan."""
    def see(key, value):
        if key == "azimuth_deg" and isinstance(value, (int, float)):
            azimuth = math.radians(value) - by
            return {f"{key}.cos": math.cos(azimuth), f"{key}.sin": math.sin(azimuth)}
        if is_vector(value) and key.endswith(("direction", "thrust_N")):
            return {key: [*turned(value[0], value[1], by), value[2]]}
        return {key: value}
    return see


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
        turned_case = run(program, work, f"{path.stem}-turned.cfg", other)
        values = leaves(as_it_is, seen_turned(ANGLE))
        worst, where, complaints = compare(values, leaves(turned_case, seen_turned(0.0)),
                                           TOLERANCE, lambda name: LEAST)
        thrusts = sum(1 for f in as_it_is["fittings"] if (f.get("horizontal_N") or 0.0) > 1e3)
        print(f"{path.stem}: {points} points, {thrusts} fittings pushed in plan, {len(values)} values, "
              f"worst {worst:.2g} at {where}")
        for complaint in complaints[:20]:
            print(f"  {complaint}")
        failed = failed or bool(complaints) or thrusts == 0
    sys.exit(1 if failed else 0)


if __name__ == "__main__":
    main()
