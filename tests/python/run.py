"""Every independent check, on every demo drawing, in every version: what CI runs after the release build.

Usage: run.py [TAUTPLAN]
"""

import csv
import json
import pathlib
import shutil
import subprocess
import sys
import tempfile

HERE = pathlib.Path(__file__).resolve().parent
ROOT = HERE.parent.parent
DEMOS = ["small-floor", "harbour-level-2", "faulty-floor"]
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


def planted_faults(result_file):
    """Every planted fault is found, at its tendon; a sound tendon has no finding of an error."""
    result = json.loads(result_file.read_text(encoding="utf-8"))
    found = {(f["rule"], f["tendon"]) for f in result["findings"]}
    rules = {f["rule"] for f in result["findings"]}
    with open(ROOT / "demo-drawings" / "faulty-floor-faults.csv", encoding="utf-8") as file:
        planted = list(csv.DictReader(file))
    missing = [f"{row['rule']} on {row['mark']}" for row in planted
               if (row["rule"], row["mark"]) not in found
               and not (row["rule"] in ("label-unclaimed", "layer-hidden", "duplicate-line", "label-ambiguous") and row["rule"] in rules)]
    marks = {row["mark"] for row in planted}
    sound = [f"{f['rule']} on {f['tendon']}" for f in result["findings"]
             if f["tendon"] and f["tendon"] not in marks and f["level"] == "error"]
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
                    check(f"recompute {drawing.name}", script("recompute", drawing, result))
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
        check("foreign floors", script("foreign", program, 1000, FOREIGN_FLOORS))
    for name in failed:
        print(f"failed: {name}")
    print(f"{passed} passed, {len(failed)} failed")
    raise SystemExit(1 if failed else 0)


if __name__ == "__main__":
    main()
