"""Work out every tendon of a result again, by dense integration along the curve in space.

Usage: recompute.py DRAWING.dxf RESULT.json TENDONS

TENDONS is how many must have forces, so that a result that lost some does not pass.

Shares no formula with the program: the plan line comes from the drawing through ezdxf, the levels from integrating a
piecewise constant curvature twice, the angle from the turning between neighbouring chords of the curve in space, the
friction from marching along it, the draw-in from bisection on the area between the two curves. A tendon with intermediate
anchors is stressed segment by segment, in an order found here. What it takes from the result file are the inputs, the
concrete stress and where points and intermediate anchors are. Forces at every point, angles, losses, means and
extensions must agree within 0.1 %, the reach of the draw-in and the least radius within what the step can tell.
"""

import itertools
import json
import math
import sys

import ezdxf
import numpy as np

STEP_M = 0.004
TOLERANCE = 1e-3


def arc_points(centre, radius, start, sweep, step):
    count = max(2, int(math.ceil(abs(sweep) * radius / step)))
    angles = start + sweep * np.linspace(0.0, 1.0, count + 1)
    return np.column_stack([centre[0] + radius * np.cos(angles), centre[1] + radius * np.sin(angles)])


def bulge_points(a, b, bulge, step):
    """Points of the circular piece between two vertices; the centre is found from three points of the circle."""
    a, b = np.asarray(a, float), np.asarray(b, float)
    chord = np.hypot(*(b - a))
    if abs(bulge) < 1e-9 or chord == 0.0:
        return np.array([a, b])
    crown = (a + b) / 2 + bulge / 2 * np.array([(b - a)[1], -(b - a)[0]])
    # Circle through a, crown, b: two perpendicular bisectors.
    system = np.array([crown - a, b - crown])
    right = np.array([(crown @ crown - a @ a) / 2, (b @ b - crown @ crown) / 2])
    centre = np.linalg.solve(system, right)
    radius = np.hypot(*(a - centre))
    return arc_points(centre, radius, math.atan2(*(a - centre)[::-1]), 4 * math.atan(bulge), step)


def entity_points(entity, unit):
    step = STEP_M / unit
    kind = entity.dxftype()
    if kind == "LINE":
        pieces = [np.array([tuple(entity.dxf.start)[:2], tuple(entity.dxf.end)[:2]])]
    elif kind == "ARC":
        start = math.radians(entity.dxf.start_angle)
        sweep = math.radians((entity.dxf.end_angle - entity.dxf.start_angle) % 360.0)
        pieces = [arc_points(entity.dxf.center, entity.dxf.radius, start, sweep, step)]
    elif kind in ("LWPOLYLINE", "POLYLINE"):
        if kind == "LWPOLYLINE":
            vertices = [(x, y, b) for x, y, b in entity.get_points("xyb")]
        else:
            vertices = [(*tuple(v.dxf.location)[:2], v.dxf.get("bulge", 0.0)) for v in entity.vertices]
        pieces = [bulge_points(a[:2], b[:2], a[2], step) for a, b in zip(vertices, vertices[1:])]
    elif kind == "SPLINE":
        # Points as close as the step: turning must be as finely spread in plan as it is in level.
        curve = entity.construction_tool()
        rough = sum(a.distance(b) for a, b in itertools.pairwise(entity.flattening(0.1 * 0.001 / unit, 8)))
        count = int(math.ceil(2 * rough / step))
        places = curve.points(np.linspace(0.0, curve.max_t, count + 1))
        pieces = [np.array([tuple(p)[:2] for p in places])]
    else:
        raise SystemExit(f"recompute: no plan line is known for a {kind}")
    line = [pieces[0][0]]
    for piece in pieces:
        line.extend(piece[1:])
    return np.array(line) * unit


def chain(first, pool, gap=0.011):
    """The plan line that starts from entity `first`, with the pieces whose ends meet it joined on."""
    line, rest = first, list(pool)
    grown = True
    while grown:
        grown = False
        for index, other in enumerate(rest):
            for candidate in (other, other[::-1]):
                if np.hypot(*(line[-1] - candidate[0])) <= gap:
                    line = np.vstack([line, candidate[1:]])
                elif np.hypot(*(line[0] - candidate[-1])) <= gap:
                    line = np.vstack([candidate[:-1], line])
                else:
                    continue
                rest.pop(index)
                grown = True
                break
            if grown:
                break
    return line


def same_line(a, b):
    """Whether a line is drawn twice, in whichever direction."""
    return any(np.hypot(*(a[0] - c[0])) < 0.01 and np.hypot(*(a[-1] - c[-1])) < 0.01 for c in (b, b[::-1]))


def densify(line):
    """The plan line with points no further apart than STEP_M, and its stations."""
    out = [line[:1]]
    for a, b in zip(line, line[1:]):
        count = max(1, int(math.ceil(np.hypot(*(b - a)) / STEP_M)))
        out.append(a + (b - a) * (np.arange(1, count + 1) / count)[:, None])
    points = np.vstack(out)
    keep = np.concatenate([[True], np.hypot(*np.diff(points, axis=0).T) > 1e-9])
    points = points[keep]
    return points, np.concatenate([[0.0], np.cumsum(np.hypot(*np.diff(points, axis=0).T))])


def bending(points, inflection):
    """Pieces (from, to, curvature, level, slope at from) between the fixed points, from what each end must do."""
    fixed = [p for p in points if p["kind"] != "support"]
    posts = [p["station_m"] for p in fixed if p["kind"] in ("high", "anchor")]
    pieces = []
    for a, b in zip(fixed, fixed[1:]):
        s, t, za, zb = a["station_m"], b["station_m"], a["level_m"], b["level_m"]
        length, kinds = t - s, (a["kind"], b["kind"])
        if length <= 0:
            continue
        if set(kinds) == {"high", "low"}:
            high = s if kinds[0] == "high" else t
            other = [p for p in posts if (p > high + 1e-9 if kinds[0] == "high" else p < high - 1e-9)]
            span = abs((min(other) if kinds[0] == "high" else max(other)) - high) if other else length
            hog = min(inflection * span, length)
            # Level at both ends: k1 a + k2 (l - a) = 0, and the rise follows from integrating twice.
            def rise(k1):
                k2 = -k1 * hog / (length - hog) if length > hog else 0.0
                return k1 * hog**2 / 2 + k1 * hog * (length - hog) + k2 * (length - hog) ** 2 / 2
            drop = zb - za if kinds[0] == "high" else za - zb
            if length - hog < 1e-9:
                raise SystemExit("recompute: hogging length fills the whole piece; not covered here")
            k1 = drop / rise(1.0)
            k2 = -k1 * hog / (length - hog)
            if kinds[0] == "high":
                pieces += [(s, s + hog, k1, za, 0.0), (s + hog, t, k2, za + k1 * hog**2 / 2, k1 * hog)]
            else:
                low_part = length - hog
                pieces += [(s, s + low_part, k2, za, 0.0),
                           (s + low_part, t, k1, za + k2 * low_part**2 / 2, k2 * low_part)]
        elif "anchor" in kinds and set(kinds) & {"low", "high"}:
            # Level at the high or low point, one parabola to the anchor.
            if kinds[0] == "anchor":
                k = 2 * (za - zb) / length**2
                pieces.append((s, t, k, za, -k * length))
            else:
                pieces.append((s, t, 2 * (zb - za) / length**2, za, 0.0))
        else:
            pieces.append((s, t, 0.0, za, (zb - za) / length))
    return pieces


def levels(stations, pieces):
    z = np.empty_like(stations)
    for start, end, k, level, slope in pieces:
        inside = (stations >= start - 1e-12) & (stations <= end + 1e-12)
        x = stations[inside] - start
        z[inside] = level + slope * x + k * x * x / 2
    return z


def march(line, points, joints, inflection):
    """Arc length in space and angle turned, at dense stations that include every break of curvature and these joints."""
    plan, stations = densify(line)
    pieces = bending(points, inflection)
    breaks = sorted({round(v, 12) for p in pieces for v in p[:2]} | {p["station_m"] for p in points} | set(joints))
    breaks = [b for b in breaks if 0 < b < stations[-1]]
    merged = np.unique(np.concatenate([stations, breaks]))
    merged = merged[np.concatenate([[True], np.diff(merged) > 1e-7])]
    space = np.column_stack([np.interp(merged, stations, plan[:, 0]), np.interp(merged, stations, plan[:, 1]),
                             levels(np.minimum(merged, pieces[-1][1]), pieces)])
    chords = np.diff(space, axis=0)
    lengths = np.linalg.norm(chords, axis=1)
    unit = chords / lengths[:, None]
    turned = np.arctan2(np.linalg.norm(np.cross(unit[:-1], unit[1:]), axis=1), np.sum(unit[:-1] * unit[1:], axis=1))
    # Angle at a vertex, half before it and half after it: a smooth curve's angle up to that vertex.
    after = np.concatenate([[0.0], np.cumsum(turned), [np.sum(turned)]])
    before = np.concatenate([[0.0, 0.0], np.cumsum(turned)])
    arc = np.concatenate([[0.0], np.cumsum(lengths)])
    # The level ends of the curve: slope at the first vertex differs from the first chord's by half a step's turning.
    return merged, arc, before[: len(merged)], after[: len(merged)]


def lower(jacking, exponent, arc, jack, wanted):
    """Force after draw-in at one live end: bisection on the force at that anchor for the wanted area."""
    def locked(anchor):
        return np.minimum(jacking, anchor * np.exp(exponent))

    def area(anchor):
        gap = jacking - locked(anchor)
        return float(np.sum((gap[1:] + gap[:-1]) / 2 * np.diff(arc)))

    low, high = 0.0, jack
    if area(low) < wanted:
        raise SystemExit("recompute: the draw-in takes all the force")
    for _ in range(100):
        middle = (low + high) / 2
        low, high = (middle, high) if area(middle) > wanted else (low, middle)
    return locked((low + high) / 2)


def lower_both(jacking, phi, arc, jack, wanted):
    """Two live ends: each end's own area, divided where the two locked-off curves meet, if they do."""
    total = phi[-1]
    left = lower(jacking, phi, arc, jack, wanted)
    right = lower(jacking, total - phi, arc, jack, wanted)
    if np.all((left >= jacking - 1e-9) | (right >= jacking - 1e-9)):
        return np.minimum(left, right)

    def locked(a, b):
        return np.minimum(jacking, np.minimum(a * np.exp(phi), b * np.exp(total - phi)))

    def areas(a, b):
        gap = jacking - locked(a, b)
        strip = (gap[1:] + gap[:-1]) / 2 * np.diff(arc)
        division = phi[:-1] < (total + math.log(b / a)) / 2
        return float(np.sum(strip[division])), float(np.sum(strip[~division]))

    a_low, a_high = 1e-6, jack
    for _ in range(60):
        a = (a_low + a_high) / 2
        b_low, b_high = 1e-6, jack
        for _ in range(60):
            b = (b_low + b_high) / 2
            b_low, b_high = (b, b_high) if sum(areas(a, b)) > 2 * wanted else (b_low, b)
        if areas(a, (b_low + b_high) / 2)[0] > wanted:
            a_low = a
        else:
            a_high = a
    return locked((a_low + a_high) / 2, (b_low + b_high) / 2)


def jacked(tendon, joints, inputs):
    """Whether each end of each segment is jacked, in order along the tendon, and when its turn comes, from 1."""
    kinds = [end["kind"] for end in tendon["ends"]]
    count = len(joints) + 1
    backwards = kinds == ["live", "dead"]
    if kinds == ["live", "live"] and joints:
        (xa, ya), (xb, yb) = [(end["x_m"], end["y_m"]) for end in tendon["ends"]]
        level = abs(xb - xa) >= abs(yb - ya)
        side = next(s for s in inputs["first_pour"] + ["left", "bottom"] if (s in ("left", "right")) == level)
        along = xb - xa if level else yb - ya
        backwards = (along < 0) == (side in ("left", "bottom"))
    found = []
    for at in range(count):
        turn = count - at if backwards else at + 1
        # The side that the tendon goes on to is jacked; an end is, if it is live.
        start = kinds[0] == "live" if at == 0 else backwards
        end = kinds[1] == "live" if at == count - 1 else not backwards
        found.append((start, end, turn))
    return found


def stress(arc, phi, live, jack, wanted):
    """Force while the jacks hold and after lock-off, along one segment."""
    forward, backward = jack * np.exp(-phi), jack * np.exp(phi - phi[-1])
    if all(live):
        jacking = np.maximum(forward, backward)
        return jacking, lower_both(jacking, phi, arc, jack, wanted)
    if live[0]:
        return forward, lower(forward, phi, arc, jack, wanted)
    return backward, lower(backward, phi[-1] - phi, arc, jack, wanted)


def segments(tendon, line, inputs):
    """The whole tendon's march, and what each segment between two anchors comes to when it is stressed by itself."""
    joints = [joint["station_m"] for joint in tendon.get("joints", [])]
    stations, arc, before, after = march(line, tendon["points"], joints, inputs["inflection"])
    mu = inputs["mu_per_rad"]
    per_m = inputs["wobble_per_m"] if inputs.get("wobble_per_m") is not None else mu * inputs["wobble_rad_per_m"]
    jack = next(end["jacking_kn"] for end in tendon["ends"] if end["kind"] == "live")
    wanted = inputs["draw_in_mm"] / 1000 * inputs["strand_modulus_mpa"] * tendon["area_mm2"] / 1000
    cuts = [0] + [int(np.argmin(np.abs(stations - at))) for at in joints] + [len(stations) - 1]
    found = []
    for (i, j), (start, end, turn) in zip(itertools.pairwise(cuts), jacked(tendon, joints, inputs)):
        own = slice(i, j + 1)
        # A corner at an anchor turns in neither segment.
        angle = (before[own] + after[own]) / 2 - after[i]
        angle[0], angle[-1] = (0.0 if i else angle[0]), (before[j] - after[i] if j < len(stations) - 1 else angle[-1])
        length = arc[own] - arc[i]
        phi = mu * angle + per_m * length
        jacking, locked = stress(length, phi, (start, end), jack, wanted)
        found.append({"stations": stations[own], "arc": length, "angle": angle, "mu": mu, "jack": jack,
                      "live": (start, end), "turn": turn, "jacking_kn": jacking, "lockoff_kn": locked})
    return (stations, arc, before, after), found


def work(tendon, line, inputs):
    points, area = tendon["points"], tendon["area_mm2"]
    (stations, arc, before, after), parts = segments(tendon, line, inputs)

    modulus, sigma = inputs["strand_modulus_mpa"], tendon["concrete_stress_mpa"]
    shortening = inputs["shortening_share"] * modulus / inputs["concrete_modulus_transfer_mpa"] * sigma
    steady = modulus * inputs["shrinkage_strain"] \
        + modulus / inputs["concrete_modulus_mpa"] * inputs["creep_coefficient"] * sigma
    relaxed = inputs["relaxation_1000h"] * inputs["relaxation_factor"]
    for part in parts:
        part["transfer_kn"] = part["lockoff_kn"] - shortening * area / 1000
        part["service_kn"] = part["transfer_kn"] - steady * area / 1000 - relaxed * part["lockoff_kn"]

    off = {"points": max(point_off(point, parts) for point in points),
           "length_m": abs(tendon["length_m"] - arc[-1]) / arc[-1]}
    off |= extensions(tendon, parts, modulus * area / 1000, inputs["draw_in_mm"])
    off |= losses(tendon, parts, {
        "shortening_mpa": shortening, "shrinkage_mpa": modulus * inputs["shrinkage_strain"],
        "creep_mpa": modulus / inputs["concrete_modulus_mpa"] * inputs["creep_coefficient"] * sigma,
        "relaxation_mpa": relaxed * mean_of(parts, "lockoff_kn") / area * 1000})
    off |= bends(tendon, points, stations, before, after, inputs["inflection"])
    return off


def point_off(point, parts):
    """How far a point's forces are from those of its segment; at an intermediate anchor the lesser of two counts."""
    worst = 0.0
    for name in ("jacking_kn", "lockoff_kn", "transfer_kn", "service_kn"):
        ranges = []
        for part in parts:
            away = np.abs(part["stations"] - point["station_m"])
            beyond = part is not parts[-1] and point["station_m"] > part["stations"][-1] + 1e-6
            if beyond or (part is not parts[0] and point["station_m"] < part["stations"][0] - 1e-6):
                continue
            near = away <= 2 * STEP_M
            if not near.any():
                near = away == away.min()
            # At a corner the force is a step: any value between its two sides will do.
            ranges.append((part[name][near].min(), part[name][near].max()))
        low, high = min(ranges)
        worst = max(worst, max(low - point[name], point[name] - high, 0.0) / high)
    return worst


def extensions(tendon, parts, stiffness, draw_in):
    """Extension and draw-in at each jack, of a tendon with intermediate anchors pull by pull."""
    off, said, last = {"extension": 0.0, "draw_in_reach_m": 0.0}, [], parts[-1]["stations"][-1]
    for part in parts:
        stretch = (part["jacking_kn"][1:] + part["jacking_kn"][:-1]) / 2 * np.diff(part["arc"]) / stiffness * 1000
        division = int(np.argmin(part["jacking_kn"]))
        shares, open_mm = [float(stretch.sum())] * 2, 0.0
        if all(part["live"]):
            # Where the two curves meet is known to a step.
            open_mm = float(stretch.max())
            shares = [float(stretch[:division].sum()), float(stretch[division:].sum())]
        for side in (0, 1):
            if not part["live"][side]:
                continue
            at = part["stations"][-side]
            told = [pull for pull in tendon.get("pulls", []) if abs(pull["at_m"] - at) < 1e-6
                    and abs(pull["from_m"] - part["stations"][0]) < 1e-6 and abs(pull["to_m"] - part["stations"][-1]) < 1e-6
                    and pull["order"] == part["turn"]]
            if len(parts) > 1 and len(told) != 1:
                return off | {f"pulls with a jack at {at:.3f}": float(len(told) + 1)}
            said += told
            if at in (0.0, last):
                told = told + [tendon["ends"][side]]
            for jack in told:
                for name, wanted in (("extension_mm", shares[side]), ("extension_net_mm", shares[side] - draw_in)):
                    off["extension"] = max(off["extension"], max(abs(jack[name] - wanted) - open_mm, 0.0) / abs(wanted))
                off["draw_in_reach_m"] = max(off["draw_in_reach_m"], reach_off(part, side, jack["draw_in_reach_m"]))
    off["number of jacks"] = float(len(said) != len(tendon.get("pulls", [])))
    return off


def mean(curve, arc):
    return float(np.sum((curve[1:] + curve[:-1]) / 2 * np.diff(arc)) / arc[-1])


def relative(value, wanted, floor=1e-9):
    return abs(value - wanted) / max(abs(wanted), floor)


def mean_of(parts, name):
    """Mean along all segments, by their lengths."""
    return sum(mean(part[name], part["arc"]) * part["arc"][-1] for part in parts) / sum(part["arc"][-1] for part in parts)


def losses(tendon, parts, later_mpa):
    """How far each loss that is reported is from its own; of several pulls, those of the one that leaves least."""
    said = tendon["losses"]
    off = {name: relative(said[name], wanted, 0.01) for name, wanted in later_mpa.items()}
    seen = min(parts, key=lambda part: (float(part["jacking_kn"].min()), part["turn"]))
    jacking, angle, jack = seen["jacking_kn"], seen["angle"], seen["jack"]
    least = int(np.argmin(jacking))
    # Where both jacks give the same force, the loss may be told from either.
    turned = [rad for rad, live in zip((angle[least], angle[-1] - angle[least]), seen["live"]) if live]
    curvature = [jack * (1 - math.exp(-seen["mu"] * rad)) for rad in turned]
    both = said["friction_curvature_kn"] + said["friction_wobble_kn"]
    # A corner at the place of least force leaves it open on which side of the bend the least is taken.
    open_kn = 2 * float(np.max(np.abs(np.diff(jacking)))) + 1e-3 * jack
    nearest = min(abs(said["friction_curvature_kn"] - kn) for kn in curvature)
    off["friction_curvature_kn"] = max(nearest - open_kn, 0.0) / jack
    off["friction"] = max(abs(both - (jack - float(jacking.min()))) - open_kn, 0.0) / jack
    at = 0 if seen["live"][0] else -1
    off["draw_in_kn"] = relative(said["draw_in_kn"], jack - float(seen["lockoff_kn"][at]), 1e-2 * jack)
    off["mean_service_kn"] = relative(tendon["mean_service_kn"], mean_of(parts, "service_kn"))
    return off


def reach_off(part, side, said):
    """Draw-in is felt from the anchor to where the two curves meet, if they do before the other end's begins."""
    jacking, arc = part["jacking_kn"], part["arc"]
    felt = jacking - part["lockoff_kn"] > 1e-4 * jacking.max()
    if felt.all():
        return 0.0
    run = felt if side == 0 else felt[::-1]
    along = arc if side == 0 else arc[-1] - arc[::-1]
    reach = float(along[np.argmin(run)])
    # The curves close slowly where they meet: what is felt ends a little before.
    return max(abs(said - reach) - 0.03 * reach - 0.05, 0.0) / reach


def bends(tendon, points, stations, before, after, inflection):
    """Angle turned up to each point, and the least radius of the pieces between."""
    off, pieces = {}, bending(points, inflection)
    # Where curvature changes its sign the chords on both sides cancel a part of one another's turning.
    lost = STEP_M * sum(min(abs(a[2]), abs(b[2])) for a, b in itertools.pairwise(pieces) if a[2] * b[2] < 0)
    for point in points:
        at = int(np.argmin(np.abs(stations - point["station_m"])))
        low, high = before[max(at - 2, 0)], after[min(at + 2, len(after) - 1)]
        beyond = max(low - point["angle_rad"], point["angle_rad"] - high - lost, 0.0)
        off["angle_rad"] = max(off.get("angle_rad", 0.0), beyond / max(after[-1], 1e-6))
    radii = [1 / abs(k) for _, _, k, _, _ in pieces if abs(k) > 1e-9]
    said = tendon["radius_min_m"]
    if radii:
        off["radius_min_m"] = 1.0 if said is None else relative(said, min(radii))
    return off


def main():
    drawing, result_file, expected = sys.argv[1:4]
    result = json.load(open(result_file, encoding="utf-8"))
    document = ezdxf.readfile(drawing)
    unit = result["drawing"]["unit_m"]
    layers = {t["layer"] for t in result["tendons"]}
    lines = {}
    for entity in document.modelspace():
        if entity.dxf.layer in layers and entity.dxftype() in ("LINE", "ARC", "LWPOLYLINE", "POLYLINE", "SPLINE"):
            lines[entity.dxf.handle.upper()] = (entity.dxf.layer, entity_points(entity, unit))

    checked, failures = 0, []
    for tendon in result["tendons"]:
        if tendon["points"] and tendon["points"][0].get("service_kn") is None:
            continue
        layer, first = lines[tendon["handle"].upper()]
        pool = [line for handle, (on, line) in lines.items()
                if on == layer and handle != tendon["handle"].upper() and not same_line(first, line)]
        line = chain(first, pool)
        start = np.array([tendon["points"][0]["x_m"], tendon["points"][0]["y_m"]])
        if np.hypot(*(line[-1] - start)) < np.hypot(*(line[0] - start)):
            line = line[::-1]
        off = work(tendon, line, result["inputs"])
        checked += 1
        wrong = {name: value for name, value in off.items() if not value <= TOLERANCE}
        if wrong:
            failures.append(f"{tendon['mark']}: " + ", ".join(f"{name} off by {value:.2%}" for name, value in wrong.items()))
    print(f"{drawing}: {checked} tendons of {len(result['tendons'])} worked out again, {len(failures)} off by more than 0.1 %")
    for failure in failures:
        print("  " + failure)
    if checked != int(expected):
        failures.append(f"forces for {checked} tendons, {expected} expected")
        print("  " + failures[-1])
    if failures:
        raise SystemExit(1)


if __name__ == "__main__":
    main()
