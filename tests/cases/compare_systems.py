"""compare_systems.py KENTLEDGE WORK_DIR CASE...: a case is the same in feet and pounds.

Every quantity of a case in SI is written in US units, with all the digits of a double; both texts
are run, and every number of their results must agree to 1e-9. Factors: the international foot and
the avoirdupois pound at 9.80665 m/s2 (NIST Special Publication 811, appendix B; exact).
"""
import json
import math
import pathlib
import re
import subprocess
import sys

TOLERANCE = 1e-9  # relative, or of a thousandth of the largest number of the same name
LEAST = 1e-6  # of its SI unit: a smaller number is nil
LEAST_OF = {"numerical_uncertainty_m": 1e-2}  # the gap between two heads of some 100 m

FOOT = 0.3048
POUND = 4.4482216152605  # N
INCH = FOOT / 12
PSI = POUND / INCH**2

# SI text: (US text, SI value of one SI unit over that of one US unit)
UNITS = {
    "m": ("ft", 1 / FOOT),
    "mm": ("in", 1e-3 / INCH),
    "km": ("ft", 1e3 / FOOT),
    "m^2": ("ft^2", 1 / FOOT**2),
    "m^3": ("ft^3", 1 / FOOT**3),
    "kPa": ("psf", 1e3 / (POUND / FOOT**2)),
    "MPa": ("psi", 1e6 / PSI),
    "GPa": ("psi", 1e9 / PSI),
    "bar": ("psi", 1e5 / PSI),
    "kN": ("lbf", 1e3 / POUND),
    "N": ("lbf", 1 / POUND),
    "kPa/m": ("pcf", 1e3 / (POUND / FOOT**3)),
    "kN/m^3": ("pcf", 1e3 / (POUND / FOOT**3)),
    "L/s": ("cfs", 1e-3 / FOOT**3),
    "m^3/s": ("cfs", 1 / FOOT**3),
    "m/s": ("ft/s", 1 / FOOT),
}
QUANTITY = re.compile(r'"(-?[0-9.]+(?:e-?[0-9]+)?) ([^"]+)"')


def in_us_units(text):
    """The same case; what has no row above (angles, times) stays as it is."""
    converted = 0

    def convert(match):
        nonlocal converted
        value, unit = float(match[1]), match[2]
        if unit == "degC":
            converted += 1
            return f'"{value * 1.8 + 32:.17g} degF"'
        if unit not in UNITS:
            return match[0]
        converted += 1
        name, factor = UNITS[unit]
        return f'"{value * factor:.17g} {name}"'

    out = QUANTITY.sub(convert, text)
    return out, converted


def run(program, folder, name, text):
    case = folder / name
    case.write_text(text, encoding="utf-8")
    done = subprocess.run([program, "run", case.name, "--format", "json", "--no-files", "--quiet"],
                          cwd=folder, stdout=subprocess.PIPE, stderr=subprocess.PIPE,
                          encoding="utf-8", timeout=600)
    if done.returncode != 0:
        sys.exit(f"{case}: status {done.returncode}\n{done.stderr}")
    return json.loads(done.stdout)


def numbers(tree, path, out):
    """Every number by its path, and everything else that decides: types, ids, true and false."""
    if isinstance(tree, dict):
        for key, value in tree.items():
            if key in ("case_checksum", "cautions", "assumed", "completeness"):
                continue  # words, which may hold a rounded figure of either
            if key == "time_s" or key.endswith("_at_s") or key.startswith("history_"):
                continue  # where a peak is flat, rounding says which instants show it
            numbers(value, f"{path}.{key}", out)
    elif isinstance(tree, list):
        out[f"{path}.length"] = len(tree)
        for i, value in enumerate(tree):
            numbers(value, f"{path}.{i}", out)
    else:
        out[path] = tree


def compare(si, us, complaints):
    a, b = {}, {}
    numbers(si, "", a)
    numbers(us, "", b)
    scale = {}
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
            kind = re.sub(r"\.\d+", "", path)
            least = LEAST_OF.get(path.rpartition(".")[2], LEAST)
            size = max(abs(x), abs(y), scale.get(kind, 0.0) * 1e-3, least)
            gap = abs(x - y) / size
            if not math.isfinite(gap) or gap > TOLERANCE:
                complaints.append(f"{path}: {x!r} in SI, {y!r} in US units")
            if gap > worst:
                worst, where = gap, path
        elif x != y:
            complaints.append(f"{path}: {x!r} in SI, {y!r} in US units")
    return worst, where, len(a)


def main():
    program, work = pathlib.Path(sys.argv[1]).resolve(), pathlib.Path(sys.argv[2])
    work.mkdir(parents=True, exist_ok=True)
    failed = False
    for name in sys.argv[3:]:
        path = pathlib.Path(name)
        text = path.read_text(encoding="utf-8")
        other, converted = in_us_units(text)
        if converted < 10 or other == text:
            sys.exit(f"{name}: {converted} quantities, hardly a case")
        si = run(program, work, f"{path.stem}-si.cfg", text)
        us = run(program, work, f"{path.stem}-us.cfg", other)
        complaints = []
        worst, where, count = compare(si, us, complaints)
        print(f"{path.stem}: {converted} quantities, {count} values, worst {worst:.2g} at {where}")
        for complaint in complaints[:20]:
            print(f"  {complaint}")
        failed = failed or bool(complaints)
    sys.exit(1 if failed else 0)


if __name__ == "__main__":
    main()
