"""check_by_hand.py PROGRAM PAGE CASES: what a page of hand calculations says is what comes out.

Rows of the page's tables are | `CASE PATH` | by hand | program |, CASE a folder of CASES and PATH as
in expected.csv. The program's number must be the result to the digits printed, the hand's
within one part in a thousand of it.
"""
import pathlib
import re
import sys

from run_case import look_up, results_of

ROW = re.compile(r"^\| `(\S+) (\S+)` \| (\S+) \| (\S+) \|$", re.MULTILINE)
HAND = 1e-3


def half_a_digit(printed):
    """Half a unit of the last digit printed, as 1294199.5 or 12.1975e6."""
    mantissa, _, power = printed.partition("e")
    digits = len(mantissa.partition(".")[2])
    return 0.5001 * 10.0 ** (int(power or 0) - digits)


def main(program, page, cases):
    rows = ROW.findall(pathlib.Path(page).read_text(encoding="utf-8"))
    if len(rows) < 30:
        print(f"{page}: only {len(rows)} rows were found")
        return 1
    cases, results, faults = pathlib.Path(cases), {}, []
    for case, path, hand, printed in rows:
        if case not in results:
            results[case] = results_of(program, cases / case / f"{case}.cfg")
        got = look_up(results[case], path)
        if abs(got - float(printed)) > half_a_digit(printed):
            faults.append(f"{case} {path}: {printed} is printed, {got!r} comes out")
        if abs(got - float(hand)) > HAND * abs(got):
            faults.append(f"{case} {path}: {hand} by hand, {got!r} comes out")
    print("\n".join(faults) or f"{len(rows)} numbers by hand, of {len(results)} cases")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
