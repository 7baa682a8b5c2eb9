"""Offices that mark the ends of tendons otherwise: attributes, words, shapes, blocks of their own."""

import math

from .floor import Office


class EndsByAttribute(Office):
    habit = "one anchor block for both kinds; its attribute TYPE says LIVE or DEAD"
    version = "R2013"
    job = """\
[ends]
blocks = ["PT_ANCHOR"]
attributes = ["TYPE"]
"""

    def prepare(self):
        s = self.sheet.size
        block = self.sheet.block("PT_ANCHOR")
        block.add_lwpolyline([(0, s(-0.1)), (s(0.15), s(-0.1)), (s(0.15), s(0.1)), (0, s(0.1))], close=True)
        block.add_attdef("NO", (0, s(0.3)), dxfattribs={"height": s(0.08)})
        block.add_attdef("TYPE", (0, s(0.15)), dxfattribs={"height": s(0.08), "invisible": True})

    def draw_end(self, kind, place, turn):
        insert = self.sheet.insert(self.look("end"), "PT_ANCHOR", place, turn)
        insert.add_auto_attribs({"TYPE": kind.upper(), "NO": "A1"})


class EndsByLetter(EndsByAttribute):
    habit = "the attribute says S (stressed) or F (fixed), words that the job has to know"
    version, binary = "R2004", True
    job = """\
[ends]
blocks = ["PT_ANCHOR"]
attributes = ["TYPE"]
live_words = ["S"]
dead_words = ["F"]
"""

    def draw_end(self, kind, place, turn):
        insert = self.sheet.insert(self.look("end"), "PT_ANCHOR", place, turn)
        insert.add_auto_attribs({"TYPE": "S" if kind == "live" else "F", "NO": "A1"})


class EndsByWord(Office):
    habit = "no symbols: LE and DE written at the ends"
    version = "R12"

    def draw_end(self, kind, place, turn):
        angle = math.radians(turn)
        where = (place[0] + 0.25 * math.cos(angle), place[1] + 0.25 * math.sin(angle))
        self.sheet.text(self.look("end"), "LE" if kind == "live" else "DE", where, 0.15, 0.0, "MIDDLE_CENTER")


class EndsInWords(EndsByWord):
    habit = "LIVE END and FIXED END written along the tendon beyond its ends, on the layer of marks"
    version = "R2007"

    def draw_end(self, kind, place, turn):
        angle = math.radians(turn)
        where = (place[0] + 0.15 * math.cos(angle), place[1] + 0.15 * math.sin(angle))
        along = turn % 180.0
        start = abs(along - turn % 360.0) < 1e-6
        self.sheet.text(self.look("mark"), "LIVE END" if kind == "live" else "FIXED END", where, 0.12, along,
                        "MIDDLE_LEFT" if start else "MIDDLE_RIGHT")


class Triangles(Office):
    habit = "a solid triangle at a live end, a short bar across a dead one, no blocks"
    version = "R2000"
    job = """\
[ends]
live_shapes = ["solid"]
dead_shapes = ["bar"]
"""

    def draw_end(self, kind, place, turn):
        c, s = math.cos(math.radians(turn)), math.sin(math.radians(turn))

        def beside(along, off):
            return (place[0] + c * along - s * off, place[1] + s * along + c * off)
        if kind == "live":
            corners = [beside(0.0, 0.0), beside(0.22, 0.1), beside(0.22, -0.1)]
            self.sheet.space.add_solid([self.sheet.at(p) for p in corners], dxfattribs=self.look("end"))
        else:
            self.sheet.line(self.look("end"), beside(0.0, 0.12), beside(0.0, -0.12))


class CirclesAndSquares(Triangles):
    habit = "a circle at a live end, a square at a dead one, with a legend"
    version, unit = "R2010", "cm"
    job = """\
[ends]
live_shapes = ["circle"]
dead_shapes = ["square"]
"""

    def draw_end(self, kind, place, turn):
        x, y = place
        if kind == "live":
            self.sheet.space.add_circle(self.sheet.at(place), self.sheet.size(0.1), dxfattribs=self.look("end"))
        else:
            self.sheet.polyline(self.look("end"), [(x - .1, y - .1), (x + .1, y - .1), (x + .1, y + .1), (x - .1, y + .1)],
                                closed=True)

    def finish(self):
        self.draw_end("live", (0.0, -1.5), 0.0)
        self.note("STRESSING END", (0.5, -1.6), 0.2)
        self.draw_end("dead", (0.0, -2.2), 0.0)
        self.note("DEAD END", (0.5, -2.3), 0.2)


class OwnBlocks(Office):
    habit = "end blocks of the office's own names, told by a legend; drawn with an offset base point and a scale"
    version = "R2010"
    live_block, dead_block = "SYM-07", "SYM-08"
    job = """\
[ends]
live_blocks = ["SYM-07"]
dead_blocks = ["SYM-08"]
"""

    def draw_end(self, kind, place, turn):
        name = self.live_block if kind == "live" else self.dead_block
        self.sheet.insert(self.look("end"), name, place, turn, xscale=1.5, yscale=-1.5)

    def finish(self):
        for name, words, y in ((self.live_block, "LIVE (STRESSING) END", -1.5), (self.dead_block, "DEAD END", -2.2)):
            self.sheet.insert(self.look("note"), name, (0.0, y))
            self.note(words, (0.6, y - 0.1), 0.2)


CASES = [EndsByAttribute, EndsByLetter, EndsByWord, EndsInWords, Triangles, CirclesAndSquares, OwnBlocks]
