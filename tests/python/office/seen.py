"""Offices whose layer names tell little: what is drawn, and words of other languages, tell a surveyor what is meant."""

import math

from .floor import Office
from .heights import Chairs, Inches

NAMES = """\
[layers]
banded = ["{banded}"]
distributed = ["{distributed}"]
heights = ["{height}"]
marks = ["{mark}"]
ends = ["{end}"]
slab_edge = ["{edge}"]
slab_zone = ["{zone}"]
column = ["{column}"]
"""
PLAIN = {"banded": "P-BANDED", "distributed": "P-DISTRIBUTED", "height": "P-ELEV", "mark": "P-TXT", "end": "P-ANC",
         "edge": "P-OUTLINE", "opening": "P-VOID", "zone": "P-THK", "column": "P-COLUMN", "note": "P-GEN"}
NUMBERS = {"banded": "2311", "distributed": "2312", "height": "2320", "mark": "2321", "end": "2330", "edge": "1010",
           "opening": "1020", "zone": "1030", "column": "1040 COLUMN", "note": "9000"}


def names(layers):
    return NAMES.format(**layers)


class WordsAtEnds(Office):
    """Words written beyond the ends, level with the sheet."""
    layers, job = PLAIN, names(PLAIN)
    live, dead, away = "LE", "DE", 0.3

    def draw_end(self, kind, place, turn):
        angle = math.radians(turn + 180.0)
        where = (place[0] - self.away * math.cos(angle), place[1] - self.away * math.sin(angle))
        self.sheet.text(self.look("end"), self.live if kind == "live" else self.dead, where, 0.12, 0.0, "MIDDLE_CENTER")


class GridBubbles(Office):
    habit = "layers by number; grid lines from bubble to bubble, longer than any tendon, on a layer by number too"
    version, unit = "R2013", "mm"
    layers, live_block, dead_block = NUMBERS, "ANK-AKTIV", "ANK-PASSIV"
    job = names(NUMBERS) + """\

[ends]
live_blocks = ["ANK-AKTIV"]
dead_blocks = ["ANK-PASSIV"]
"""

    def finish(self):
        look = self.sheet.look("2300", 9)
        width, depth = sum(self.spans_x), sum(self.spans_y)
        for i, x in enumerate((0.0, self.spans_x[0], width)):
            self.axis(look, (x, -2.6), (x, depth + 2.6), str(i + 1))
        for i, y in enumerate((0.0, self.spans_y[0], depth)):
            self.axis(look, (-2.6, y), (width + 2.6, y), "ABC"[i])

    def axis(self, look, a, b, name):
        self.sheet.line(look, a, b)
        length = math.dist(a, b)
        for (x, y), (u, v) in ((a, b), (b, a)):
            at = (x - 0.4 * (u - x) / length, y - 0.4 * (v - y) / length)
            self.sheet.space.add_circle(self.sheet.at(at), self.sheet.size(0.4), dxfattribs=look)
            self.sheet.text(look, name, at, 0.3, 0.0, "MIDDLE_CENTER")


class SlantedTicks(Office):
    habit = "a slanted tick through the tendon at every height, on the layer of the heights"
    version, binary = "R2007", True
    layers, job = {**Office.layers, "height": "P-ELEV"}, '[layers]\nheights = ["P-ELEV"]\n'

    def draw_height(self, tendon, point):
        super().draw_height(tendon, point)
        x, y = tendon.place(point[1])
        self.sheet.line(self.look("height"), (x - 0.09, y - 0.09), (x + 0.09, y + 0.09))


class EndsByCode(WordsAtEnds):
    habit = "S.E. and F.E. beyond the ends, words that no default knows"
    version, live, dead = "R2000", "S.E.", "F.E."
    job = names(PLAIN) + '\n[ends]\nlive_words = ["S.E."]\ndead_words = ["F.E."]\n'


class OtherOfTwo(Office):
    habit = "two blocks at the ends, of which only the jack's is named for what it is"
    version, unit = "R2018", "cm"
    layers, live_block, dead_block = PLAIN, "JACKING-POCKET", "TYPE-B"
    job = names(PLAIN) + '\n[ends]\nlive_blocks = ["JACKING-POCKET"]\ndead_blocks = ["TYPE-B"]\n'


class GermanWords(WordsAtEnds):
    habit = "German layers; Spannanker and Festanker in words"
    version, live, dead = "R2010", "Spannanker", "Festanker"
    layers = {"banded": "SPANNGLIED-STREIFEN", "distributed": "SPANNGLIED-FELD", "height": "SPANNGLIED-KOTEN",
              "mark": "SPANNGLIED-NUMMERN", "end": "SPANNGLIED-ANKER", "edge": "DECKENRAND", "opening": "AUSSPARUNG",
              "zone": "DICKEN", "column": "STÜTZEN", "note": "TEXTE"}
    job = names(layers) + """\

[ends]
live_words = ["Spannanker"]
dead_words = ["Festanker"]
"""


class MarksApart(Office):
    habit = "marks alone on one layer, the strands on another"
    version = "R2004"
    layers = {**PLAIN, "count": "P-QTY"}
    job = names(PLAIN).replace('marks = ["P-TXT"]', 'marks = ["P-TXT", "P-QTY"]')

    def draw_mark(self, tendon):
        self.label("mark", tendon.mark, tendon, 0.5)
        size = self.banded_size if tendon.run == "banded" else self.size
        station = 5.6 if tendon.run == "banded" else 5.2
        self.sheet.text(self.sheet.look("P-QTY", 4), f"{tendon.strands}-{tendon.strand}",
                        tendon.place(station, 0.35 * size), size, tendon.along(station))


class OneHeightForAll(Office):
    habit = "lines across all distributed tendons, each with their one height at its end, on a layer that no default fits"
    version, step = "R2000", 0.0
    layers, job = {**PLAIN, "level": "P-CONST"}, names(PLAIN) + 'level_lines = ["P-CONST"]\n'

    def draw_height(self, tendon, point):
        if tendon.run == "banded":
            super().draw_height(tendon, point)

    def finish(self):
        look = self.sheet.look("P-CONST", 5)
        for kind, station, height in self.tendons[-1].points[1:-1]:
            left, right = self.distributed_x[0] - 0.4, self.distributed_x[-1] + 0.8
            self.sheet.line(look, (left, station), (right, station))
            self.sheet.text(look, self.height_text(kind, height), (right + 0.05, station), 0.15, 0.0, "MIDDLE_LEFT")


class OldRevision(Office):
    habit = "the state before, with other heights and strands, on frozen and switched-off layers"
    version, binary = "R2010", True
    layers, old = PLAIN, False
    job = names(PLAIN)

    def look(self, role):
        if self.old:
            return self.sheet.look(self.layers[role] + " (REV A)", 8, on=role != "mark", frozen=role != "mark")
        return super().look(role)

    def finish(self):
        self.old = True
        for tendon in self.tendons:
            self.sheet.polyline(self.look(tendon.run), [tendon.place(0.0), tendon.place(tendon.length())])
            self.label("mark", f"{tendon.mark} 3-12.7", tendon, 0.9)
            for kind, station, height in tendon.points[1:-1]:
                self.label("height", self.height_text(kind, height + 10), tendon, station)
        self.old = False


class BrokenAtColumns(Office):
    habit = "banded tendons broken where they pass through a column"
    version = "R12"
    banded_y = (0.6, 7.2, 7.9)
    layers = PLAIN
    job = names(PLAIN) + "\n[drawing]\nbridge_gap_mm = 450\n"

    def draw_line(self, tendon):
        middle = self.spans_x[0]
        through = tendon.run == "banded" and abs(tendon.plan[0][1] - self.spans_y[0]) < 0.2
        for a, b in [(0.0, middle - 0.2), (middle + 0.2, tendon.length())] if through else [(0.0, tendon.length())]:
            self.sheet.line(self.look(tendon.run), tendon.place(a), tendon.place(b))


class WordsFarOut(WordsAtEnds):
    habit = "LIVE and DEAD written 0.8 m beyond the ends"
    version, live, dead, away = "R2013", "LIVE", "DEAD", 0.8
    job = names(PLAIN) + "\n[ends]\nreach_mm = 900\n"


class UndersideByNote(Office):
    habit = "heights to the duct's underside, as a general note says"
    version, unit = "R2007", "m"
    layers = PLAIN
    job = names(PLAIN) + '\n[height]\ndatum = "duct-underside"\n'

    def written(self, point, tendon):
        return point[2] - Chairs.IN_DUCT[point[0]]

    def finish(self):
        self.note("2. HEIGHTS GIVEN ARE FROM SLAB SOFFIT TO UNDERSIDE OF DUCT.")


class BareHyphens(Inches):
    habit = "inches with a hyphen before the fraction and no word, as a count of strands might be written"
    version, unit = "R2010", "in"
    layers, job = PLAIN, names(PLAIN) + "\n" + Inches.job

    def height_text(self, kind, number):
        return f"{self.whole_and_fraction(number, '-')}\""


class FeetInName(Inches):
    habit = "drawn in inches while the drawing says feet"
    version, insunits = "R2010", 2
    layers, job = PLAIN, '[drawing]\nunit = "in"\n\n' + names(PLAIN) + "\n" + Inches.job


class LegendInWords(Office):
    habit = "circles and squares at the ends, told apart by a note that names one of them"
    version, unit = "R2010", "mm"
    layers = PLAIN
    job = names(PLAIN) + '\n[ends]\nlive_shapes = ["circle"]\ndead_shapes = ["square"]\n'

    def draw_end(self, kind, place, turn):
        x, y = place
        if kind == "live":
            self.sheet.space.add_circle(self.sheet.at(place), self.sheet.size(0.12), dxfattribs=self.look("end"))
        else:
            corners = [(x - .11, y - .11), (x + .11, y - .11), (x + .11, y + .11), (x - .11, y + .11)]
            self.sheet.polyline(self.look("end"), corners, closed=True)

    def finish(self):
        self.note("SQUARE: FIXED ANCHOR")


CASES = [GridBubbles, SlantedTicks, EndsByCode, OtherOfTwo, GermanWords, MarksApart, OneHeightForAll, OldRevision,
         BrokenAtColumns, WordsFarOut, UndersideByNote, BareHyphens, FeetInName, LegendInWords]
