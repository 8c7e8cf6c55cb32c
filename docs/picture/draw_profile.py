"""draw_profile.py RESULTS SCENARIO PIPE[,PIPE...] OUT.svg

Draws the surge along a main from a results folder: pipe, steady head, highest and lowest
head of one scenario against chainage, with the points that have fittings. Standard library
only. The picture of the README is made with it:

    build/kentledge run cases/design/brackenmoss/brackenmoss.cfg --out demo-results
    /usr/bin/python3 docs/picture/draw_profile.py demo-results shut-16s A,B docs/picture/profile.svg
"""
import csv
import json
import pathlib
import sys

WIDTH, HEIGHT = 960, 440
LEFT, RIGHT, TOP, BOTTOM = 64, 20, 54, 64
INK, GREY = "#222222", "#8a8a8a"
STYLE = {  # column: colour, width, dash, label
    "z_m": (INK, 2.6, "", "pipe"),
    "steady_head_m": ("#4a6f8a", 1.4, "6 4", "steady head"),
    "highest_head_m": ("#a63d2f", 1.8, "", "highest head"),
    "lowest_head_m": ("#2f6b4f", 1.8, "", "lowest head"),
}


def read_profile(folder, scenario, pipes):
    """Rows of the pipes in order, chainages run on from one span to the next."""
    rows, start, last, span = [], 0.0, 0.0, None
    with open(folder / f"profile-{scenario}.csv", newline="") as file:
        for row in csv.DictReader(file):
            if row["pipe"].split(".")[0] not in pipes:
                continue
            chainage = float(row["chainage_m"])
            if row["pipe"] != span and span is not None and chainage < last:
                start += last
            span, last = row["pipe"], chainage
            rows.append({"x": start + chainage, **{k: float(row[k]) for k in STYLE}})
    return rows


def steps(low, high, about):
    """Round values between low and high, about so many."""
    raw = (high - low) / about
    size = 10.0 ** len(str(int(raw))) / 10.0
    step = next(s * size for s in (1, 2, 5, 10) if s * size >= raw)
    value = step * -(-low // step)
    while value <= high:
        yield value
        value += step


def draw(rows, points, title):
    """The whole picture as SVG text."""
    xs = [r["x"] for r in rows]
    values = [r[k] for r in rows for k in STYLE]
    low, high = min(values) - 4.0, max(values) + 6.0

    def px(x):
        return LEFT + (x - xs[0]) / (xs[-1] - xs[0]) * (WIDTH - LEFT - RIGHT)

    def py(y):
        return HEIGHT - BOTTOM - (y - low) / (high - low) * (HEIGHT - TOP - BOTTOM)

    out = [f'<svg xmlns="http://www.w3.org/2000/svg" width="{WIDTH}" height="{HEIGHT}" '
           f'viewBox="0 0 {WIDTH} {HEIGHT}" font-family="DejaVu Sans, sans-serif" '
           f'font-size="12" fill="{INK}">',
           f'<rect width="{WIDTH}" height="{HEIGHT}" fill="#ffffff"/>',
           f'<text x="{LEFT}" y="20" font-size="14">{title}</text>']
    for y in steps(low, high, 6):
        out.append(f'<line x1="{LEFT}" x2="{WIDTH - RIGHT}" y1="{py(y):.1f}" '
                   f'y2="{py(y):.1f}" stroke="#e4e4e4"/><text x="{LEFT - 8}" '
                   f'y="{py(y) + 4:.1f}" text-anchor="end">{y:.0f}</text>')
    for x in steps(xs[0], xs[-1], 8):
        out.append(f'<text x="{px(x):.1f}" y="{HEIGHT - BOTTOM + 34}" '
                   f'text-anchor="middle">{x:.0f}</text>')
    out.append(f'<text x="{(LEFT + WIDTH - RIGHT) / 2}" y="{HEIGHT - 10}" '
               f'text-anchor="middle">along the main, m</text>')
    out.append(f'<text transform="translate(16 {HEIGHT / 2}) rotate(-90)" '
               f'text-anchor="middle">level and head, m</text>')
    band = [(px(r["x"]), py(r["highest_head_m"])) for r in rows]
    band += [(px(r["x"]), py(r["lowest_head_m"])) for r in reversed(rows)]
    shape = " ".join(f"{x:.1f},{y:.1f}" for x, y in band)
    out.append(f'<polygon points="{shape}" fill="#a63d2f" fill-opacity="0.06"/>')
    for key, (colour, width, dash, _) in STYLE.items():
        shape = " ".join(f'{px(r["x"]):.1f},{py(r[key]):.1f}' for r in rows)
        out.append(f'<polyline points="{shape}" fill="none" stroke="{colour}" '
                   f'stroke-width="{width}" stroke-dasharray="{dash}"/>')
    x = LEFT
    for colour, width, dash, label in STYLE.values():
        out.append(f'<line x1="{x}" x2="{x + 26}" y1="38" y2="38" stroke="{colour}" '
                   f'stroke-width="{width}" stroke-dasharray="{dash}"/>'
                   f'<text x="{x + 32}" y="42">{label}</text>')
        x += 60 + 8 * len(label)
    free = -1e9
    for at, name in points:
        out.append(f'<line x1="{px(at):.1f}" x2="{px(at):.1f}" y1="{HEIGHT - BOTTOM}" '
                   f'y2="{HEIGHT - BOTTOM + 5}" stroke="{GREY}"/>')
        if px(at) - free < 22:
            continue
        free = px(at)
        out.append(f'<text x="{px(at):.1f}" y="{HEIGHT - BOTTOM + 17}" font-size="10" '
                   f'text-anchor="middle" fill="{GREY}">{name}</text>')
    return "\n".join(out + ["</svg>", ""])


def main(folder, scenario, pipes, target):
    folder, pipes = pathlib.Path(folder), pipes.split(",")
    results = json.loads((folder / "results.json").read_text())
    rows = read_profile(folder, scenario, pipes)
    points = sorted((f["station_m"], f["id"]) for f in results["fittings"]
                    if f.get("station_m") is not None and f.get("pipe", pipes[0]) in pipes)
    title = f'{results["title"]}: heads in {scenario}'
    pathlib.Path(target).write_text(draw(rows, points, title))


if __name__ == "__main__":
    main(*sys.argv[1:])
