"""Offices whose slabs are no flat plates, or say their thickness otherwise."""

import math

from .floor import Office


class DropPanels(Office):
    habit = "drop panels at interior columns, heights above the local soffit"
    version = "R2010"
    banded_y = (0.6, 6.9, 7.5)
    distributed_x = (1.6, 3.2, 4.8, 7.7, 8.3)

    def local(self, place):
        inside = abs(place[0] - self.spans_x[0]) <= 1.3 and abs(place[1] - self.spans_y[0]) <= 1.3
        return self.thickness + 150.0 if inside else self.thickness

    def draw_thickness(self):
        super().draw_thickness()
        x, y = self.spans_x[0], self.spans_y[0]
        self.ring("zone", x - 1.3, y - 1.3, x + 1.3, y + 1.3)
        self.sheet.text(self.look("zone"), self.thickness_text(self.thickness + 150.0), (x - 1.2, y - 1.2), 0.2)


class GeneralSoffit(DropPanels):
    habit = "drop panels, but every height above the soffit of the general slab"
    version = "R2013"
    job = """\
[height]
soffit = "general"
"""

    def written(self, point, tendon):
        return point[2] - (self.local(tendon.place(point[1])) - self.thickness)


class BandBeam(Office):
    habit = "a wide band beam under the banded tendons, thicknesses as 400 THK. and THK 200"
    version, unit = "R2007", "m"
    banded_y = (6.6, 7.2, 7.8)

    def local(self, place):
        return 400.0 if abs(place[1] - self.spans_y[0]) <= 1.2 else self.thickness

    def draw_thickness(self):
        super().draw_thickness()
        y, width = self.spans_y[0], sum(self.spans_x)
        self.ring("zone", 0.0, y - 1.2, width, y + 1.2)
        self.sheet.text(self.look("zone"), "400 THK.", (1.2, y - 1.1), 0.2)

    def thickness_text(self, thickness):
        return f"THK {thickness:g}"


class StepsByLevel(BandBeam):
    habit = "levels instead of thicknesses: a beam by SOFFIT -400, a bay set down, a pour marked TOS +0.10 with its thickness"
    version, unit = "R2013", "mm"
    distributed_x = (1.6, 3.2, 9.6, 11.2, 14.0)

    def local(self, place):
        inside = 12.4 <= place[0] <= 16.4 and place[1] > 8.4
        return 250.0 if inside else super().local(place)

    def draw_thickness(self):
        self.sheet.text(self.look("zone"), "THK 200", (5.0, 2.0), 0.25)
        for ring, words in (((0.0, 6.0, 16.4, 8.4), "SOFFIT -400"), ((9.0, 8.4, 12.4, 15.0), "50 SET DOWN"),
                            ((12.4, 8.4, 16.4, 15.0), "TOS +0.10\n250 THK")):
            self.ring("zone", *ring)
            look, place = self.look("zone"), (ring[0] + 0.2, ring[1] + 0.6)
            if "\n" in words:
                self.sheet.mtext(look, words.replace("\n", "\\P"), place, 0.2)
            else:
                self.sheet.text(look, words, place, 0.2)


class LevelLines(Office):
    habit = "low points of the distributed tendons by level lines across them, high points beside each"
    version, binary, step = "R2000", True, 0.0
    layers = {**Office.layers, "level": "TENDON-LEVEL-LINE"}
    colours = {**Office.colours, "level": 34}

    def draw_height(self, tendon, point):
        if tendon.run == "banded" or point[0] == "high":
            super().draw_height(tendon, point)

    def finish(self):
        lows = [point for point in self.tendons[-1].points if point[0] == "low"]
        for _, y, height in lows:
            self.sheet.line(self.look("level"), (1.0, y), (7.4, y))
            self.sheet.text(self.look("level"), f"L{height:g}", (7.5, y - 0.08), 0.16)


class Openings(Office):
    habit = "an opening with crossed lines; tendons led round it by vertices"
    version = "R2018"

    def meant(self):
        found = super().meant()
        for tendon in found:
            if tendon.run != "distributed" or tendon.plan[0][0] not in (3.2, 4.8):
                continue
            x = tendon.plan[0][0]
            aside = x - 0.45 if x == 3.2 else x + 0.45
            tendon.plan = [(x, 0.0), (x, 8.6), (aside, 11.0), (aside, 12.2), (x, 14.2), (x, 15.0)]
            total = tendon.length()
            tendon.points = [(kind, station if station < 8.0 else total if kind == "anchor" else 11.6 + math.dist((x, 8.6), (aside, 11.0)) - 2.4,
                              height) for kind, station, height in tendon.points]
        return found

    def draw_thickness(self):
        super().draw_thickness()
        self.ring("opening", 3.2, 10.8, 4.8, 12.4)
        self.sheet.line(self.look("opening"), (3.2, 10.8), (4.8, 12.4))
        self.sheet.line(self.look("opening"), (3.2, 12.4), (4.8, 10.8))


class NoteOfThickness(Office):
    habit = "the thickness in a general note only"
    version, unit = "R2004", "cm"
    thickness, low, high = 220.0, 35.0, 180.0
    job = """\
[slab]
thickness_mm = 220
"""

    def draw_thickness(self):
        self.note("1. ALL SLABS ARE 220 mm THICK UNLESS NOTED OTHERWISE.")


CASES = [DropPanels, GeneralSoffit, BandBeam, StepsByLevel, LevelLines, Openings, NoteOfThickness]
