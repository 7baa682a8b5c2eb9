"""Offices that write marks and strands otherwise, and texts as CAD holds them."""

from ezdxf.enums import TextEntityAlignment

from .floor import Office
from .heights import Inches

KIP = 4.4482216152605
FOOT = 0.3048


class SingleStrands(Inches):
    habit = "counts of single-strand tendons, 12T, with the mark on a text of its own"
    version, unit = "R2000", "in"
    strands, strand = 1, "12.7"
    job = Inches.job + """\

[labels]
mark_patterns = [
  { name = "single strands", expression = '^(?<tendons>\\d+)T$', strands = 1, strand = "12.7" },
  '^(?<mark>[BD]-\\d+)$',
]
"""

    def mark(self, letter, number):
        return f"{letter}-{number + 1}"

    def count(self, run):
        return 12 if run == "banded" else 3

    def draw_mark(self, tendon):
        self.label("mark", tendon.mark, tendon, 0.7)
        self.label("mark", f"{tendon.tendons}T", tendon, 5.9 if tendon.run == "banded" else 5.4)


class SpacedStrands(SingleStrands):
    habit = "single-strand tendons at a spacing, no marks at all; the banded ones with a force behind"
    version, binary = "R2010", False
    job = Inches.job + """\

[labels]
mark_patterns = [
  { name = "at a spacing", expression = '^(?<tendons>\\d+)T @ .*$', strands = 1, strand = "12.7" },
  { name = "with a force", expression = '^(?<tendons>\\d+)T \\((?<force>\\d+) K\\)$', unit = "kip", strands = 1, strand = "12.7" },
]
"""

    def mark(self, letter, number):
        return None

    def tendon(self, *arguments):
        made = super().tendon(*arguments)
        if made.run == "banded":
            made.required_kn = 324 * KIP
        return made

    def draw_mark(self, tendon):
        text = f'{tendon.tendons}T @ 28" O.C.' if tendon.run == "distributed" else f"{tendon.tendons}T (324 K)"
        self.label("mark", text, tendon, 0.7)


class RequiredForces(Inches):
    habit = "forces instead of strands: kips for banded tendons, kips per foot for distributed ones"
    version = "R2004"
    strands, strand = None, None

    def tendon(self, *arguments):
        made = super().tendon(*arguments)
        if made.run == "banded":
            made.required_kn = 324 * KIP
        else:
            made.required_kn_per_m = 40.5 * KIP / FOOT
        return made

    def mark_text(self, tendon):
        return f"{tendon.mark} {'324 KIPS' if tendon.run == 'banded' else '40.5 K/FT'}"


class DuctsByStrands(Office):
    habit = "ducts by strands, 3x5S15.2, above the tendon's name on a text of its own"
    version = "R12"
    strands, strand = 5, "15.2"

    def count(self, run):
        return 3 if run == "banded" else 1

    def draw_mark(self, tendon):
        self.label("mark", tendon.mark, tendon, 0.7)
        many = f"{tendon.tendons}x" if tendon.tendons > 1 else ""
        self.label("mark", f"{many}{tendon.strands}S{tendon.strand}", tendon, 5.9 if tendon.run == "banded" else 5.4)


class OtherMarks(Office):
    habit = "marks of another make, 3PT-N-07, and the strands in words; their size in a note"
    version, unit = "R2007", "mm"
    strand = "12.7"
    job = """\
[tendon]
default_strand = "12.7"

[labels]
mark_patterns = ['^(?<mark>\\dPT-[NE]-\\d+)\\s*/\\s*(?<strands>\\d+) STRANDS$']
"""

    def mark(self, letter, number):
        return f"3PT-{'E' if letter == 'B' else 'N'}-{number + 1:02}"

    def mark_text(self, tendon):
        return f"{tendon.mark} / {tendon.strands} STRANDS"

    def finish(self):
        self.note("ALL STRANDS 12.7 mm DIA. U.N.O.")


class Diameters(Office):
    habit = "a diameter sign as %%c in TEXT, as U+00D8 in another, marks in brackets"
    version = "R2000"
    strand = "12.9"

    def mark_text(self, tendon):
        sign = "%%c" if tendon.run == "banded" else "\\U+00D8"
        return f"{tendon.mark} ({tendon.strands}-{sign}12.9)"


class ManyLines(Office):
    habit = "mark, strands and the first height in one MTEXT of three lines"
    version = "R2010"

    def draw_mark(self, tendon):
        kind, station, height = tendon.points[1]
        size = self.banded_size if tendon.run == "banded" else self.size
        content = f"{tendon.mark}\\P{tendon.strands}-{tendon.strand}\\PL{height:g}"
        self.sheet.mtext(self.look("mark"), content, tendon.place(station, 0.35 * size), size, tendon.along(station), 8)

    def draw_height(self, tendon, point):
        if point is not tendon.points[1]:
            super().draw_height(tendon, point)


class MtextCodes(Office):
    habit = "MTEXT with fonts, colours, widths and tracking inside, and a background mask"
    version = "R2018"

    def label(self, role, content, tendon, station):
        size = self.banded_size if tendon.run == "banded" else self.size
        content = f"{{\\fArial|b0|i0|c0|p34;\\C1;\\W0.80000;\\T1.1;\\Q10;{content}}}"
        text = self.sheet.mtext(self.look(role), content, tendon.place(station, 0.35 * size), size, tendon.along(station))
        text.set_bg_color("canvas", scale=1.1)


class ObliqueText(Office):
    habit = "a text style with width and oblique angle, middle-centred, turned upside down for half of the tendons"
    version, unit = "R2004", "mm"

    def prepare(self):
        super().prepare()
        self.sheet.doc.styles.add("SLANT", font="romans.shx", dxfattribs={"width": 0.75, "oblique": 15.0})

    def label(self, role, content, tendon, station):
        size = self.banded_size if tendon.run == "banded" else self.size
        turned = tendon.along(station) + (180.0 if int(tendon.mark[1:]) % 2 else 0.0)
        self.sheet.text(self.look(role), content, tendon.place(station, 0.85 * size), size, turned, "MIDDLE_CENTER",
                        style="SLANT", width=0.75, oblique=15.0)


class LevelText(Office):
    habit = "all texts level with the sheet, right of upright tendons; marks in inches of strand, 4x0.6\""
    version, binary = "R2000", True
    strands, strand = 4, "15.2"

    def mark_text(self, tendon):
        return f'{tendon.mark} {tendon.strands}x0.6"'

    def label(self, role, content, tendon, station):
        size = self.banded_size if tendon.run == "banded" else self.size
        align = "BOTTOM_CENTER" if tendon.run == "banded" else "MIDDLE_LEFT"
        off = 0.3 * size if tendon.run == "banded" else -0.5 * size
        self.sheet.text(self.look(role), content, tendon.place(station, off), size, 0.0, align)


class MarksTwice(Office):
    habit = "the mark with the strands at both ends of every tendon, heights with a mask of their own text style"
    version = "R2013"

    def draw_mark(self, tendon):
        self.label("mark", self.mark_text(tendon), tendon, 0.9)
        self.label("mark", self.mark_text(tendon), tendon, tendon.length() - 2.4)


class MarkBubbles(Office):
    habit = "the mark in a bubble beyond the tendon's start, the strands beside the tendon"
    version, binary = "R2010", True
    job = """\
[labels]
reach_text_heights = 5
"""

    def prepare(self):
        super().prepare()
        block = self.sheet.block("PT-BUBBLE")
        block.add_circle((0, 0), self.sheet.size(0.24), dxfattribs={"layer": "0"})
        block.add_attdef("NO", dxfattribs={"height": self.sheet.size(0.12), "layer": "0"}).set_placement(
            (0, 0), align=TextEntityAlignment.MIDDLE_CENTER)

    def draw_mark(self, tendon):
        insert = self.sheet.insert(self.look("mark"), "PT-BUBBLE", tendon.place(-0.5))
        insert.add_auto_attribs({"NO": tendon.mark})
        self.label("mark", f"{tendon.strands}-{tendon.strand}", tendon, 0.9)


class CloseBands(Office):
    habit = "bands of four tendons 250 mm apart with small texts between them"
    version = "R2007"
    banded_y, banded_size = (6.7, 6.95, 7.45, 7.7), 0.09


CASES = [SingleStrands, SpacedStrands, RequiredForces, DuctsByStrands, OtherMarks, Diameters, ManyLines, MtextCodes,
         ObliqueText, LevelText, MarksTwice, MarkBubbles, CloseBands]
