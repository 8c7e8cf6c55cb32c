"""fuzz_cases.py PROGRAM CASES COUNT: damaged case files never crash or hang the reader.

Each trial damages one case of CASES at random (from a fixed seed, so that a failure can be
had again) and runs `check` on it. Accepted: an exit status of the manual, within the time
limit, and for status 2 only lines of the promised form on standard error.
"""
import pathlib
import random
import re
import subprocess
import sys
import tempfile

LIMIT = 20  # s, with sanitizers on a busy machine
LINE = re.compile(r"^(\S.*?:(\d+: )?.+|\d+ errors?.*; nothing was run|kentledge: .+)$")
SCRAPS = [b'"', b"{", b"}", b"(", b")", b"[", b"]", b";", b",", b"=", b"\n", b"\x00",
          b"\xff", b"1e999", b"-1", b"0", b'"600 mm"', b'"-3 m"', b'"1 psi"', b"true",
          b"@include \"x.cfg\"\n", b"/*", b"#", b"99999999999", b"\xc2\xa0", b"id", b"at"]


def damaged(data, dice):
    """data with one to four wounds."""
    for _ in range(dice.randint(1, 4)):
        at = dice.randrange(len(data) + 1)
        length = dice.choice([1, 1, 2, 8, 40, 200])
        kind = dice.randrange(5)
        if kind == 0:
            data = data[:at] + data[at + length:]
        elif kind == 1:
            data = data[:at] + dice.choice(SCRAPS) + data[at:]
        elif kind == 2:
            data = data[:at] + data[at:at + length] * 2 + data[at + length:]
        elif kind == 3:
            data = data[:at] + bytes([dice.randrange(256)]) + data[at + 1:]
        else:
            other = dice.randrange(len(data) + 1)
            data = data[:at] + data[other:other + length] + data[at:]
    return data


def fault_of(run):
    """What is wrong with one run, or None."""
    if run.returncode not in (0, 1, 2):
        return f"exit status {run.returncode}\n{run.stderr[-2000:]}"
    if run.returncode == 2:
        for line in run.stderr.splitlines():
            if not LINE.match(line):
                return f"a line of another form: {line!r}"
    return None


def main(program, cases, count):
    dice = random.Random(20261201)
    sources = [p.read_bytes() for p in sorted(pathlib.Path(cases).rglob("*.cfg"))]
    if not sources:
        print("no cases found")
        return 1
    statuses = {}
    with tempfile.TemporaryDirectory() as folder:
        target = pathlib.Path(folder) / "damaged.cfg"
        for trial in range(int(count)):
            target.write_bytes(damaged(dice.choice(sources), dice))
            try:
                run = subprocess.run([program, "check", str(target)], timeout=LIMIT,
                                     capture_output=True, encoding="utf-8",
                                     errors="replace")
            except subprocess.TimeoutExpired:
                print(f"trial {trial}: no answer in {LIMIT} s\n{target.read_bytes()!r}")
                return 1
            statuses[run.returncode] = statuses.get(run.returncode, 0) + 1
            fault = fault_of(run)
            if fault:
                print(f"trial {trial}: {fault}\n{target.read_bytes()!r}")
                return 1
    print(f"{count} damaged cases, by exit status: {statuses}")
    return 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
