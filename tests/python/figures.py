"""The figures drawn on a marked drawing must be those of the result file.

Usage: figures.py MARKED.dxf RESULT.json

Every force figure equals, rounded, the force of a profile point near it at that layer's stage; where it can be that of one
point only, the figures of a tendon follow one another as their points do; every extension equals a jack's; the table
has a row a tendon with its mark; a tendon in space passes through its points at their level.
"""

import json
import math
import re
import sys

import ezdxf

STAGES = {"JACKING": "jacking_kn", "LOCKOFF": "lockoff_kn", "TRANSFER": "transfer_kn", "SERVICE": "service_kn"}
NEAR_M = 3.0


def foot(points, here):
    """Distance from the line through a tendon's points, and station of the nearest place on it."""
    found = (math.inf, 0.0)
    for p, q in zip(points, points[1:]):
        run = (q["x_m"] - p["x_m"], q["y_m"] - p["y_m"])
        square = run[0] ** 2 + run[1] ** 2
        if square > 0:
            share = ((here[0] - p["x_m"]) * run[0] + (here[1] - p["y_m"]) * run[1]) / square
            share = min(max(share, 0.0), 1.0)
            away = math.dist(here, (p["x_m"] + share * run[0], p["y_m"] + share * run[1]))
            found = min(found, (away, p["station_m"] + share * (q["station_m"] - p["station_m"])))
    return found


def out_of_order(worked, figures, key):
    """Figures that stand before another of their tendon whose point comes before theirs, and how many were compared."""
    stands = {}
    for content, here in figures:
        fits = [(number, p["station_m"]) for number, t in enumerate(worked) for p in t["points"]
                if math.dist(here, (p["x_m"], p["y_m"])) < NEAR_M
                and p[key] is not None and abs(p[key] - float(content)) <= 0.5000001]
        if len(fits) != 1:
            continue
        number, station = fits[0]
        away, along = foot(worked[number]["points"], here)
        if away < 0.5:
            stands.setdefault(number, []).append((station, along, content))
    wrong = []
    for number, found in stands.items():
        found.sort()
        wrong += [f"{worked[number]['mark']}: {b[2]} at station {b[0]:.2f} m stands before {a[2]} at {a[0]:.2f} m"
                  for a, b in zip(found, found[1:]) if b[1] <= a[1]]
    return wrong, sum(len(found) - 1 for found in stands.values())


def jacks(tendon):
    """Where each jack of a tendon stands, and what it does."""
    live = [(e["x_m"], e["y_m"], e) for e in tendon["ends"] if e["kind"] == "live"]
    if not tendon.get("pulls"):
        return live
    anchors = [tendon["points"][0], *tendon["joints"], tendon["points"][-1]]
    return [(a["x_m"], a["y_m"], pull) for pull in tendon["pulls"] for a in anchors
            if abs(a["station_m"] - pull["at_m"]) < 1e-6]


def texts(space, layer):
    for text in space.query(f'TEXT[layer=="{layer}"]'):
        place = text.dxf.get("align_point") if text.dxf.get("halign") or text.dxf.get("valign") else None
        yield text.dxf.text, (place or text.dxf.insert)


def main():
    document = ezdxf.readfile(sys.argv[1])
    result = json.load(open(sys.argv[2], encoding="utf-8"))
    unit = result["drawing"]["unit_m"]
    space, wrong, seen, pairs = document.modelspace(), [], 0, 0
    worked = [t for t in result["tendons"] if t["points"] and t["points"][0].get("jacking_kn") is not None]

    for stage, key in STAGES.items():
        points = [(p["x_m"], p["y_m"], p[key]) for t in worked for p in t["points"] if p[key] is not None]
        figures = [(content, (place[0] * unit, place[1] * unit)) for content, place in texts(space, f"TAUT-FORCE-{stage}-TEXT")]
        swapped, compared = out_of_order(worked, figures, key)
        wrong += [f"{stage}: {line}" for line in swapped]
        pairs += compared
        for content, place in texts(space, f"TAUT-FORCE-{stage}-TEXT"):
            seen += 1
            here = (place[0] * unit, place[1] * unit)
            if not any(math.dist(here, p[:2]) < NEAR_M and abs(p[2] - float(content)) <= 0.5000001 for p in points):
                wrong.append(f"{stage} figure {content} at {here} belongs to no point")

    ends = [jack for t in worked for jack in jacks(t)]
    for content, place in texts(space, "TAUT-EXTENSION"):
        seen += 1
        here = (place[0] * unit, place[1] * unit)
        pull, said = re.fullmatch(r"(?:pull (\d+): )?(ext .*)", content).groups()
        gross, net = (float(v) for v in re.findall(r"-?\d+", said)[:2])
        if not any(math.dist(here, e[:2]) < NEAR_M and abs(e[2]["extension_mm"] - gross) <= 0.5000001
                   and abs(e[2]["extension_net_mm"] - net) <= 0.5000001
                   and e[2].get("order") == (int(pull) if pull else None) for e in ends):
            wrong.append(f"extension '{content}' at {here} belongs to no jack")

    table = {content for content, _ in texts(space, "TAUT-TABLE")}
    wrong += [f"the table has no row for {t['mark']}" for t in result["tendons"] if t["mark"] not in table]

    lines = []
    for entity in space.query('POLYLINE[layer=="TAUT-PROFILE"]'):
        lines.append([tuple(c * unit for c in v.dxf.location) for v in entity.vertices])
    ends_of = {(round(line[0][0], 3), round(line[0][1], 3)) for line in lines} | \
        {(round(line[-1][0], 3), round(line[-1][1], 3)) for line in lines}
    for tendon in worked:
        for point in tendon["points"]:
            seen += 1
            if not any(math.dist(v, (point["x_m"], point["y_m"], point["level_m"])) < 0.002 for line in lines for v in line):
                wrong.append(f"{tendon['mark']}: no tendon in space passes its {point['kind']} at {point['station_m']:.2f} m")
        first = tendon["points"][0]
        if (round(first["x_m"], 3), round(first["y_m"], 3)) not in ends_of:
            wrong.append(f"{tendon['mark']}: no tendon in space starts at its anchor")

    print(f"{sys.argv[1]}: {seen} figures held against the result, {pairs} pairs in order along tendons, {len(wrong)} wrong")
    for line in wrong[:20]:
        print("  " + line)
    if wrong or not seen:
        raise SystemExit(1)


if __name__ == "__main__":
    main()
