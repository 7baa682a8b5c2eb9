"""Draw floors by chance, in many drafting habits, with ezdxf, and see that tautplan reads every one as drawn.

Usage: foreign.py TAUTPLAN FIRST_SEED COUNT [KEEP_FOLDER]

Each floor has the truth beside it: marks, strands, ends, and every point's kind, place and height. What is varied:
version, ASCII or binary, unit, origin, rotation of the plan, order of entities, direction of drawing, side and rotation
of labels, kind of text, pieces, polylines and lines, blocks, level lines, zones, and how labels crowd round a column.
"""

import json
import math
import pathlib
import random
import subprocess
import sys
import tempfile

import logging

import ezdxf
from ezdxf.enums import TextEntityAlignment as Place

logging.getLogger("ezdxf").setLevel(logging.ERROR)

VERSIONS = ["R12", "R2000", "R2004", "R2007", "R2010", "R2013", "R2018"]
UNITS = {"mm": (4, 0.001), "m": (6, 1.0), "cm": (5, 0.01), "in": (1, 0.0254)}


class Plan:
    """A drawing in which everything is said in metres on an unturned plan."""

    def __init__(self, rng):
        self.rng = rng
        self.version = rng.choice(VERSIONS)
        self.binary = rng.random() < 0.3
        self.unit = rng.choice(["mm", "mm", "m", "cm", "in"])
        code, self.metres = UNITS[self.unit]
        self.doc = ezdxf.new(self.version)
        self.doc.units = code
        self.doc.header["$INSUNITS"] = code
        self.space = self.doc.modelspace()
        self.turn = rng.choice([0, 0, 0, 90, rng.uniform(-80, 80)])
        self.origin = (rng.choice([0, 0, 5000.0]), rng.choice([0, 0, -3000.0]))
        self.todo = []
        for name in ("LIVE-END", "DEAD-END"):
            block = self.doc.blocks.new(name)
            block.add_line((0, 0), (0.2 / self.metres, 0), dxfattribs={"layer": "0"})
            block.add_circle((0, 0), 0.1 / self.metres, dxfattribs={"layer": "0"})

    def at(self, x, y):
        c, s = math.cos(math.radians(self.turn)), math.sin(math.radians(self.turn))
        ox, oy = self.origin
        return ((ox + c * x - s * y) / self.metres, (oy + s * x + c * y) / self.metres)

    def layer(self, name):
        if name not in self.doc.layers:
            self.doc.layers.add(name, color=self.rng.randint(1, 7))
        return {"layer": name}

    def line(self, layer, points, closed=False, pieces=False):
        attributes = self.layer(layer)
        places = [self.at(*p) for p in points]
        if pieces:
            for a, b in zip(places, places[1:]):
                a, b = (a, b) if self.rng.random() < 0.5 else (b, a)
                self.todo.append(lambda a=a, b=b: self.space.add_line(a, b, dxfattribs=attributes))
        elif self.version == "R12" or self.rng.random() < 0.2:
            self.todo.append(lambda: self.space.add_polyline2d(places, close=closed, dxfattribs=attributes))
        else:
            self.todo.append(lambda: self.space.add_lwpolyline(places, close=closed, dxfattribs=attributes))

    def text(self, layer, content, place, height, rotation, middle):
        attributes = dict(self.layer(layer))
        where, turned = self.at(*place), rotation + self.turn
        if self.version != "R12" and self.rng.random() < 0.25:
            attributes.update(insert=where, char_height=height / self.metres, rotation=turned,
                              attachment_point=5 if middle else 7)
            self.todo.append(lambda: self.space.add_mtext(content, dxfattribs=attributes))
        else:
            def add():
                text = self.space.add_text(content, height=height / self.metres, rotation=turned, dxfattribs=attributes)
                text.set_placement(where, align=Place.MIDDLE_CENTER if middle else Place.LEFT)
            self.todo.append(add)

    def insert(self, layer, block, place, rotation):
        attributes = dict(self.layer(layer), rotation=rotation + self.turn)
        self.todo.append(lambda: self.space.add_blockref(block, self.at(*place), dxfattribs=attributes))

    def save(self, path):
        self.rng.shuffle(self.todo)
        for step in self.todo:
            step()
        self.doc.saveas(path, fmt="bin" if self.binary else "asc")


def heights(rng, spans, high, low):
    """Point kinds, stations and heights of a run over spans of these lengths (columns between the spans)."""
    found, start = [], 0.0
    for index, span in enumerate(spans):
        share = 0.45 if index == 0 else 0.55 if index == len(spans) - 1 else 0.5
        found.append(("low", start + share * span, low))
        start += span
        if index < len(spans) - 1:
            found.append(("high", start, high))
    return found


def draw(seed, folder):
    rng = random.Random(seed)
    plan = Plan(rng)
    bays_x = [rng.choice([7.2, 8.0, 8.4, 9.0]) for _ in range(rng.randint(2, 4))]
    bays_y = [rng.choice([7.0, 7.8, 8.4]) for _ in range(rng.randint(2, 3))]
    width, depth = sum(bays_x), sum(bays_y)
    lines_x = [sum(bays_x[:i]) for i in range(len(bays_x) + 1)]
    lines_y = [sum(bays_y[:i]) for i in range(len(bays_y) + 1)]
    thickness = rng.choice([220, 240, 250, 280])
    plan.line("SLAB-EDGE", [(0, 0), (width, 0), (width, depth), (0, depth)], closed=True)
    plan.text("SLAB-ZONE", f"T{thickness}", (lines_x[0] + bays_x[0] * 0.55, lines_y[0] + bays_y[0] * 0.6), 0.25, 0, False)
    for x in lines_x:
        for y in lines_y:
            plan.line("COLUMN", [(x - .25, y - .25), (x + .25, y - .25), (x + .25, y + .25), (x - .25, y + .25)], True)
    zones = []
    if rng.random() < 0.5:
        x, y = rng.choice(lines_x[1:-1] or [lines_x[0]]), rng.choice(lines_y[1:-1] or [lines_y[0]])
        plan.line("SLAB-ZONE", [(x - 1.37, y - 1.37), (x + 1.37, y - 1.37), (x + 1.37, y + 1.37), (x - 1.37, y + 1.37)], True)
        plan.text("SLAB-ZONE", f"T{thickness + 150}", (x - 1.2, y - 1.1), 0.2, 0, False)
        zones.append((x - 1.37, y - 1.37, x + 1.37, y + 1.37, thickness + 150))

    def local(x, y):
        return next((t for a, b, c, d, t in zones if a <= x <= c and b <= y <= d), thickness)

    truth = []
    habits = {"side": rng.choice([1, -1]), "mixed": rng.random() < 0.3, "along": rng.random() < 0.6,
              "middle": rng.random() < 0.4, "prefix": rng.random() < 0.75}
    level_lines = rng.random() < 0.3

    def tendon(run, mark, across, spans, along_x, spacing, size):
        total = sum(spans)
        high_top = 40 if run == "banded" else 55
        points = heights(rng, spans, thickness - high_top, rng.choice([35, 40]))
        flip = rng.random() < 0.5

        def place(s, off=0.0):
            return (s, across + off) if along_x else (across - off, s)

        record = {"mark": mark, "strands": rng.choice([3, 4, 5]), "tendons": 1, "points": []}
        vertices = [place(0.0), place(total)]
        pieces = rng.random() < 0.2
        if pieces:
            cut = total * rng.uniform(0.3, 0.7)
            vertices = [place(0.0), place(cut), place(total)]
        if flip:
            vertices.reverse()
        plan.line(f"TENDON-{run.upper()}", vertices, pieces=pieces)
        along = 0 if along_x else 90
        for kind, s, height in points:
            x, y = place(s)
            height += local(x, y) - thickness if kind == "high" else 0
            record["points"].append({"kind": kind, "x": x, "y": y, "height_mm": height})
            if level_lines and kind == "low" and run == "distributed":
                continue
            side = rng.choice([1, -1]) if habits["mixed"] and spacing > 0.9 else habits["side"]
            rotation = along if habits["along"] or spacing < 0.9 else 0
            if rng.random() < 0.1 and along == 90:
                rotation = 270
            word = {"high": "H", "low": "L"}[kind] if habits["prefix"] else ""
            gap = size * 0.35
            # The anchor point of a left-justified text sits on the base line; leave the gap on the near side.
            up = (rotation - along) % 360 == 0
            if habits["middle"]:
                off = side * (gap + size / 2)
            elif up:
                off = gap if side > 0 else -gap - size
            else:
                off = -gap if side < 0 else gap + size
            if not habits["middle"] and (rotation - along) % 180 != 0:
                off = side * 0.3  # horizontal text beside an upright tendon
                if side > 0:      # on its left: right end near the line is not what left-justified text does
                    off = -0.12
            plan.text("TENDON-HEIGHT", f"{word}{height}", place(s, off), size, rotation, habits["middle"])
        kinds = rng.choice([("LIVE-END", "DEAD-END"), ("DEAD-END", "LIVE-END"), ("LIVE-END", "LIVE-END")])
        for block, s, turn in zip(kinds, (0.0, total), (180, 0)):
            plan.insert("TENDON-END", block, place(s), along + turn)
        record["ends"] = {"0": kinds[0], "1": kinds[1], "at": [place(0.0), place(total)]}
        where = rng.uniform(0.18, 0.3) * spans[0] if spacing < 0.9 else spans[0] * 0.22
        plan.text("TENDON-MARK", f"{mark} {record['strands']}-12.7",
                  place(where, size * 0.4), size, along, False)
        truth.append(record)

    number = 0
    for y in lines_y:
        count = rng.randint(2, 5)
        for index in range(count):
            number += 1
            inside = min(max(y, 0.9), depth - 0.9)
            tendon("banded", f"B{number:02}", inside + (index - (count - 1) / 2) * 0.3, bays_x, True, 0.3, 0.09)
    number, x = 0, 0.7
    while x < width - 0.5:
        number += 1
        tendon("distributed", f"D{number:02}", x, bays_y, False, 1.3, rng.choice([0.12, 0.15]))
        x += rng.choice([1.2, 1.3, 1.4])
    if level_lines:
        lows = [p for p in truth if p["mark"].startswith("D")]
        for bay in range(len(bays_y)):
            stations = sorted({r["points"][2 * bay]["y"] for r in lows})
            if len(stations) != 1 or len({r["points"][2 * bay]["height_mm"] for r in lows}) != 1:
                # One line gives one height: make the truth say what the line says.
                first = lows[0]["points"][2 * bay]["height_mm"]
                for record in lows:
                    record["points"][2 * bay]["height_mm"] = first
            y, height = stations[0], lows[0]["points"][2 * bay]["height_mm"]
            plan.line("TENDON-LEVEL-LINE", [(0.3, y), (width - 0.3, y)])
            plan.text("TENDON-LEVEL-LINE", f"L{height}", (0.35, y + 0.1), 0.2, 0, False)
    for _ in range(40):
        plan.text("NOTES", rng.choice(["H165", "SEE DETAIL 4", "L30", "T250", "STAIR B"]),
                  (rng.uniform(0, width), rng.uniform(0, depth)), 0.2, rng.choice([0, 90]), False)
    path = folder / f"floor-{seed}.dxf"
    plan.save(path)
    for record in truth:
        for point in record["points"]:
            point["x"], point["y"] = (v * plan.metres for v in plan.at(point["x"], point["y"]))
        record["ends"]["at"] = [[v * plan.metres for v in plan.at(*p)] for p in record["ends"]["at"]]
    return path, truth, f"{plan.version}{' binary' if plan.binary else ''} {plan.unit}, {habits}"


def compare(truth, result):
    """Every difference between what was drawn and what was read, in words."""
    wrong = []
    read = {}
    for tendon in result["tendons"]:
        read.setdefault(tendon["mark"], []).append(tendon)
    for record in truth:
        found = read.get(record["mark"], [])
        if len(found) != 1:
            wrong.append(f"{record['mark']}: read {len(found)} times")
            continue
        tendon = found[0]
        if tendon["strands"] != record["strands"]:
            wrong.append(f"{record['mark']}: {tendon['strands']} strands, drawn {record['strands']}")
        for end in tendon["ends"]:
            near = min((0, 1), key=lambda i: math.dist(record["ends"]["at"][i], (end["x_m"], end["y_m"])))
            if end["kind"] != record["ends"][str(near)].split("-")[0].lower():
                wrong.append(f"{record['mark']}: end read as {end['kind']}")
        inner = [p for p in tendon["points"] if p["kind"] != "anchor"]
        for point in record["points"]:
            close = [p for p in inner if math.dist((p["x_m"], p["y_m"]), (point["x"], point["y"])) < 0.02]
            if len(close) != 1:
                wrong.append(f"{record['mark']}: no point at ({point['x']:.2f}, {point['y']:.2f}) {point['kind']} {point['height_mm']}")
            elif close[0]["kind"] != point["kind"] or abs((close[0]["height_mm"] or 0) - point["height_mm"]) > 1e-6:
                wrong.append(f"{record['mark']}: {close[0]['kind']} {close[0]['height_mm']} at ({point['x']:.2f}, {point['y']:.2f}), drawn {point['kind']} {point['height_mm']}")
        if len(inner) != len(record["points"]):
            wrong.append(f"{record['mark']}: {len(inner)} points, drawn {len(record['points'])}")
        if any(p.get("service_kn") is None for p in tendon["points"]):
            wrong.append(f"{record['mark']}: no forces")
    extra = set(read) - {record["mark"] for record in truth}
    if extra:
        wrong.append(f"tendons that nobody drew: {sorted(extra)}")
    return wrong


def main():
    program, first, count = sys.argv[1], int(sys.argv[2]), int(sys.argv[3])
    keep = pathlib.Path(sys.argv[4]) if len(sys.argv) > 4 else None
    failed = points = 0
    with tempfile.TemporaryDirectory() as scratch:
        folder = keep or pathlib.Path(scratch)
        folder.mkdir(parents=True, exist_ok=True)
        for seed in range(first, first + count):
            path, truth, habit = draw(seed, folder)
            command = [program, "mark", str(path), "--out", str(folder / "out")]
            if habit.startswith("R12"):
                # R12 has no $INSUNITS: the job says the unit, as an engineer would.
                job = folder / "unit.toml"
                job.write_text(f'[drawing]\nunit = "{habit.split(",")[0].split()[-1]}"\n', encoding="utf-8")
                command += ["--job", str(job)]
            run = subprocess.run(command, capture_output=True, text=True)
            if run.returncode == 2:
                wrong = [f"exit 2: {run.stderr.strip()[:300]}"]
            else:
                result = json.loads((folder / "out" / f"{path.stem}-result.json").read_text(encoding="utf-8"))
                wrong = compare(truth, result)
            points += sum(len(record["points"]) for record in truth)
            if wrong:
                failed += 1
                print(f"floor {seed} ({habit}): {len(wrong)} wrong")
                for line in wrong[:6]:
                    print("   " + line)
    print(f"foreign floors: {count} drawn, {points} heights, {failed} floors with a difference")
    raise SystemExit(1 if failed else 0)


if __name__ == "__main__":
    main()
