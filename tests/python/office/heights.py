"""Offices that write heights otherwise: units, fractions, words, faces, chairs, supports."""

from fractions import Fraction

from .floor import Office

INCH = 25.4


class Inches(Office):
    habit = "inches with fractions and inch signs, drawn in inches"
    version, unit = "R2000", "in"
    thickness, low, high, step = 8 * INCH, 1.25 * INCH, 6.75 * INCH, 0.25 * INCH
    strands, strand = 4, "12.7"
    job = """\
[height]
unit = "in"

[slab]
text_unit = "in"
"""

    def mark_text(self, tendon):
        return f'{tendon.mark} {tendon.strands}-0.5"'

    def thickness_text(self, thickness):
        return f'T={thickness / INCH:g}"'

    def written(self, point, tendon):
        return Fraction(point[2] / INCH).limit_denominator(16)

    def height_text(self, kind, number):
        return f"{self.whole_and_fraction(number)}\""

    def whole_and_fraction(self, number, between=" "):
        whole, rest = divmod(number, 1)
        fraction = f"{rest.numerator}/{rest.denominator}" if rest else ""
        return between.join(part for part in (str(whole) if whole else "", fraction) if part) or "0"


class HyphenFractions(Inches):
    habit = "fractions with a hyphen and no inch sign, HP and LP before; less than an inch at some lows"
    version = "R12"
    low = 0.875 * INCH
    # R12 has no $INSUNITS.
    job = """\
[drawing]
unit = "in"

""" + Inches.job

    def height_text(self, kind, number):
        return f"{ {'high': 'HP', 'low': 'LP'}[kind]} {self.whole_and_fraction(number, '-')}"


class OneCharacterFractions(Inches):
    habit = "fractions as one character, in MTEXT"
    version = "R2010"

    def height_text(self, kind, number):
        whole, rest = divmod(number, 1)
        sign = {Fraction(1, 4): "¼", Fraction(3, 4): "¾", Fraction(1, 2): "½"}.get(rest, "")
        return f"{whole}{sign}\""

    def label(self, role, content, tendon, station):
        size = self.banded_size if tendon.run == "banded" else self.size
        self.sheet.mtext(self.look(role), content, tendon.place(station, 0.35 * size), size, tendon.along(station))


class StackedFractions(OneCharacterFractions):
    habit = "fractions stacked in MTEXT, with the height and alignment codes CAD writes round them"
    version, unit = "R2013", "ft"

    def height_text(self, kind, number):
        whole, rest = divmod(number, 1)
        return f"\\A1;{whole}{{\\H0.7x;\\S{rest.numerator}/{rest.denominator};}}\""


class DecimalInches(Inches):
    habit = "decimal inches without a sign, H and L behind; the thickness in words"
    version, binary = "R2018", True

    def height_text(self, kind, number):
        return f"{float(number):.2f} {kind[0].upper()}"

    def thickness_text(self, thickness):
        return f'{thickness / INCH:g}" THK. SLAB'


class Centimetres(Office):
    habit = "heights in centimetres with a decimal comma on a drawing in centimetres, thickness too"
    version, unit = "R2007", "cm"
    low, high = 35.0, 162.5
    job = """\
[height]
unit = "cm"

[slab]
text_unit = "cm"
"""

    def written(self, point, tendon):
        return point[2] / 10

    def thickness_text(self, thickness):
        return f"T{thickness / 10:g}"

    def height_text(self, kind, number):
        return super().height_text(kind, number).replace(".", ",")


class Metres(Office):
    habit = "heights in metres, three decimals, no words; drawn in metres"
    version, unit = "R2004", "m"
    job = """\
[height]
unit = "m"

[slab]
text_unit = "m"
"""

    def written(self, point, tendon):
        return point[2] / 1000

    def height_text(self, kind, number):
        return f"{number:.3f}"

    def thickness_text(self, thickness):
        return f"T={thickness / 1000:.2f} m"


class FromTop(Office):
    habit = "heights down from the top of the slab, bare numbers"
    version = "R2010"
    job = """\
[height]
from = "top"
"""

    def written(self, point, tendon):
        return self.local(tendon.place(point[1])) - point[2]

    def height_text(self, kind, number):
        return f"{number:g}"


class NearerFace(Office):
    habit = "distances to the nearer face, with words"
    version = "R12"
    job = """\
[height]
from = "nearer-face"
"""

    def written(self, point, tendon):
        return point[2] if point[0] == "low" else self.local(tendon.place(point[1])) - point[2]


class Chairs(Office):
    habit = "chair heights, to the duct's underside, at every metre; high and low points in words"
    version, binary = "R2013", True
    job = """\
[height]
datum = "chair"
"""
    # Strand above the duct's underside: at a low point, at a high one, elsewhere (defaults of the job file).
    IN_DUCT = {"low": 13.0, "high": 7.0, "support": 10.0}

    def profile(self, tendon, spans):
        found = super().profile(tendon, spans)
        points = list(found)
        for (_, a, low), (_, b, high) in zip(found[1:], found[2:-1]):
            # Straight between, to fives of the chair: a support does not bend the curve.
            for step in range(1, int(b - a) + 1):
                if b - a - step > 0.6:
                    height = low + (high - low) * step / (b - a)
                    points.append(("support", a + step, 5 * round((height - 10) / 5) + 10))
        return sorted(points, key=lambda point: point[1])

    def written(self, point, tendon):
        return point[2] - self.IN_DUCT[point[0]]


class BareChairs(Chairs):
    habit = "the same without a word: high and low are told by what stands beside them"
    version, binary = "R2000", False

    def height_text(self, kind, number):
        return f"{number:g}"


class FeetAndInches(Inches):
    habit = "feet and inches, 0'-6 3/4\", after HP: and LP:"
    version = "R2010"

    def height_text(self, kind, number):
        return f"{kind[0].upper()}P: 0'-{self.whole_and_fraction(number)}\""


class WordsBehind(Office):
    habit = "TOP and BOT behind the number in brackets, the thickness as 200 THK"
    version, unit = "R2007", "m"
    job = """\
[height]
high_words = ["TOP"]
low_words = ["BOT"]
"""

    def height_text(self, kind, number):
        return f"{number:g} ({'TOP' if kind == 'high' else 'BOT'})"

    def thickness_text(self, thickness):
        return f"{thickness:g} THK"


class MidDepth(Office):
    habit = "T/2 at every end and c.g.s. heights with an equals sign"
    version = "R2000"
    job = """\
[height]
high_words = ["CGS HIGH"]
low_words = ["CGS LOW"]
"""

    def shown(self, point):
        return True

    def height_text(self, kind, number):
        return "T/2" if kind == "anchor" else f"CGS {kind.upper()} = {number:g}"

    def label(self, role, content, tendon, station):
        inwards = {0.0: 0.1, tendon.length(): tendon.length() - 0.45}.get(station, station)
        super().label(role, content, tendon, inwards if content == "T/2" else station)


class AnchorHeights(Office):
    habit = "bare numbers at every point, the anchors' too, all written within the tendon's length"
    version = "R2010"

    def profile(self, tendon, spans):
        found = super().profile(tendon, spans)
        return [("anchor", found[0][1], 110.0), *found[1:-1], ("anchor", found[-1][1], 110.0)]

    def shown(self, point):
        return True

    def height_text(self, kind, number):
        return f"{number:g}"

    def label(self, role, content, tendon, station):
        size = self.banded_size if tendon.run == "banded" else self.size
        within = 2.8 * size
        super().label(role, content, tendon, {0.0: 0.05, tendon.length(): tendon.length() - within}.get(station, station))


class OwnPatterns(Office):
    habit = "a height from the soffit and one from the top in one drawing, told by letters: b30, t35"
    version = "R2018"
    job = """\
[height]
patterns = [
  { name = "up from the soffit", expression = '^b(?<value>\\d+)$', from = "soffit", word = "low" },
  { name = "down from the top", expression = '^t(?<value>\\d+)$', from = "top", word = "high" },
]
"""

    def written(self, point, tendon):
        return point[2] if point[0] == "low" else self.thickness - point[2]

    def height_text(self, kind, number):
        return f"{'b' if kind == 'low' else 't'}{number:g}"


CASES = [Inches, HyphenFractions, OneCharacterFractions, StackedFractions, DecimalInches, Centimetres, Metres, FromTop, NearerFace,
         Chairs, BareChairs, FeetAndInches, WordsBehind, MidDepth, AnchorHeights, OwnPatterns]
