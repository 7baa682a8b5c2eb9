"""Offices whose tendons go on through intermediate anchors at a pour joint."""

from .anchors import EndsByAttribute
from .floor import Office


class IntermediateAnchors(Office):
    habit = "a block on the line of each tendon that crosses one of two pour joints; a legend beside the plan"
    # Stations of the joints along the tendons that cross them.
    at = {"banded": (5.5, 11.0)}

    def meant(self):
        found = super().meant()
        for tendon in found:
            tendon.joints = list(self.at.get(tendon.run, ()))
        return found

    def prepare(self):
        super().prepare()
        half = self.sheet.size(0.1)
        block = self.sheet.block(self.between_block)
        block.add_lwpolyline([(-half, -half), (half, -half), (half, half), (-half, half)], close=True)
        block.add_line((0, -2 * half), (0, 2 * half), dxfattribs={"layer": "0"})

    between_block = "INTERMEDIATE-ANCHOR"

    def draw_line(self, tendon):
        super().draw_line(tendon)
        for station in tendon.joints:
            self.draw_between(tendon.place(station), tendon.along(station))

    def draw_between(self, place, turn):
        self.sheet.insert(self.look("end"), self.between_block, place, turn)

    def finish(self):
        width, depth = sum(self.spans_x), sum(self.spans_y)
        for station in self.at.get("banded", ()):
            self.sheet.line(self.look("note"), (station, -1.0), (station, depth + 1.0))
            self.note("POUR JOINT", (station, -1.3), 0.2)
        for station in self.at.get("distributed", ()):
            self.sheet.line(self.look("note"), (-1.0, station), (width + 1.0, station))


class TrimmedAtJoints(IntermediateAnchors):
    habit = "each pour's piece of a tendon ends at the anchor's outline, drawn from the joint outwards; the mark stands on the far piece"
    version, unit = "R2000", "m"
    between_block = "PT-IA-2"
    at = {"banded": (9.2,), "distributed": (8.6,)}
    job = """\
[ends]
intermediate_blocks = ["PT-IA-2"]
"""

    def draw_line(self, tendon):
        (joint,) = tendon.joints
        for first, last in ((joint - 0.1, 0.0), (joint + 0.1, tendon.length())):
            self.sheet.polyline(self.look(tendon.run), [tendon.place(first), tendon.place(last)])
        self.draw_between(tendon.place(joint), tendon.along(joint))

    def draw_mark(self, tendon):
        self.label("mark", self.mark_text(tendon), tendon, tendon.length() - 1.6)


class JointsByAttribute(EndsByAttribute):
    habit = "one anchor block for ends and joints; its attribute TYPE says LIVE, DEAD or INTERMEDIATE"
    version = "R2018"

    def meant(self):
        found = super().meant()
        for tendon in found:
            tendon.joints = [9.0]
        return found

    def draw_line(self, tendon):
        # In two pieces that meet at the joint.
        (joint,) = tendon.joints
        for first, last in ((0.0, joint), (tendon.length(), joint)):
            self.sheet.polyline(self.look(tendon.run), [tendon.place(first), tendon.place(last)])
        self.draw_end("intermediate", tendon.place(joint), tendon.along(joint))


CASES = [IntermediateAnchors, TrimmedAtJoints, JointsByAttribute]
