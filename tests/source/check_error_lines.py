#!/usr/bin/python3
"""Every complaint and every error that a library can make is made by some test.

check_error_lines.py BUILD_DIR SOURCE_DIR

Reads what gcov counted while the tests of a build with --coverage ran, prints the share
of lines run per folder of src/, and fails where a call that tells somebody what is wrong
was never reached. A line that no test can reach carries the remark "unreached:" with
its reason, on the line itself or the one before.
"""
import collections
import json
import os
import re
import subprocess
import sys

TELLS = re.compile(
    r"^\s+(?:return\s+|\(void\)\s*)?"
    r"(kent_complain|kent_place_complain|kent_record_complain|kent_error_set|kent_device_refuse|complain\w*)\(")


def counts(build, source):
    """{path below src/: {line: times run}} over all objects of the build."""
    files = []
    for folder, _, names in os.walk(build):
        files += [os.path.join(folder, n) for n in names if n.endswith(".gcda")]
    if not files:
        sys.exit(f"{build}: nothing was counted; build with --coverage and run the tests")
    lines = collections.defaultdict(lambda: collections.defaultdict(int))
    for start in range(0, len(files), 50):
        out = subprocess.run(["gcov", "--json-format", "--stdout"] + files[start:start + 50],
                             cwd=build, capture_output=True, text=True, check=True).stdout
        for document in out.splitlines():
            for file in json.loads(document)["files"]:
                path = os.path.relpath(os.path.join(build, file["file"]), source)
                if not path.startswith("src/"):
                    continue
                for line in file["lines"]:
                    lines[path][line["line_number"]] += line["count"]
    return lines


def unreached(path, text, run):
    """Lines of a file that tell of an error and were never run."""
    found = []
    for number, line in enumerate(text, start=1):
        match = TELLS.match(line)
        if not match or "unreached:" in line or "unreached:" in text[number - 2]:
            continue
        # A call that spans lines is counted at one of them.
        end = number
        while end < len(text) and ";" not in text[end - 1]:
            end += 1
        seen = [run[n] for n in range(number, end + 1) if n in run]
        if seen and max(seen) == 0:
            found.append(f"{path}:{number}: no test reaches {line.strip()}")
    return found


def main():
    build, source = (os.path.realpath(a) for a in sys.argv[1:3])
    lines = counts(build, source)
    folders = collections.defaultdict(lambda: [0, 0])
    missing, calls = [], 0
    for path in sorted(lines):
        folder = path.split("/")[1]
        folders[folder][0] += sum(1 for n in lines[path].values() if n > 0)
        folders[folder][1] += len(lines[path])
        with open(os.path.join(source, path), encoding="utf-8") as file:
            text = file.read().splitlines()
        calls += sum(1 for line in text if TELLS.match(line))
        missing += unreached(path, text, lines[path])
    for folder, (run, all_lines) in sorted(folders.items()):
        print(f"{folder:12s} {run:6d} of {all_lines:6d} lines run, {100 * run / all_lines:5.1f} %")
    print("\n".join(missing))
    print(f"{calls} places tell what is wrong, {len(missing)} of them reached by no test")
    sys.exit(1 if missing else 0)


main()
