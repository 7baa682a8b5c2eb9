"""Service forces of a result by every published method, worked out again from the forces after lock-off.

Usage: methods.py RESULT.json

Shares no formula with the program for creep and shrinkage of EN 1992-1-1, which come from the fib's structuralcodes; the
rest is written anew here from the clauses. What it takes from the result are the inputs, the forces after lock-off, the
concrete stress and where the points are; of an unbonded tendon, which loses by its mean, the curve between them too. Forces
at every point must agree to 1e-9 where the slab has one thickness; a support height is left out, since the curve passes
near it only.
"""

import fnmatch
import json
import math
import sys

import numpy as np
from structuralcodes.codes import ec2_2004 as ec2

TOLERANCE = 1e-9
PSI = 4.4482216152605 / 645.16
# Factor, growth and loss at 1000 hours of EN 1992-1-1 (3.28), (3.29); K_re and J; factor and 1000-hour losses of BS 8110.
CLASSES = {"ordinary": ((5.39, 6.7, 8.0), (20000, 0.15), (2.0, [0.045, 0.08, 0.12])),
           "low": ((0.66, 9.1, 2.5), (5000, 0.04), (1.5, [0.010, 0.025, 0.045]))}
C_ORDINARY = [1.45, 1.36, 1.27, 1.18, 1.09, 1.00, 0.94, 0.89, 0.83, 0.78, 0.73, 0.68, 0.63, 0.58, 0.53, 0.49]
C_LOW = [1.28, 1.22, 1.16, 1.11, 1.05, 1.00, 0.95, 0.90, 0.85, 0.80, 0.75, 0.70, 0.66, 0.61, 0.57, 0.53, 0.49, 0.45, 0.41, 0.37, 0.33]


def en1992(job, steel, floor, place):
    fcm, t0, t, h0 = job["strength_mpa"] + 8, job["stressing_days"], job["final_days"], floor["h0"]
    ecm = 22000 * (fcm / 10) ** 0.3
    phi_rh = ec2.phi_RH(h0, fcm, job["humidity_percent"], ec2.alpha_1(fcm), ec2.alpha_2(fcm))
    adjusted = ec2.t0_adj(t0, ec2.alpha_cement(job["cement_class"]))
    beta_h = ec2.beta_H(h0, fcm, job["humidity_percent"], ec2.alpha_3(fcm))
    phi = ec2.phi_0(phi_rh, ec2.beta_fcm(fcm), ec2.beta_t0(adjusted)) * ec2.beta_c(t0, t, beta_h)
    cement = job["cement_class"]
    basic = ec2.eps_cd_0(ec2.alpha_ds1(cement), ec2.alpha_ds2(cement), fcm, ec2.beta_RH(job["humidity_percent"]))

    def strain(age):
        drying = ec2.beta_ds(age, job["curing_days"], h0) * ec2.k_h(h0) * basic
        return drying + ec2.beta_as(age) * ec2.eps_ca_inf(job["strength_mpa"])

    early, late = place["stress"]
    ratio = ((job["strength_at_stressing_mpa"] + 8) / fcm) ** 0.3
    short = floor["share"]((floor["n"] - 1) / (2 * floor["n"])) * steel["e"] / (ecm * ratio) * early
    initial = place["lockoff"] - short
    mu = initial / steel["f"]
    factor, growth, rho = CLASSES[job["relaxation_class"]][0]
    relaxed = factor * rho * math.exp(growth * mu) * 500 ** (0.75 * (1 - mu)) * 1e-5 * initial
    above = (strain(t) - strain(t0)) * steel["e"] + 0.8 * relaxed + steel["e"] / ecm * phi * late
    below = 1 + steel["e"] / ecm * floor["ap_ac"] * (1 + place["bend"]) * (1 + 0.8 * phi)
    return short + above / below


def aci423(job, steel, floor, place):
    early, late = (stress / PSI for stress in place["stress"])
    es_psi = steel["e"] / PSI
    eci, ec = (57000 * math.sqrt(job[key] / PSI) for key in ("strength_at_stressing_mpa", "strength_mpa"))
    es, cr = floor["share"](0.5) * es_psi / eci * early, 1.6 * es_psi / ec * late
    ksh = np.interp(job["stressing_days"] - job["curing_days"], [1, 3, 5, 7, 10, 20, 30, 60],
                    [0.92, 0.85, 0.80, 0.77, 0.73, 0.64, 0.58, 0.45])
    sh = 8.2e-6 * ksh * es_psi * (1 - 0.06 * floor["h0"] / 2 / 25.4) * (100 - job["humidity_percent"])
    table = C_LOW if job["relaxation_class"] == "low" else C_ORDINARY
    c = np.interp(floor["mean_lockoff"] / steel["f"], np.arange(60, 60 + len(table)) / 100, table[::-1])
    kre, j = CLASSES[job["relaxation_class"]][1]
    return (es + cr + sh + (kre - j * (sh + cr + es)) * c) * PSI


def bs8110(job, steel, floor, place):
    early, _ = place["stress"]
    cube, cube_then = job["strength_mpa"] / 0.8, job["strength_at_stressing_mpa"] / 0.8
    modulus = (20000 + 200 * cube) * (0.4 + 0.6 * cube_then / cube)
    creep = np.interp(job["stressing_days"], [3, 28], [1.8, 1.4])
    factor, at_1000 = CLASSES[job["relaxation_class"]][2]
    relaxed = factor * np.interp(floor["mean_lockoff"] / steel["f"], [0.6, 0.7, 0.8], at_1000)
    strain = 300e-6 if job["environment"] == "interior" else 100e-6
    return (floor["share"](0.5) + creep) * steel["e"] / modulus * early + strain * steel["e"] + relaxed * place["lockoff"]


def as3600(job, steel, floor, place):
    early, late = place["stress"]
    fc, th, t0, t = job["strength_mpa"], floor["h0"], job["stressing_days"], job["final_days"]
    fcmi = np.interp(fc, [20, 25, 32, 40, 50, 65, 80, 100], [22, 28, 35, 43, 53, 68, 82, 99])
    modulus = [2400 ** 1.5 * (0.043 * math.sqrt(f) if f <= 40 else 0.024 * math.sqrt(f) + 0.12)
               for f in (job["strength_at_stressing_mpa"], fcmi)]
    k4 = {"arid": 0.7, "interior": 0.65, "temperate": 0.6, "tropical": 0.5}[job["environment"]]

    def grown(days):
        return days ** 0.8 / (days ** 0.8 + 0.15 * th)

    def strain(age):
        dried = (0.8 + 1.2 * math.exp(-0.005 * th)) * grown(max(age - job["curing_days"], 0.0))
        autogenous = 50e-6 * (0.07 * fc - 0.5 if fc <= 50 else 0.08 * fc - 1.0) * (1 - math.exp(-0.07 * age))
        return autogenous + dried * k4 * (0.9 - 0.005 * fc) * job["drying_basic"]

    a2 = 1 + 1.12 * math.exp(-0.008 * th)
    a3 = 0.7 / (k4 * a2)
    k5 = 1 if fc <= 50 else (2 - a3) - 0.02 * (1 - a3) * fc
    basic = np.interp(fc, [20, 25, 32, 40, 50, 65, 80, 100], [5.2, 4.2, 3.4, 2.8, 2.4, 2.0, 1.7, 1.5])
    phi = a2 * grown(t - t0) * 2.7 / (1 + math.log10(t0)) * k4 * k5 * basic
    short = floor["share"]((floor["n"] - 1) / (2 * floor["n"])) * steel["e"] / modulus[0] * early
    shrunk = steel["e"] * (strain(t) - strain(t0)) / (1 + 15 * job["bonded_steel_ratio"])
    crept = steel["e"] * 0.8 * phi * late / modulus[1]
    r = math.log10(5.4 * (t - t0) ** (1 / 6)) * job["relaxation_stress_factor"] * job["basic_relaxation"]
    return short + shrunk + crept + r * (place["lockoff"] - short - shrunk - crept)


METHODS = {"en1992": en1992, "aci423": aci423, "bs8110": bs8110, "as3600": as3600}


def shares(job, tendons):
    """By mark, the part of a run that is stressed after a tendon: those of one entry in turn, those of none at the end."""
    def stage(mark):
        fits = [at for at, entry in enumerate(job["order"]) if fnmatch.fnmatch(mark.lower(), entry.lower())]
        return min(fits, default=len(job["order"]))

    found = {}
    for tendon in tendons:
        run = [(stage(other["mark"]), other["tendons"]) for other in tendons if other["run"] == tendon["run"]]
        own = stage(tendon["mark"])
        same, later = (sum(n for at, n in run if fits(at)) for fits in (lambda at: at == own, lambda at: at > own))
        found[tendon["mark"]] = (later + (same - 1) / 2) / sum(n for _, n in run)
    return found


def mean_bend(job, points, depth, steps=4000):
    """Mean of 12 z^2/h^2 along the curve in space, by the midpoint rule, through points of one slab."""
    points = [p for p in points if p["kind"] != "support"]
    tops = [at for at, p in enumerate(points) if p["kind"] in ("anchor", "high")]
    above, below = 0.0, 0.0
    for at, (a, b) in enumerate(zip(points, points[1:])):
        length = b["station_m"] - a["station_m"]
        x = (np.arange(steps) + 0.5) * length / steps
        kinds, rise = (a["kind"], b["kind"]), b["level_m"] - a["level_m"]
        if set(kinds) == {"high", "low"}:
            span = points[min(t for t in tops if t > at)]["station_m"] - points[max(t for t in tops if t <= at)]["station_m"]
            hog, drop = min(job["inflection"] * span, length), abs(rise)
            from_high = x if kinds[0] == "high" else length - x
            top = max(a["level_m"], b["level_m"])
            level = np.where(from_high <= hog, top - drop * from_high ** 2 / (length * hog),
                             top - drop + drop * (length - from_high) ** 2 / (length * max(length - hog, 1e-12)))
            slope = np.where(from_high <= hog, 2 * drop * from_high / (length * hog),
                             2 * drop * (length - from_high) / (length * max(length - hog, 1e-12)))
        elif kinds[0] == "anchor" != kinds[1]:
            level, slope = b["level_m"] - rise * ((length - x) / length) ** 2, 2 * rise * (length - x) / length ** 2
        elif kinds[1] == "anchor" != kinds[0]:
            level, slope = a["level_m"] + rise * (x / length) ** 2, 2 * rise * x / length ** 2
        else:
            level, slope = a["level_m"] + rise * x / length, rise / length
        weight = np.hypot(1, slope) * length / steps
        above += np.sum(weight * 12 * ((level + depth / 2) / depth) ** 2)
        below += np.sum(weight * np.ones(steps))
    return above / below


def main():
    result = json.load(open(sys.argv[1], encoding="utf-8"))
    job = result["inputs"]
    if job["relaxation_class"] not in CLASSES or "asked_days" in job:
        raise SystemExit("methods: only strand in the end is covered here")
    strengths = {size["name"]: size["strength_mpa"] for size in job["strand"]}
    runs, checked, worst = {}, 0, 0.0
    for tendon in result["tendons"]:
        runs[tendon["run"]] = runs.get(tendon["run"], 0) + tendon["tendons"]
    whole = 1 / job["balanced_share"]
    by_order = shares(job, result["tendons"])
    for tendon in result["tendons"]:
        points = [p for p in tendon["points"] if p["level_m"] is not None]
        depths = {round(p["height_mm"] / 1000 - p["level_m"], 6) for p in points}
        if tendon["losses"] is None or len(depths) != 1:
            continue
        depth, area = depths.pop(), tendon["area_mm2"]
        steel = {"e": job["strand_modulus_mpa"], "f": strengths[tendon["strand"]]}
        lost = sum(tendon["losses"][cause] for cause in ("shortening_mpa", "shrinkage_mpa", "creep_mpa", "relaxation_mpa"))
        mean = tendon["mean_service_kn"] * 1000 / area + lost
        sigma = tendon["concrete_stress_mpa"]
        floor = {"n": runs[tendon["run"]], "h0": depth * 1000, "mean_lockoff": mean, "ap_ac": sigma / mean,
                 "share": lambda own, mark=tendon["mark"]: by_order[mark] if job["order"] else own}
        if not job["bonded"]:
            unbonded = {"lockoff": mean, "bend": mean_bend(job, points, depth), "stress": [sigma, sigma]}
        for point in points:
            if point["kind"] == "support":
                continue
            bend = 12 * ((point["level_m"] + depth / 2) / depth) ** 2
            loads = (job["load_share_at_stressing"] * whole, whole)
            place = {"lockoff": point["lockoff_kn"] * 1000 / area, "bend": bend,
                     "stress": [max(sigma * (1 + bend * (1 - load)), 0.0) for load in loads]}
            for method, force_kn in point["service_by_method_kn"].items():
                if method in METHODS:
                    seen = place if job["bonded"] else unbonded
                    left = (place["lockoff"] - METHODS[method](job, steel, floor, seen)) * area / 1000
                    worst = max(worst, abs(left / force_kn - 1))
                    checked += 1
    print(f"{sys.argv[1]}: {checked} service forces worked out again, off by {worst:.1e} at most")
    if checked == 0 or not worst <= TOLERANCE:
        raise SystemExit(1)


if __name__ == "__main__":
    main()
