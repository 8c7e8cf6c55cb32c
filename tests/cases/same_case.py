"""Two ways of writing one case: run both, and hold every value of their results side by side."""
import json
import math
import re
import subprocess
import sys

WORDS = ("case_checksum", "cautions", "assumed", "completeness")


def run(program, folder, name, text):
    """The results of a case as JSON; ends the test where it does not run."""
    case = folder / name
    case.write_text(text, encoding="utf-8")
    done = subprocess.run([program, "run", case.name, "--format", "json", "--no-files", "--quiet"],
                          cwd=folder, stdout=subprocess.PIPE, stderr=subprocess.PIPE,
                          encoding="utf-8", timeout=600)
    if done.returncode != 0:
        sys.exit(f"{case}: status {done.returncode}\n{done.stderr}")
    return json.loads(done.stdout)


def leaves(tree, see=lambda key, value: {key: value}, path="", out=None):
    """Everything that decides, by its path. see(key, value): what a value is held as."""
    out = {} if out is None else out
    if isinstance(tree, dict):
        for key, value in tree.items():
            if key in WORDS:
                continue  # which may hold a rounded figure of either
            if key == "time_s" or key.endswith("_at_s") or key.startswith("history_"):
                continue  # where a peak is flat, rounding says which instants show it
            for name, seen in see(key, value).items():
                leaves(seen, see, f"{path}.{name}", out)
    elif isinstance(tree, list):
        out[f"{path}.length"] = len(tree)
        for i, value in enumerate(tree):
            leaves(value, see, f"{path}.{i}", out)
    else:
        out[path] = tree
    return out


def kind_of(path):
    return re.sub(r"\.\d+", "", path)


def is_number(value):
    return isinstance(value, (int, float)) and not isinstance(value, bool)


def compare(a, b, tolerance, least):
    """Leaves of both, to a tolerance: relative, or of a thousandth of the largest number of the
    same name; least(name): a smaller number is nil. Returns the worst gap, where, complaints."""
    scale = {}
    for path, value in a.items():
        if isinstance(value, float):
            scale[kind_of(path)] = max(scale.get(kind_of(path), 0.0), abs(value))
    complaints = []
    if a.keys() != b.keys():
        complaints.append(f"keys differ: {sorted(a.keys() ^ b.keys())[:5]}")
    worst, where = 0.0, ""
    for path in a.keys() & b.keys():
        x, y = a[path], b[path]
        gap = 0.0 if x == y else math.inf
        if is_number(x) and is_number(y):
            size = max(abs(x), abs(y), scale.get(kind_of(path), 0.0) * 1e-3,
                       least(path.rpartition(".")[2]))
            gap = abs(x - y) / size
        if not gap <= tolerance:
            complaints.append(f"{path}: {x!r} against {y!r}")
        if gap > worst:
            worst, where = gap, path
    return worst, where, complaints
