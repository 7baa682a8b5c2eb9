"""Every independent check, on every demo drawing, in every version: what CI runs after the release build.

Usage: run.py [TAUTPLAN]
"""

import csv
import json
import math
import pathlib
import shutil
import subprocess
import sys
import tempfile

HERE = pathlib.Path(__file__).resolve().parent
ROOT = HERE.parent.parent
DEMOS = ["small-floor", "harbour-level-2", "faulty-floor"]
# Tendons that the drawing gives all that forces need.
FORCES = {"small-floor": 14, "harbour-level-2": 128, "faulty-floor": 20}
FOREIGN_FLOORS = 60

passed, failed = 0, []


def check(name, command, expected=(0,)):
    global passed
    done = subprocess.run([str(part) for part in command], capture_output=True, text=True)
    if done.returncode in expected:
        passed += 1
        return True
    failed.append(name)
    print(f"FAILED {name} (exit {done.returncode})\n{done.stdout[-3000:]}{done.stderr[-3000:]}")
    return False


def script(name, *arguments):
    return [sys.executable, HERE / f"{name}.py", *arguments]


# Faults that are no one tendon's: they are found at their place.
PLACED = ("label-unclaimed", "layer-hidden", "duplicate-line", "label-ambiguous")
# What a sound floor may be told too: nothing of it says that something is wrong.
ORDINARY = ("curvature-loss", "far-end-force", "one-end-length")


def planted_faults(result_file):
    """Every planted fault is found, at its tendon or its place; a sound tendon has no finding of an error, and no
    warning that its like would not get too."""
    result = json.loads(result_file.read_text(encoding="utf-8"))
    with open(ROOT / "demo-drawings" / "faulty-floor-faults.csv", encoding="utf-8") as file:
        planted = list(csv.DictReader(file))

    def near(finding, row):
        if not row["x_m"]:
            return True
        place = (finding["x_m"], finding["y_m"])
        if None in place:
            return row["rule"] == "layer-hidden"
        return math.dist(place, (float(row["x_m"]), float(row["y_m"]))) < 1.0

    def told(row):
        same = [f for f in result["findings"] if f["rule"] == row["rule"]]
        own = [f for f in same if f["tendon"] == row["mark"]]
        return bool(own) or (row["rule"] in PLACED and any(near(f, row) for f in same))

    missing = [f"{row['rule']} on {row['mark']}" for row in planted if not told(row)]
    marks = {row["mark"] for row in planted}
    sound = [f"{f['rule']} on {f['tendon']}" for f in result["findings"]
             if f["tendon"] and f["tendon"] not in marks and (f["level"] == "error" or
                (f["level"] == "warning" and f["rule"] not in ORDINARY))]
    return planted, missing, sound


def main():
    global passed
    program = pathlib.Path(sys.argv[1]) if len(sys.argv) > 1 else ROOT / "target/release/tautplan"
    if not program.exists():
        raise SystemExit(f"{program} is not there: cargo build --release")
    with tempfile.TemporaryDirectory() as scratch:
        scratch = pathlib.Path(scratch)
        for demo in DEMOS:
            source = ROOT / "demo-drawings" / f"{demo}.dxf"
            check(f"{demo}: versions", script("versions", source, scratch / demo))
            drawings = [source] + sorted((scratch / demo).glob("*.dxf"))
            if len(drawings) != 15:
                failed.append(f"{demo}: {len(drawings)} drawings, 15 expected")
            for drawing in drawings:
                # The job file stands beside the drawing.
                job = source.with_suffix(".toml")
                given = ["--job", job] if job.exists() else []
                out = scratch / "out" / demo / drawing.stem
                if not check(f"mark {drawing.name}", [program, "mark", drawing, *given, "--out", out], expected=(0, 1)):
                    continue
                marked, result = out / f"{drawing.stem}-marked.dxf", out / f"{drawing.stem}-result.json"
                check(f"lossless {drawing.name}", script("check_lossless", drawing, marked, "--allow-seed"))
                check(f"figures {drawing.name}", script("figures", marked, result))
                if drawing.stem.endswith(("R2000", "R2018-binary")) or drawing == source:
                    check(f"recompute {drawing.name}", script("recompute", drawing, result, FORCES[demo]))
                again = scratch / "again"
                if check(f"mark again {drawing.name}", [program, "mark", marked, *given, "--out", again], expected=(0, 1)):
                    twice = again / f"{marked.stem}-marked.dxf"
                    same = twice.read_bytes() == marked.read_bytes()
                    passed += same
                    if not same:
                        failed.append(f"marking {drawing.name} twice gives other bytes")
                shutil.rmtree(again, ignore_errors=True)
                truth = ROOT / "tests/data/demos" / f"{demo}-truth.json"
                if demo != "faulty-floor":
                    moved = ["--moved", "0.1"] if "-R12" in drawing.stem else []
                    check(f"truth {drawing.name}", script("truth", truth, result, *moved))
            if demo == "faulty-floor":
                planted, missing, sound = planted_faults(scratch / "out" / demo / demo / f"{demo}-result.json")
                if missing or sound or len(planted) < 20:
                    failed.append(f"planted faults: missing {missing}, on sound tendons {sound}")
                else:
                    passed += 1
        floor = ROOT / "demo-drawings" / "harbour-level-2.dxf"
        methods, out = floor.with_name("harbour-level-2-methods.toml"), scratch / "methods"
        if check("mark by every method", [program, "mark", floor, "--job", methods, "--out", out]):
            check("methods", script("methods", out / "harbour-level-2-result.json"))
        for office in ("intermediate-anchors", "joints-by-attribute"):
            plan = ROOT / "tests/data/offices" / f"{office}.dxf"
            given = ["--job", plan.with_suffix(".toml")] if plan.with_suffix(".toml").exists() else []
            out = scratch / office
            if check(f"mark {office}", [program, "mark", plan, *given, "--out", out], expected=(0, 1)):
                check(f"recompute {office}", script("recompute", plan, out / f"{office}-result.json", 7))
        for job in sorted((ROOT / "tests/data/methods").glob("*.toml")):
            check(f"workings by {job.name}", script("workings", program, ROOT / "demo-drawings" / "small-floor.dxf", job, "B01", "B04", "D001", "D010"))
        check("workings by every method", script("workings", program, floor, methods, "B01", "D031", "D043", "D070"))
        unbonded, out = ROOT / "tests/data/methods/unbonded.toml", scratch / "unbonded"
        if check("mark unbonded", [program, "mark", ROOT / "demo-drawings/small-floor.dxf", "--job", unbonded, "--out", out], expected=(0, 1)):
            check("methods, unbonded", script("methods", out / "small-floor-result.json"))
        check("creep and shrinkage", script("creep_shrinkage", "--check"))
        check("offices drawn again", script("offices", "--check"))
        check("foreign floors", script("foreign", program, 1000, FOREIGN_FLOORS))
    for name in failed:
        print(f"failed: {name}")
    print(f"{passed} passed, {len(failed)} failed")
    raise SystemExit(1 if failed else 0)


if __name__ == "__main__":
    main()
