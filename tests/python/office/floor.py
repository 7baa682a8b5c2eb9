"""A floor as it is meant, the truth written from that, and the plainest way to draw it: each office overrides what it
does otherwise."""

import math
from dataclasses import dataclass, field

from .sheet import UNITS, Sheet


@dataclass
class Tendon:
    """One line of tendons as meant; heights in millimetres from the local soffit to the strands' centroid."""
    mark: str | None
    run: str
    plan: list  # vertices, metres
    ends: tuple
    tendons: int = 1
    strands: int | None = 5
    strand: str | None = "12.7"
    required_kn: float | None = None
    required_kn_per_m: float | None = None
    points: list = field(default_factory=list)  # (kind, station in metres, height)
    joints: list = field(default_factory=list)  # stations of intermediate anchors, metres

    def length(self):
        return sum(math.dist(a, b) for a, b in zip(self.plan, self.plan[1:]))

    def place(self, station, off=0.0):
        """A place along the plan, this far to the left of it."""
        for a, b in zip(self.plan, self.plan[1:]):
            piece = math.dist(a, b)
            if station <= piece or b is self.plan[-1]:
                ux, uy = (b[0] - a[0]) / piece, (b[1] - a[1]) / piece
                return (a[0] + ux * station - uy * off, a[1] + uy * station + ux * off)
            station -= piece
        raise ValueError("a plan has two places at least")

    def along(self, station):
        """Direction there, degrees."""
        a, b = self.place(max(station - 0.01, 0.0)), self.place(station + 0.01)
        return math.degrees(math.atan2(b[1] - a[1], b[0] - a[0]))


class Office:
    """The plain habit: default layers, blocks and labels."""
    habit = ""
    job = ""
    version, unit, binary, encoding, insunits = "R2010", "mm", False, None, None
    origin, turn = (0.0, 0.0), 0.0
    spans_x, spans_y = (8.0, 8.4), (7.2, 7.8)
    banded_y, distributed_x = (0.6, 6.9, 7.5), (1.6, 3.2, 4.8, 6.4)
    thickness, low, high = 200.0, 30.0, 165.0
    # Neighbours differ by this, so that a label read for the wrong tendon shows.
    step = 5.0
    strands, strand = 5, "12.7"
    size, banded_size = 0.15, 0.12
    layers = {"banded": "TENDON-BANDED", "distributed": "TENDON-DISTRIBUTED", "height": "TENDON-HEIGHT",
              "mark": "TENDON-MARK", "end": "TENDON-END", "edge": "SLAB-EDGE", "opening": "SLAB-OPENING",
              "zone": "SLAB-ZONE", "column": "COLUMN", "note": "NOTES"}
    colours = {"banded": 1, "distributed": 5, "height": 3, "mark": 2, "end": 6, "edge": 7, "opening": 4, "zone": 30,
               "column": 8, "note": 7}
    live_block, dead_block = "LIVE-END", "DEAD-END"

    def __init__(self):
        self.sheet = Sheet(self.version, self.unit, self.origin, self.turn, self.encoding, self.insunits)
        self.tendons = self.meant()

    # What is meant.

    def meant(self):
        width, depth = sum(self.spans_x), sum(self.spans_y)
        found = []
        for number, y in enumerate(self.banded_y):
            found.append(self.tendon("B", number, "banded", [(0.0, y), (width, y)], self.spans_x))
        for number, x in enumerate(self.distributed_x):
            found.append(self.tendon("D", number, "distributed", [(x, 0.0), (x, depth)], self.spans_y))
        return found

    def tendon(self, letter, number, run, plan, spans):
        ends = [("live", "dead"), ("live", "live"), ("dead", "live")][number % 3]
        made = Tendon(self.mark(letter, number), run, plan, ends, self.count(run), self.strands, self.strand)
        self.low = type(self).low + self.step * (number % 2)
        self.high = type(self).high - self.step * (number % 3 == 1)
        made.points = self.profile(made, spans)
        return made

    def mark(self, letter, number):
        return f"{letter}{number + 1:02}"

    def count(self, run):
        return 1

    def profile(self, tendon, spans):
        start, found = 0.0, [("anchor", 0.0, self.local(tendon.place(0.0)) / 2)]
        for index, span in enumerate(spans):
            share = 0.45 if index == 0 else 0.55 if index == len(spans) - 1 else 0.5
            found.append(("low", start + share * span, self.low))
            start += span
            if index < len(spans) - 1:
                found.append(("high", start, self.high + self.local(tendon.place(start)) - self.thickness))
        found.append(("anchor", start, self.local(tendon.place(start)) / 2))
        return found

    def local(self, place):
        """Thickness of the slab at a place, millimetres."""
        return self.thickness

    # How it is drawn.

    def draw(self):
        self.prepare()
        self.draw_slab()
        for tendon in self.tendons:
            self.draw_line(tendon)
            self.draw_ends(tendon)
            self.draw_mark(tendon)
            for point in tendon.points:
                if self.shown(point):
                    self.draw_height(tendon, point)
        self.finish()
        return self.sheet

    def look(self, role):
        return self.sheet.look(self.layers[role], self.colours[role])

    def prepare(self):
        half = self.sheet.size(0.1)
        for name in (self.live_block, self.dead_block):
            block = self.sheet.block(name)
            block.add_line((0, 0), (2 * half, 0), dxfattribs={"layer": "0"})
            if name == self.live_block:
                block.add_line((2 * half, half), (2 * half, -half), dxfattribs={"layer": "0"})
            else:
                block.add_circle((half, 0), half, dxfattribs={"layer": "0"})

    def draw_slab(self):
        width, depth = sum(self.spans_x), sum(self.spans_y)
        self.ring("edge", 0.0, 0.0, width, depth)
        for i in range(len(self.spans_x) + 1):
            for j in range(len(self.spans_y) + 1):
                x, y = sum(self.spans_x[:i]), sum(self.spans_y[:j])
                self.ring("column", x - 0.2, y - 0.2, x + 0.2, y + 0.2)
        self.draw_thickness()

    def ring(self, role, left, low, right, high):
        places = [(left, low), (right, low), (right, high), (left, high)]
        self.sheet.polyline(self.look(role), places, closed=True)

    def draw_thickness(self):
        self.sheet.text(self.look("zone"), self.thickness_text(self.thickness),
                        (self.spans_x[0] + 2.0, self.spans_y[0] + 2.0), 0.25)

    def thickness_text(self, thickness):
        return f"T{thickness:g}"

    def draw_line(self, tendon):
        self.sheet.polyline(self.look(tendon.run), tendon.plan)

    def draw_ends(self, tendon):
        for kind, station in zip(tendon.ends, (0.0, tendon.length())):
            turn = tendon.along(station) + (180.0 if station == 0.0 else 0.0)
            self.draw_end(kind, tendon.place(station), turn)

    def draw_end(self, kind, place, turn):
        self.sheet.insert(self.look("end"), self.live_block if kind == "live" else self.dead_block, place, turn)

    def shown(self, point):
        return point[0] != "anchor"

    def draw_mark(self, tendon):
        self.label("mark", self.mark_text(tendon), tendon, 0.9)

    def mark_text(self, tendon):
        many = f"{tendon.tendons}x" if tendon.tendons > 1 else ""
        return f"{tendon.mark} {many}{tendon.strands}-{tendon.strand}"

    def draw_height(self, tendon, point):
        kind, station, height = point
        self.label("height", self.height_text(kind, self.written(point, tendon)), tendon, station)

    def written(self, point, tendon):
        """The number that this office writes, in its own unit."""
        return point[2]

    def height_text(self, kind, number):
        return f"{ {'high': 'H', 'low': 'L'}.get(kind, '')}{number:g}"

    def label(self, role, content, tendon, station):
        """Beside the tendon, on its left, its foot on the line's side."""
        size = self.banded_size if tendon.run == "banded" else self.size
        place = tendon.place(station, 0.35 * size)
        self.sheet.text(self.look(role), content, place, size, tendon.along(station))

    def finish(self):
        """Notes, legends, what else stands on the sheet."""

    def note(self, content, place=(0.0, -1.5), height=0.25):
        self.sheet.text(self.look("note"), content, place, height)

    # The truth.

    def truth(self):
        def tendon(meant):
            record = {key: getattr(meant, key) for key in
                      ("mark", "run", "tendons", "strands", "strand", "required_kn", "required_kn_per_m")}
            record["ends"] = list(meant.ends)
            record["points"] = []
            for kind, station, height in meant.points:
                x, y = self.sheet.metres(*meant.place(station))
                record["points"].append({"kind": kind, "x_m": round(x, 6), "y_m": round(y, 6),
                                         "height_mm": round(height, 9)})
            if meant.joints:
                places = [self.sheet.metres(*meant.place(station)) for station in meant.joints]
                record["joints"] = [{"x_m": round(x, 6), "y_m": round(y, 6)} for x, y in places]
            return record
        return {"habit": self.habit, "unit_m": UNITS[self.unit][1], "tendons": [tendon(t) for t in self.tendons]}
