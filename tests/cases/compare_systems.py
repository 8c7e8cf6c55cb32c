"""compare_systems.py KENTLEDGE WORK_DIR CASE...: a case is the same in feet and pounds.

Every quantity of a case in SI is written in US units, with all the digits of a double; both texts
are run, and every number of their results must agree to 1e-9. Factors: the international foot and
the avoirdupois pound at 9.80665 m/s2 (NIST Special Publication 811, appendix B; exact).
"""
import pathlib
import re
import sys

from same_case import compare, leaves, run

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
        si = leaves(run(program, work, f"{path.stem}-si.cfg", text))
        us = leaves(run(program, work, f"{path.stem}-us.cfg", other))
        worst, where, complaints = compare(si, us, TOLERANCE,
                                           lambda name: LEAST_OF.get(name, LEAST))
        print(f"{path.stem}: {converted} quantities, {len(si)} values, worst {worst:.2g} at {where}")
        for complaint in complaints[:20]:
            print(f"  {complaint}")
        failed = failed or bool(complaints)
    sys.exit(1 if failed else 0)


if __name__ == "__main__":
    main()
