"""run_case.py PROGRAM CASE: runs one case and holds its results against expected.csv,
or expected-NAME.csv where it is not called after its folder.

A row of expected.csv is quantity,value,relative,absolute,source. quantity is a path into
results.json in which elements of a list are named by their id, name, state or index:
fittings.PI1.block.width_m, scenarios.shut.points.VC.highest_head_m,
fittings.PI1.thrust_N.0. Of a standard table, which lies in a folder of cases/standard, they are paths into
what --format json prints: cells.SOIL/SIZE/FITTING.thrust_N. A value of the form "text:bend" compares words, "null" the absence
of a value. Met inside either tolerance; NaN never is.
"""
import csv
import json
import math
import pathlib
import subprocess
import sys
import tempfile


def look_up(node, path):
    """Follows a path; ids may hold dots, so the longest match wins."""
    if not path:
        return node
    parts = path.split(".")
    for take in range(len(parts), 0, -1):
        key, rest = ".".join(parts[:take]), ".".join(parts[take:])
        if isinstance(node, dict) and key in node:
            return look_up(node[key], rest)
        if isinstance(node, list):
            for item in node:
                if isinstance(item, dict) and key in (item.get("id"), item.get("name"),
                                                      item.get("state")):
                    return look_up(item, rest)
            if key.isdigit() and int(key) < len(node):
                return look_up(node[int(key)], rest)
    raise KeyError(path)


def fault(row, results):
    """What is wrong with one row, or None."""
    try:
        got = look_up(results, row["quantity"])
    except KeyError as missing:
        return f"{row['quantity']}: not in the results (at {missing})"
    want = row["value"]
    if want == "null":
        met = got is None
    elif want.startswith("text:"):
        met = got == want[5:]
    else:
        want = float(want)
        met = isinstance(got, (int, float)) and math.isfinite(got) and (
            abs(got - want) <= float(row["absolute"] or 0)
            or abs(got - want) <= float(row["relative"] or 0) * abs(want))
    return None if met else (f"{row['quantity']}: got {got!r}, expected {row['value']} "
                             f"({row['source']})")


def results_of(program, case):
    """The results as JSON gives them."""
    with tempfile.TemporaryDirectory() as folder:
        out = pathlib.Path(folder) / "results"
        table = case.parent.parent.name == "standard"
        words = (["standard-table", str(case), "--format", "json", "--quiet"] if table
                 else ["run", str(case), "--out", str(out), "--quiet"])
        run = subprocess.run([program, *words], capture_output=True, text=True)
        if run.returncode != 0:
            raise RuntimeError(f"exit status {run.returncode}\n{run.stderr}")
        return json.loads(run.stdout if table else (out / "results.json").read_text())


def main(program, case):
    case = pathlib.Path(case)
    own = case.stem == case.parent.name  # a second case of a folder has its own table
    table = "expected.csv" if own else f"expected-{case.stem}.csv"
    with open(case.parent / table, newline="") as file:
        rows = list(csv.DictReader(file))
    if not rows:
        print(f"{table} is empty")
        return 1
    try:
        results = results_of(program, case)
    except RuntimeError as failed:
        print(failed)
        return 1
    faults = [f for f in (fault(row, results) for row in rows) if f]
    print("\n".join(faults) or f"{len(rows)} quantities as expected")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
