"""check_readme.py PROGRAM ROOT [--write]: what the README shows is what the program does.

The block behind "<!-- demo -->" must be the demo's output, letter for letter; the case of
the README must run; every command of it that names the program must succeed. --write puts
the demo's present output into the README instead.
"""
import pathlib
import re
import subprocess
import sys
import tempfile

DEMO = "cases/design/brackenmoss/brackenmoss.cfg"
BLOCK = re.compile(r"(<!-- demo -->\n```\n)(.*?)(```\n)", re.S)


def main(program, root, *options):
    root = pathlib.Path(root)
    readme = (root / "README.md").read_text()
    # Relative, so that the output does not depend on where the tree lies.
    demo = subprocess.run([program, "run", DEMO, "--no-files"], cwd=root,
                          capture_output=True, text=True, check=True).stdout
    if "--write" in options:
        (root / "README.md").write_text(
            BLOCK.sub(lambda m: m[1] + demo + m[3], readme))
        return 0
    faults = []
    if BLOCK.search(readme)[2] != demo:
        faults.append("the demo's tables in the README are not what it prints now")
    case = re.search(r"```cfg\n(.*?)```", readme, re.S)[1]
    commands = re.findall(r"^build/kentledge (.*?)\s*(?:#.*)?$", readme, re.M)
    if len(commands) < 4:
        faults.append("too few commands found in the README")
    if len(case.splitlines()) > 24:
        faults.append("the case of the README has grown")
    with tempfile.TemporaryDirectory() as folder:
        (pathlib.Path(folder) / "main.cfg").write_text(case)
        for command in commands:
            run = subprocess.run([program, *command.split()], cwd=folder,
                                 capture_output=True, text=True)
            if run.returncode or not run.stdout:
                faults.append(f"{command}: status {run.returncode}\n{run.stderr}")
        if not (pathlib.Path(folder) / "main-results/results.json").exists():
            faults.append("the README's case left no main-results/results.json")
    for link in re.findall(r"\]\(([^)]+)\)", readme):
        if not (root / link).exists():
            faults.append(f"{link} is linked to and not there")
    print("\n".join(faults) or f"{len(commands)} commands, demo and links as printed")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
