"""A drawing in which everything is said in metres on an unturned plan."""

import logging
import math

import ezdxf
from ezdxf.enums import TextEntityAlignment

logging.getLogger("ezdxf").setLevel(logging.ERROR)
# No dates, no identifiers by chance: the same script draws the same bytes.
ezdxf.options.write_fixed_meta_data_for_testing = True

UNITS = {"mm": (4, 0.001), "cm": (5, 0.01), "m": (6, 1.0), "in": (1, 0.0254), "ft": (2, 0.3048)}


class Sheet:
    """What an office draws on: version, unit, origin, turn."""

    def __init__(self, version, unit, origin, turn, encoding, insunits):
        code, self.unit_m = UNITS[unit]
        self.version, self.origin, self.turn = version, origin, turn
        self.doc = ezdxf.new(version)
        self.doc.header["$INSUNITS"] = code if insunits is None else insunits
        if encoding:
            self.doc.encoding = encoding
        self.space = self.doc.modelspace()
        # Where a place of the plan lies in the block that is drawn into, and the block's unit; none in model space.
        self.frame, self.frame_m = None, 1.0

    def into(self, block, frame, unit_m):
        """From now on things are drawn into a block."""
        self.space, self.frame, self.frame_m = block, frame, unit_m

    def back(self):
        self.space, self.frame = self.doc.modelspace(), None

    def metres(self, x, y):
        """Where a place of the plan lies in the drawing, metres."""
        c, s = math.cos(math.radians(self.turn)), math.sin(math.radians(self.turn))
        return (self.origin[0] + c * x - s * y, self.origin[1] + s * x + c * y)

    def at(self, place):
        """The same in the drawing's unit."""
        if self.frame:
            x, y = self.frame(place)
            return (x / self.frame_m, y / self.frame_m)
        x, y = self.metres(*place)
        return (x / self.unit_m, y / self.unit_m)

    def size(self, metres):
        return metres / (self.frame_m if self.frame else self.unit_m)

    def turned(self, rotation):
        return rotation if self.frame else rotation + self.turn

    def look(self, layer, colour=7, linetype=None, on=True, frozen=False):
        """A layer, there from now on."""
        if linetype and linetype not in self.doc.linetypes:
            self.doc.linetypes.add(linetype, pattern=[0.6, 0.4, -0.2])
        if layer not in self.doc.layers:
            made = self.doc.layers.add(layer, color=colour)
            if frozen:
                made.freeze()
            if not on:
                made.off()
        return {"layer": layer}

    def line(self, look, a, b):
        return self.space.add_line(self.at(a), self.at(b), dxfattribs=look)

    def polyline(self, look, places, closed=False, width=0.0, bulges=None):
        bulges = bulges or [0.0] * len(places)
        points = [(*self.at(p), self.size(width), self.size(width), b) for p, b in zip(places, bulges)]
        if self.version == "R12":
            return self.space.add_polyline2d(points, format="xyseb", close=closed, dxfattribs=look)
        return self.space.add_lwpolyline(points, format="xyseb", close=closed, dxfattribs=look)

    def text(self, look, content, place, height, rotation=0.0, align="LEFT", **more):
        text = self.space.add_text(content, height=self.size(height), rotation=self.turned(rotation),
                                   dxfattribs={**look, **more})
        text.set_placement(self.at(place), align=TextEntityAlignment[align])
        return text

    def mtext(self, look, content, place, height, rotation=0.0, attachment=7, **more):
        return self.space.add_mtext(content, dxfattribs={
            **look, "insert": self.at(place), "char_height": self.size(height), "rotation": self.turned(rotation),
            "attachment_point": attachment, **more})

    def block(self, name):
        """A new block, in drawing units round its origin; drawn into by ezdxf's own calls."""
        return self.doc.blocks.new(name)

    def insert(self, look, block, place, rotation=0.0, **more):
        return self.space.add_blockref(block, self.at(place), dxfattribs={
            **look, "rotation": self.turned(rotation), **more})

    def save(self, path, binary):
        # ezdxf lists classes in the order of a set, which differs from run to run.
        for name in sorted(self.doc.entitydb.dxf_types_in_use()):
            self.doc.classes.add_class(name)
        self.doc.saveas(path, fmt="bin" if binary else "asc")
