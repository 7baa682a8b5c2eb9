"""What was read of a demo must be what its generator drew.

Usage: truth.py TRUTH.json RESULT.json [--moved M]

Marks, runs, strands, ends, and every point's kind, place and height. With --moved, places may differ by that much:
turning MTEXT into the TEXT of R12 moves the point that the drafter placed.
"""

import json
import math
import sys


def differences(drawn, read, near):
    found = {}
    for tendon in read["tendons"]:
        found.setdefault(tendon["mark"], []).append(tendon)
    for record in drawn["tendons"]:
        mark = record["mark"]
        same = found.get(mark, [])
        if len(same) != 1:
            yield f"{mark}: read {len(same)} times"
            continue
        tendon = same[0]
        for key in ("run", "tendons", "strands", "strand"):
            if tendon[key] != record[key]:
                yield f"{mark}: {key} {tendon[key]!r}, drawn {record[key]!r}"
        places = [(record["points"][i]["x_m"], record["points"][i]["y_m"]) for i in (0, -1)]
        for end in tendon["ends"]:
            side = min((0, 1), key=lambda i: math.dist(places[i], (end["x_m"], end["y_m"])))
            if end["kind"] != record["ends"][side]:
                yield f"{mark}: end {end['kind']!r}, drawn {record['ends'][side]!r}"
        if len(tendon["points"]) != len(record["points"]):
            yield f"{mark}: {len(tendon['points'])} points, drawn {len(record['points'])}"
        for point in record["points"]:
            close = [p for p in tendon["points"] if math.dist((p["x_m"], p["y_m"]), (point["x_m"], point["y_m"])) < near]
            if not any(p["kind"] == point["kind"] and p["height_mm"] is not None
                       and abs(p["height_mm"] - point["height_mm"]) < 1e-6 for p in close):
                yield (f"{mark}: {point['kind']} {point['height_mm']} at ({point['x_m']:.2f}, {point['y_m']:.2f}) read as "
                       f"{[(p['kind'], p['height_mm']) for p in close]}")


def main():
    drawn = json.load(open(sys.argv[1], encoding="utf-8"))
    read = json.load(open(sys.argv[2], encoding="utf-8"))
    near = float(sys.argv[4]) if sys.argv[3:4] == ["--moved"] else 0.03
    wrong = list(differences(drawn, read, near))
    points = sum(len(record["points"]) for record in drawn["tendons"])
    print(f"{sys.argv[2]}: {points} points held against what was drawn, {len(wrong)} wrong")
    for line in wrong[:20]:
        print("  " + line)
    if wrong or not points:
        raise SystemExit(1)


if __name__ == "__main__":
    main()
