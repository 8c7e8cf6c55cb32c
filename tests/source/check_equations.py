"""check_equations.py ROOT: every equation number cited in src/ stands in docs/theory,
and none of them twice.

Chapter N defines N.M as "(N.M)" behind a formula, or as "N.M" before it, at the start of
an indented line or of a table's cell.
Citations are "docs/theory N.M" in comments and the "N.M" that a derivation line names.
"""
import pathlib
import re
import sys


def main(root):
    root = pathlib.Path(root)
    defined, twice = set(), []
    for chapter in (root / "docs/theory").glob("[0-9][0-9]-*.md"):
        number = str(int(chapter.name[:2]))
        formulas = re.findall(r"(?ms)^```\n(.*?)^```", chapter.read_text())
        numbered = re.findall(rf"(?m)\(({number}\.\d+)\)$", "".join(formulas))
        twice += sorted({n for n in numbered if numbered.count(n) > 1})
        defined |= set(re.findall(rf"\(({number}\.\d+)\)", chapter.read_text()))
        defined |= set(re.findall(rf"(?m)(?:^ +|\| )({number}\.\d+) ", chapter.read_text()))
    cited = {}
    for file in sorted((root / "src").glob("*/*.[ch]")):
        text = file.read_text()
        numbers = re.findall(r"docs/theory,?\s*(?:\*\s*)?(\d+\.\d+)", text)
        numbers += re.findall(r'"(\d{1,2}\.\d{1,2})"', text) if file.parent.name in (
            "thrust", "restraint", "report") else []
        for number in numbers:
            cited.setdefault(number, file.relative_to(root))
    missing = [f"{file}: equation {number} is not in docs/theory"
               for number, file in sorted(cited.items()) if number not in defined]
    missing += [f"equation {number} stands twice in docs/theory" for number in twice]
    if not defined or not cited:
        missing.append("no equations found")
    print("\n".join(missing) or f"{len(cited)} cited, {len(defined)} defined")
    return 1 if missing else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1]))
