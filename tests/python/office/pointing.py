"""Offices whose labels point: leaders, ticks, one label and one line for a group."""

from ezdxf.math import Vec2
from ezdxf.render.mleader import ConnectionSide

from .floor import Office


class Leaders(Office):
    habit = "every height of a distributed tendon off to its right, nearer to the next, with a LEADER to its point"
    version = "R2000"

    def draw_height(self, tendon, point):
        kind, station, height = point
        if tendon.run == "banded":
            super().draw_height(tendon, point)
            return
        tip, foot = tendon.place(station), tendon.place(station - 0.5, -1.0)
        self.sheet.space.add_leader([self.sheet.at(p) for p in (tip, foot)], dxfattribs=self.look("height"))
        self.sheet.text(self.look("height"), self.height_text(kind, height), (foot[0] + 0.05, foot[1] - 0.07), self.size)


class MultiLeaders(Leaders):
    habit = "the same with MULTILEADER"
    version = "R2010"

    def draw_height(self, tendon, point):
        kind, station, height = point
        if tendon.run == "banded":
            Office.draw_height(self, tendon, point)
            return
        tip, foot = self.sheet.at(tendon.place(station)), self.sheet.at(tendon.place(station - 0.5, -1.0))
        self.look("height")
        made = self.sheet.space.add_multileader_mtext("Standard", dxfattribs={"layer": self.layers["height"]})
        made.set_content(self.height_text(kind, height), char_height=self.sheet.size(self.size))
        made.add_leader_line(ConnectionSide.left, [Vec2(tip)])
        made.build(insert=Vec2(foot))


class Ticks(Office):
    habit = "a tick on the tendon at each point, its label a little farther along"
    version = "R2007"
    job = """\
[labels]
tick_blocks = ["PT-TICK"]
"""

    def prepare(self):
        super().prepare()
        half = self.sheet.size(0.08)
        self.sheet.block("PT-TICK").add_line((-half, -half), (half, half), dxfattribs={"layer": "0"})

    def draw_height(self, tendon, point):
        kind, station, height = point
        self.sheet.insert(self.look("height"), "PT-TICK", tendon.place(station), tendon.along(station))
        self.label("height", self.height_text(kind, height), tendon, station + 0.3)


class Groups(Office):
    habit = "one typical distributed tendon for a group, with an extent line and D01-D05 @ 1200"
    version, step = "R2010", 0.0
    distributed_x = (1.6, 2.8, 4.0, 5.2, 6.4)
    layers = {**Office.layers, "extent": "TENDON-EXTENT"}
    colours = {**Office.colours, "extent": 40}

    def meant(self):
        found = super().meant()
        for tendon in found:
            if tendon.run == "distributed":
                tendon.ends = ("live", "dead")
        return found

    def draw(self):
        everything = self.tendons
        self.tendons = [t for t in everything if t.run == "banded" or t.mark == "D03"]
        super().draw()
        self.tendons = everything
        return self.sheet

    def draw_mark(self, tendon):
        if tendon.run == "banded":
            super().draw_mark(tendon)
        else:
            self.label("mark", f"{tendon.strands}-{tendon.strand}", tendon, 0.9)
            self.label("mark", "D01-D05 @ 1200", tendon, 5.2)

    def finish(self):
        self.sheet.line(self.look("extent"), (1.6, 5.0), (6.4, 5.0))


CASES = [Leaders, MultiLeaders, Ticks, Groups]
