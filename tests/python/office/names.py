"""Offices that name and show things otherwise: layers, references, colours, code pages, what is hidden, runs."""

from .floor import Office


class PlainR12Binary(Office):
    habit = "the plain habit, in binary R12, tendons as LINE pieces drawn either way, three spans"
    version, binary = "R12", True
    spans_x = (7.5, 8.0, 7.5)
    banded_y = (0.6, 7.2)

    def draw_line(self, tendon):
        look, half = self.look(tendon.run), tendon.length() * 0.4
        self.sheet.line(look, tendon.place(0.0), tendon.place(half))
        self.sheet.line(look, tendon.place(tendon.length()), tendon.place(half))


class CyrillicCodePage(Office):
    habit = "Cyrillic layers and words for high and low in the code page 1251 of R2000"
    version, encoding = "R2000", "cp1251"
    layers = {"banded": "Арматура-ряд", "distributed": "Арматура-поле", "height": "Отметки", "mark": "Марки",
              "end": "Анкеры", "edge": "Плита-контур", "opening": "Проёмы", "zone": "Плита-зоны", "column": "Колонны",
              "note": "Текст"}
    live_block, dead_block = "АКТИВНЫЙ", "ПАССИВНЫЙ"
    job = """\
[layers]
banded = ["Арматура-ряд"]
distributed = ["Арматура-поле"]
heights = ["Отметки"]
marks = ["Марки"]
ends = ["Анкеры"]
slab_edge = ["Плита-контур"]
slab_zone = ["Плита-зоны"]
column = ["Колонны"]

[ends]
live_blocks = ["АКТИВНЫЙ"]
dead_blocks = ["ПАССИВНЫЙ"]

[height]
high_words = ["В"]
low_words = ["Н"]
"""

    def height_text(self, kind, number):
        return f"{ {'high': 'В', 'low': 'Н'}[kind]}={number:g}"


class ChineseCodePage(Office):
    habit = "Chinese layers and words in the code page 936 of R2004, whose second bytes may be backslashes"
    version, encoding = "R2004", "gbk"
    layers = {**Office.layers, "banded": "预应力筋-带", "distributed": "预应力筋-布", "height": "标高", "mark": "编号",
              "end": "锚具", "zone": "板厚"}
    job = """\
[layers]
banded = ["预应力筋-带"]
distributed = ["预应力筋-布"]
heights = ["标高"]
marks = ["编号"]
ends = ["锚具"]
slab_zone = ["板厚"]

[height]
high_words = ["高"]
low_words = ["低"]
"""

    def height_text(self, kind, number):
        return f"{ {'high': '高', 'low': '低'}[kind]}{number:g}"


class EscapedNames(Office):
    habit = "layer names outside the code page, written with U+ escapes in R2000"
    version, encoding = "R2000", "cp1252"
    layers = {**Office.layers, "banded": "Šķiedra-A", "distributed": "Šķiedra-B", "height": "Augstums-ķ"}
    job = """\
[layers]
banded = ["Šķiedra-A"]
distributed = ["Šķiedra-B"]
heights = ["Augstums-ķ"]
"""


class BoundReference(Office):
    habit = "a bound reference: every layer and block behind its prefix"
    version = "R2013"
    layers = {role: f"L02-PT$0${name}" for role, name in Office.layers.items()}
    live_block, dead_block = "L02-PT$0$LIVE-END", "L02-PT$0$DEAD-END"


class OneLayerByColour(Office):
    habit = "everything on one layer, told by the colour of the entity"
    version = "R2007"
    layers = dict.fromkeys(Office.layers, "S-PT")
    job = """\
[layers]
banded = ["S-PT@colour=1"]
distributed = ["S-PT@colour=5"]
heights = ["S-PT@colour=3"]
marks = ["S-PT@colour=2"]
ends = ["S-PT@colour=6"]
slab_edge = ["S-PT@colour=7"]
slab_zone = ["S-PT@colour=30"]
column = ["S-PT@colour=8"]
"""

    def look(self, role):
        return {**self.sheet.look("S-PT"), "color": self.colours[role]}


class OneLayerByLinetype(Office):
    habit = "everything on layer 0; tendons told by linetype, labels in one colour, the slab by its own layers"
    version = "R2000"
    layers = {**Office.layers, **dict.fromkeys(("banded", "distributed", "height", "mark", "end"), "0")}
    linetypes = {"banded": "PHANTOM2", "distributed": "DASHED"}
    job = """\
[layers]
banded = ["0@linetype=PHANTOM*"]
distributed = ["0@linetype=DASHED"]
heights = ["0"]
marks = ["0"]
ends = ["0"]
"""

    def look(self, role):
        linetype = self.linetypes.get(role)
        found = dict(self.sheet.look(self.layers[role], self.colours[role], linetype))
        return {**found, "linetype": linetype} if linetype else found


class FrozenHeights(Office):
    habit = "heights on a frozen layer, marks on one that is off"
    version, binary = "R2018", True

    def look(self, role):
        return self.sheet.look(self.layers[role], self.colours[role], on=role != "mark", frozen=role == "height")


class RunsByDirection(Office):
    habit = "tendons of both runs on one layer, told by their direction; labels beside them on one layer"
    version, unit = "R2010", "m"
    layers = {**Office.layers, "banded": "PT-CABLES", "distributed": "PT-CABLES", "height": "PT-TXT", "mark": "PT-TXT",
              "end": "PT-ANCHORS"}
    job = """\
[drawing]
banded_along_deg = 0

[layers]
tendons = ["PT-CABLES"]
heights = ["PT-TXT"]
marks = ["PT-TXT"]
ends = ["PT-ANCHORS"]
"""


class TurnedPlan(RunsByDirection):
    habit = "the same on a plan turned by 33.5 degrees, origin at 1e6 m, in millimetres"
    version, unit, binary = "R2018", "mm", False
    turn, origin = 33.5, (1_000_000.0, 2_000_000.0)
    job = RunsByDirection.job.replace("banded_along_deg = 0", "banded_along_deg = 33.5")


class BandedUpright(RunsByDirection):
    habit = "banded tendons run up the sheet, in feet"
    version, unit = "R2000", "ft"
    job = RunsByDirection.job.replace("banded_along_deg = 0", "banded_along_deg = 90")

    distributed_y, banded_x = (1.6, 3.2, 4.8, 9.0), (0.6, 7.7, 8.3)

    def meant(self):
        width, depth = sum(self.spans_x), sum(self.spans_y)
        return ([self.tendon("B", number, "banded", [(x, 0.0), (x, depth)], self.spans_y)
                 for number, x in enumerate(self.banded_x)]
                + [self.tendon("D", number, "distributed", [(0.0, y), (width, y)], self.spans_x)
                   for number, y in enumerate(self.distributed_y)])


CASES = [PlainR12Binary, CyrillicCodePage, ChineseCodePage, EscapedNames, BoundReference, OneLayerByColour,
         OneLayerByLinetype, FrozenHeights, RunsByDirection, TurnedPlan, BandedUpright]
