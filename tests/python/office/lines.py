"""Offices that draw tendons otherwise: curves, widths, pieces, blocks, mirrors, far origins, wrong units."""

import math

from ezdxf.math import BSpline

from .floor import Office


def swerve(x, start, radius, angle, end, steps=24):
    """A line up the sheet that swerves to the right by two arcs: its places, and its arcs as (centre, from, to) in degrees."""
    places, first, second = [(x, 0.0)], (x + radius, start), None
    places += [(first[0] - radius * math.cos(angle * k / steps), start + radius * math.sin(angle * k / steps))
               for k in range(steps + 1)]
    px, py = places[-1]
    second = (px - radius * math.cos(angle), py + radius * math.sin(angle))
    places += [(second[0] + radius * math.cos(angle * (1 - k / steps)), second[1] - radius * math.sin(angle * (1 - k / steps)))
               for k in range(1, steps + 1)]
    places.append((places[-1][0], end))
    degrees = math.degrees(angle)
    return places, [(first, 180.0 - degrees, 180.0), (second, -degrees, 0.0)]


class ArcsAndSplines(Office):
    habit = "distributed tendons of lines and arcs, banded ones as splines by control points"
    version = "R2010"
    radius, angle, start, chords = 9.0, 0.2, 2.4, 400

    def meant(self):
        found = super().meant()
        for tendon in found:
            x, y = tendon.plan[0]
            if tendon.run == "distributed":
                tendon.plan, tendon.arcs = swerve(x, self.start, self.radius, self.angle, tendon.plan[-1][1])
            else:
                end = tendon.plan[-1][0]
                # Straight over the columns, so that the marks of a band stay in line.
                tendon.control = [(0.0, y), (end * 0.15, y), (end * 0.3, y + 0.12), (end * 0.7, y + 0.12), (end * 0.85, y), (end, y)]
                tendon.plan = [(p.x, p.y) for p in BSpline(tendon.control, order=4).approximate(self.chords)]
            stretch = tendon.length() - sum(self.spans_y if tendon.run == "distributed" else self.spans_x)
            tendon.points = [(kind, station + (stretch if station > 4.0 and tendon.run == "distributed" else 0.0), height)
                             for kind, station, height in tendon.points[:-1]]
            tendon.points.append(("anchor", tendon.length(), self.thickness / 2))
        return found

    def draw_line(self, tendon):
        look, sheet = self.look(tendon.run), self.sheet
        if tendon.run == "banded":
            sheet.space.add_open_spline([sheet.at(p) for p in tendon.control], degree=3, dxfattribs=look)
            return
        sheet.line(look, tendon.plan[0], tendon.plan[1])
        for centre, start, end in tendon.arcs:
            sheet.space.add_arc(sheet.at(centre), sheet.size(self.radius), start, end, dxfattribs=look)
        sheet.line(look, tendon.plan[-1], tendon.plan[-2])


class WidePolylines(ArcsAndSplines):
    habit = "R12 polylines with a width and bulges"
    version, chords = "R12", 16

    def draw_line(self, tendon):
        if tendon.run == "banded":
            self.sheet.polyline(self.look("banded"), tendon.plan, width=0.06)
            return
        bulge = math.tan(self.angle / 4.0)
        places = [tendon.plan[i] for i in (0, 1, 25, 49, 50)]
        self.sheet.polyline(self.look("distributed"), places, width=0.04, bulges=[0.0, -bulge, bulge, 0.0, 0.0])


class BrokenAtLabels(Office):
    habit = "labels stand in the line, which is broken for them"
    version, unit = "R2000", "mm"
    job = """\
[drawing]
bridge_gap_mm = 1000
"""

    def draw_line(self, tendon):
        half = 0.3 if tendon.run == "banded" else 0.35
        start = 0.0
        for _, station, _ in tendon.points[1:-1]:
            self.sheet.line(self.look(tendon.run), tendon.place(start), tendon.place(station - half))
            start = station + half
        self.sheet.line(self.look(tendon.run), tendon.place(start), tendon.place(tendon.length()))

    def draw_height(self, tendon, point):
        kind, station, height = point
        size = self.banded_size if tendon.run == "banded" else self.size
        self.sheet.text(self.look("height"), self.height_text(kind, height), tendon.place(station), size,
                        tendon.along(station), "MIDDLE_CENTER")


class OverlappingPieces(Office):
    habit = "tendons of short pieces that overlap by 200 mm, drawn in any order and direction"
    version = "R2013"

    def draw_line(self, tendon):
        length, count = tendon.length(), 5
        for index in (3, 0, 4, 2, 1):
            a, b = length * index / count, min(length * (index + 1) / count + 0.2, length)
            a, b = (b, a) if index % 2 else (a, b)
            self.sheet.polyline(self.look(tendon.run), [tendon.place(a), tendon.place(b)])


class FarInches(Office):
    habit = "an origin a thousand kilometres off, in inches, though heights are millimetres"
    version, unit, origin = "R2000", "in", (1_000_000.0, -1_000_000.0)


class WrongUnits(Office):
    habit = "the header says inches, the plan is in millimetres"
    version, insunits = "R2007", 1
    job = """\
[drawing]
unit = "mm"
"""


class NoUnits(Office):
    habit = "the header says no unit, the plan is in centimetres"
    version, insunits, unit, binary = "R2010", 0, "cm", True
    job = """\
[drawing]
unit = "cm"
"""


class BusySheet(Office):
    habit = "grid lines with bubbles and numbers, dimensions, a strand table beside the plan, a sheet in paper space"
    version, encoding = "R2018", None

    def finish(self):
        sheet = self.sheet
        grid = sheet.look("S-GRID", 9, "CENTER")
        width, depth = sum(self.spans_x), sum(self.spans_y)
        for number, x in enumerate((0.0, self.spans_x[0], width)):
            sheet.line(grid, (x, -2.0), (x, depth + 2.0))
            sheet.space.add_circle(sheet.at((x, -2.4)), sheet.size(0.4), dxfattribs=grid)
            sheet.text(grid, str(number + 1), (x, -2.4), 0.35, 0.0, "MIDDLE_CENTER")
        for number, y in enumerate((0.0, self.spans_y[0], depth)):
            sheet.line(grid, (-2.0, y), (width + 2.0, y))
            sheet.text(grid, "ABC"[number], (-2.4, y), 0.35, 0.0, "MIDDLE_CENTER")
        dims = sheet.look("S-DIMS", 3)
        sheet.line(dims, (0.0, -3.2), (self.spans_x[0], -3.2))
        sheet.text(dims, f"{1000 * self.spans_x[0]:g}", (3.0, -3.1), 0.2)
        for row, tendon in enumerate(self.tendons):
            self.note(f"{tendon.mark}   {tendon.strands}-{tendon.strand}   {tendon.length():.2f} m", (width + 4.0, 10.0 - 0.5 * row))
        paper = sheet.doc.layout("Layout1")
        paper.add_text("H165", height=5.0, dxfattribs={"layer": self.layers["height"], "insert": (100, 100)})
        paper.add_line((0, 0), (400, 0), dxfattribs={"layer": self.layers["banded"]})


class AttributeBlocks(Office):
    habit = "heights and marks as attributes of blocks, mark and strands in two"
    version, binary = "R2007", True

    def prepare(self):
        super().prepare()
        for role, tags in (("height", ["HT"]), ("mark", ["MARK", "STRANDS"])):
            for run, size in (("banded", self.banded_size), ("distributed", self.size)):
                block = self.sheet.block(f"PT-{role}-{run}".upper())
                self.look(role)
                for index, tag in enumerate(tags):
                    block.add_attdef(tag, (self.sheet.size(0.75 * index), self.sheet.size(0.35 * size)), dxfattribs={
                        "height": self.sheet.size(size), "layer": self.layers[role]})

    def draw_mark(self, tendon):
        station = 0.9
        insert = self.sheet.insert(self.look("mark"), f"PT-MARK-{tendon.run}".upper(), tendon.place(station), tendon.along(station))
        insert.add_auto_attribs({"MARK": tendon.mark, "STRANDS": f"{tendon.strands}-{tendon.strand}"})

    def draw_height(self, tendon, point):
        kind, station, height = point
        insert = self.sheet.insert(self.look("height"), f"PT-HEIGHT-{tendon.run}".upper(), tendon.place(station), tendon.along(station))
        insert.add_auto_attribs({"HT": self.height_text(kind, height)})


class MirroredBlocks(Office):
    habit = "half of the floor is a block, the other half the same block mirrored; marks outside of it"
    version = "R2004"
    spans_x, distributed_x = (8.0, 8.0), (1.6, 3.2, 12.8, 14.4)

    def draw(self):
        half = self.sheet.block("HALF-FLOOR")
        self.prepare()
        self.draw_slab()
        for tendon in self.tendons:
            inside = tendon.run == "distributed"
            if inside and tendon.plan[0][0] > 8.0:
                # Its heights and ends are those of its image.
                self.draw_mark(tendon)
                continue
            if inside:
                self.sheet.into(half, lambda place: place, self.sheet.unit_m)
            self.draw_line(tendon)
            self.draw_ends(tendon)
            for point in tendon.points[1:-1]:
                self.draw_height(tendon, point)
            self.sheet.back()
            self.draw_mark(tendon)
        self.sheet.insert(self.look("note"), "HALF-FLOOR", (0.0, 0.0))
        self.sheet.insert(self.look("note"), "HALF-FLOOR", (16.0, 0.0), xscale=-1.0)
        return self.sheet

    def meant(self):
        found = super().meant()
        by_x = {tendon.plan[0][0]: tendon for tendon in found if tendon.run == "distributed"}
        for x, image in ((14.4, 1.6), (12.8, 3.2)):
            by_x[x].ends, by_x[x].points = by_x[image].ends, by_x[image].points
        return found


class NestedBlocks(Office):
    habit = "the whole plan in a block drawn in metres, in another block, turned by 90 degrees and scaled to millimetres"
    version, turn, origin = "R2013", 90.0, (40.0, 5.0)

    def draw(self):
        plan, outer = self.sheet.block("PLAN"), self.sheet.block("XREF-COPY")
        self.sheet.into(plan, lambda place: place, 1.0)
        super().draw()
        self.sheet.back()
        outer.add_blockref("PLAN", (10.0, 0.0), dxfattribs={"layer": "0", "rotation": 90.0})
        x, y = self.sheet.at((0.0, 0.0))
        self.sheet.space.add_blockref("XREF-COPY", (x - 10_000.0, y), dxfattribs={"layer": "0", "xscale": 1000.0,
                                      "yscale": 1000.0, "zscale": 1000.0})
        return self.sheet


class SeenFromBelow(Office):
    habit = "distributed tendons with their texts and symbols drawn from below: negative extrusion"
    version = "R2000"

    def draw(self):
        self.prepare()
        self.draw_slab()
        for tendon in self.tendons:
            below = tendon.run == "distributed"
            before = len(self.sheet.space)
            self.draw_line(tendon)
            self.draw_ends(tendon)
            self.draw_mark(tendon)
            for point in tendon.points[1:-1]:
                self.draw_height(tendon, point)
            for entity in list(self.sheet.space)[before:] if below else []:
                self.flip(entity)
        return self.sheet

    def flip(self, entity):
        """The same places said in the axes of an extrusion downwards, where x runs to the left."""
        entity.dxf.extrusion = (0, 0, -1)
        if entity.dxftype() == "LWPOLYLINE":
            entity.set_points([(-x, y, a, b, -c) for x, y, a, b, c in entity.get_points()])
            return
        for key in ("insert", "align_point"):
            if entity.dxf.hasattr(key):
                x, y, z = entity.dxf.get(key)
                entity.dxf.set(key, (-x, y, z))
        entity.dxf.rotation = 180.0 - entity.dxf.get("rotation", 0.0)


CASES = [ArcsAndSplines, WidePolylines, BrokenAtLabels, OverlappingPieces, FarInches, WrongUnits, NoUnits, BusySheet,
         AttributeBlocks, MirroredBlocks, NestedBlocks, SeenFromBelow]
