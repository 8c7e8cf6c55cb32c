"""fuzz_cases.py PROGRAM CASES COUNT: damaged case files never crash or hang the reader.

Each trial damages one case of CASES at random (from a fixed seed, so that a failure can be
had again), or one of the tables and included files beside it, and runs `check` on it.
Accepted: an exit status of the manual, within the time limit, and for status 2 only lines
of the promised form on standard error.
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
          b"@include \"x.cfg\"\n", b"/*", b"#", b"99999999999", b"\xc2\xa0", b"id", b"at",
          b"\r", b"\r\n", b"\t", b'""', b",,,,", b"\xef\xbb\xbf", b"1,5", b"1 000", b" [ft]",
          b"1+198", b" m"]
TABLE_CASE = b"""format = 1;
points_file = "points.csv";
pipes_file = "pipes.csv";
fixed_levels = ( { at = "R1"; level = "80 m"; } );
outflows = ( { at = "E1"; flow = "100 L/s"; } );
"""
TABLES = {"points.csv": b"id,x [m],y [m],z [m],cover [ft],soil,record,station\n"
                        b"R1,0,0,50,4,,false,0+000\n"
                        b"B1,400,0,30,,silt-ML,true,0+400.5\n"
                        b"E1,700,300,20,1.5 m,,,824.9 m\n",
          "pipes.csv": b"id,route,pipe_class,joint,loss\n"
                       b"A,R1 B1 E1,DI-EN545-C40-DN300,push-on,2.5\n"}


def damaged(data, dice):
    """data with one wound, or up to four."""
    for _ in range(dice.choice([1, 1, 2, 4])):
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


def read_sources(cases):
    """Sound cases and bad ones; of each its own bytes, and by name what stands beside it."""
    sound, bad = [(TABLE_CASE, TABLES)] * 8, []  # few others have tables
    for path in sorted(pathlib.Path(cases).rglob("*.cfg")):
        if path.parent.parent.name == "standard":
            continue  # no case
        beside = {p.name: p.read_bytes() for p in path.parent.iterdir()
                  if p.suffix in (".csv", ".inc") and p.name.encode() in path.read_bytes()}
        (bad if path.parent.name == "bad" else sound).append((path.read_bytes(), beside))
    return sound, bad


def write_damaged(folder, source, dice):
    """The case and what stands beside it, one of them damaged; the case's path."""
    case, beside = source
    files = {"damaged.cfg": case, **beside}
    wounded = dice.choice(sorted(files)) if beside else "damaged.cfg"
    files[wounded] = damaged(files[wounded], dice)
    for old in folder.iterdir():
        old.unlink()
    for name, data in files.items():
        (folder / name).write_bytes(data)
    return folder / "damaged.cfg", wounded, files[wounded]


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
    sources = read_sources(cases)
    if not all(sources):
        print("no cases found")
        return 1
    statuses = {}
    with tempfile.TemporaryDirectory() as name:
        folder = pathlib.Path(name)
        for trial in range(int(count)):
            target, wounded, data = write_damaged(folder, dice.choice(dice.choice(sources)),
                                                   dice)
            fault = None
            try:
                run = subprocess.run([program, "check", str(target)], timeout=LIMIT,
                                     capture_output=True, encoding="utf-8",
                                     errors="replace")
            except subprocess.TimeoutExpired:
                fault = f"no answer in {LIMIT} s"
            else:
                fault = fault_of(run)
                kind = pathlib.Path(wounded).suffix, run.returncode
                statuses[kind] = statuses.get(kind, 0) + 1
            if fault:
                print(f"trial {trial}, {wounded}: {fault}\n{data!r}")
                return 1
    print(f"{count} damaged cases, by file and exit status: {statuses}")
    return 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
