"""One little floor plan in every DXF version that the writer knows, ASCII and binary."""
import sys, ezdxf
from ezdxf.enums import TextEntityAlignment as A

def draw(version):
    doc = ezdxf.new(version, units=4)
    if version == "R12":
        doc.header["$INSUNITS"] = 4
    msp = doc.modelspace()
    for name, colour in [("TENDON-BANDED", 1), ("TENDON-HEIGHT", 3), ("SLAB-EDGE", 7), ("BACKGROUND", 8), ("TENDON-END", 5)]:
        doc.layers.add(name, color=colour)
    doc.layers.get("BACKGROUND").freeze()
    doc.layers.get("SLAB-EDGE").off()
    end = doc.blocks.new("LIVE-END", base_point=(10, 0))
    end.add_line((10, -50), (10, 50), dxfattribs={"layer": "0"})
    end.add_circle((10, 0), 25, dxfattribs={"layer": "TENDON-END"})
    end.add_attdef("JACK", (60, 0), dxfattribs={"height": 100, "layer": "0"})
    pair = doc.blocks.new("PAIR")
    pair.add_blockref("LIVE-END", (0, 0), dxfattribs={"layer": "0", "rotation": 90})
    pair.add_blockref("LIVE-END", (500, 0), dxfattribs={"layer": "TENDON-END", "xscale": -1})
    at = {"layer": "TENDON-BANDED"}
    msp.add_line((0, 0), (12000, 0), dxfattribs=at)
    bulged = [(0, 1000, 0), (6000, 1000, 0.2), (9000, 2500, -0.1), (15000, 2500, 0)]
    if version == "R12":
        msp.add_polyline2d(bulged, format="xyb", dxfattribs=at)
    else:
        msp.add_lwpolyline(bulged, format="xyb", dxfattribs=at)
    msp.add_polyline2d([(0, 0, 0), (8000, 0, 1), (8000, 6000, 0), (0, 6000, 0.3)], format="xyb", close=True, dxfattribs={"layer": "SLAB-EDGE"})
    msp.add_polyline3d([(0, 3000, 10), (5000, 3000, -200), (9000, 4000, 0)], dxfattribs=at)
    msp.add_arc((2000, 2000), 1500, 30, 120, dxfattribs=at)
    msp.add_arc((2000, 2000, 5), 1500, 30, 120, dxfattribs={**at, "extrusion": (0, 0, -1)})
    msp.add_circle((4000, 4000), 300, dxfattribs={"layer": "SLAB-EDGE"})
    high = {"layer": "TENDON-HEIGHT", "height": 150}
    msp.add_text("H165", dxfattribs=high).set_placement((100, 200))
    msp.add_text("%%c15 \u00b1", dxfattribs={**high, "rotation": 90}).set_placement((3000, 200), align=A.MIDDLE_CENTER)
    msp.add_text("L30", dxfattribs=high).set_placement((5000, 200), align=A.TOP_RIGHT)
    ref = msp.add_blockref("LIVE-END", (12000, 0), dxfattribs={"layer": "TENDON-END", "rotation": 30})
    ref.add_attrib("JACK", "2-STAGE", (12060, 0), dxfattribs={"height": 100, "layer": "0"})
    msp.add_blockref("PAIR", (0, 9000), dxfattribs={"layer": "TENDON-END", "xscale": 2, "yscale": 2, "column_count": 2, "column_spacing": 4000})
    msp.add_blockref("PAIR", (7000, 9000), dxfattribs={"layer": "BACKGROUND"})
    msp.add_line((0, 0), (1, 1), dxfattribs={"layer": "BACKGROUND"})
    return doc

def more(doc):
    msp = doc.modelspace()
    msp.add_spline([(0, 5000), (4000, 7000), (9000, 4000), (14000, 5500)], dxfattribs={"layer": "TENDON-BANDED"}).dxf.layer
    msp.add_open_spline([(0, 8000), (3000, 9000), (6000, 7000), (9000, 8000), (12000, 8500)], dxfattribs={"layer": "TENDON-BANDED"})
    msp.add_mtext("H165\\P{\\H0.7x;5\\S1/4;} \u00d8", dxfattribs={"layer": "TENDON-HEIGHT", "char_height": 150, "insert": (700, 800), "attachment_point": 5, "rotation": 30})

if __name__ == "__main__":
    for v in ["R12", "R2000", "R2004", "R2007", "R2010", "R2013", "R2018"]:
        for binary in (False, True):
            doc = draw(v)
            if v != "R12":
                more(doc)
            doc.saveas(f"plan-{v}-{'binary' if binary else 'ascii'}.dxf", fmt="bin" if binary else "asc")
