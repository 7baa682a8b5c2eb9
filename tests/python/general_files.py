#!/usr/bin/env python3
"""Tries the program on a folder of general DXF files: nothing may break it, and what it marks must be lossless.

    general_files.py FOLDER [--program TAUTPLAN] [--seconds 20] [--list]

Every *.dxf below FOLDER is surveyed; then the layer with the most lines, polylines, arcs and splines is declared a
layer of tendons by a job file, the drawing is marked by it, and the marked drawing is compared with the original by
check_lossless.py. Of mm, cm, m, in and ft the first is taken in which half of the lines are as long as tendons are; a
drawing in which none fits is only surveyed. No panic, no signal, no time-out is allowed; a refusal must be exit
status 2 with a message.

Collections come from the registries, for example:

    pip download --no-deps --no-binary :all: ezdxf        integration_tests/data in the source package
    apt-get source --download-only librecad openscad      libraries of symbols, files of tests

Exit status 0 if all of it holds, 1 if not.
"""

import argparse
import re
import subprocess
import sys
import tempfile
import time
from collections import Counter
from pathlib import Path

import check_lossless

HERE = Path(__file__).resolve().parent
LINES = ("LINE", "LWPOLYLINE", "POLYLINE", "ARC", "SPLINE")
UNITS = ("mm", "cm", "m", "in", "ft")


def run(program, arguments, folder, seconds):
    """(status, standard output, standard error); status None for a time-out, negative for a signal."""
    try:
        done = subprocess.run([str(program), *map(str, arguments)], cwd=folder, capture_output=True, timeout=seconds)
    except subprocess.TimeoutExpired:
        return None, "", f"no end within {seconds} s"
    return done.returncode, done.stdout.decode("utf-8", "replace"), done.stderr.decode("utf-8", "replace")


def broken(status, said):
    if status is None or status < 0 or status > 2 or "panicked" in said:
        return f"exit {status}: {said.strip()[-400:]}"
    if status == 2 and not said.strip():
        return "exit 2 without a message"
    return None


def line_layers(said):
    """The layers with lines, by how many, from the message that lists a drawing's layers."""
    listed = re.search(r"layers of the drawing: (.*)", said)
    counted = Counter()
    for name, kinds in re.findall(r"(.+?) \(((?:\d+ [A-Z0-9_]+(?:, )?)+)\)(?:, |$)", listed.group(1) if listed else ""):
        for count, kind in re.findall(r"(\d+) ([A-Z0-9_]+)", kinds):
            if kind in LINES:
                counted[name] += int(count)
    return [name for name, _ in counted.most_common()]


def pattern(layer):
    """A shell pattern for this layer alone, as a TOML string."""
    literal = re.sub(r"([*?\[\]{}!\\])", r"[\1]", layer).replace("[\\]", "\\\\")
    return '"' + literal.replace("\\", "\\\\").replace('"', '\\"') + '"'


def mark(program, drawing, layer, scratch, seconds):
    """(status, message) of the marking by the first unit in which the lines have a length that tendons have."""
    for unit in UNITS:
        job = scratch / "job.toml"
        job.write_text(f'[drawing]\nunit = "{unit}"\n[layers]\nbanded = [{pattern(layer)}]\n', encoding="utf-8")
        status, _, said = run(program, ["mark", drawing, "--job", job, "--out", scratch / "out"], scratch, seconds)
        if status != 2 or "half of the tendons are" not in said:
            break
    return status, said


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("folder", type=Path)
    parser.add_argument("--program", type=Path, default=HERE.parent.parent / "target/release/tautplan")
    parser.add_argument("--seconds", type=float, default=20.0, help="longest time for one command")
    parser.add_argument("--list", action="store_true", help="say what became of every drawing")
    options = parser.parse_args()
    drawings = sorted(p for p in options.folder.resolve().rglob("*") if p.suffix.lower() == ".dxf" and p.is_file())
    counted, failures, slowest = Counter(), [], (0.0, "")
    for drawing in drawings:
        with tempfile.TemporaryDirectory() as scratch:
            scratch = Path(scratch)
            begun = time.monotonic()
            status, _, said = run(options.program.resolve(), ["survey", drawing], scratch, options.seconds)
            fault = broken(status, said)
            outcome = "surveyed" if status == 0 else "refused"
            if not fault and status != 2:
                (scratch / "none.toml").write_text('[layers]\nbanded = ["no such layer"]\n')
                asked = ["mark", drawing, "--job", scratch / "none.toml", "--out", scratch / "out"]
                status, _, said = run(options.program.resolve(), asked, scratch, options.seconds)
                fault = broken(status, said)
                for layer in line_layers(said)[:3]:
                    status, said = mark(options.program.resolve(), drawing, layer, scratch, options.seconds)
                    fault = fault or broken(status, said)
                    if fault or status != 2:
                        break
                marked = scratch / "out" / f"{drawing.stem}-marked.dxf"
                if not fault and marked.exists():
                    outcome = "marked"
                    if check_lossless.check(drawing, marked, True) != 0:
                        fault = "not lossless"
            slowest = max(slowest, (time.monotonic() - begun, drawing.name))
        counted["broken" if fault else outcome] += 1
        if fault:
            failures.append(f"{drawing}: {fault}")
        if options.list or fault:
            print(f"{drawing.name}: {fault or outcome} {said.strip().splitlines()[:1] if outcome == 'refused' else ''}")
    for failure in failures:
        print(f"FAILED {failure}")
    kinds = ", ".join(f"{count} {kind}" for kind, count in sorted(counted.items()))
    print(f"{len(drawings)} drawings: {kinds}; the slowest took {slowest[0]:.1f} s ({slowest[1]})")
    print(f"{len(drawings) - len(failures)} passed, {len(failures)} failed")
    return 1 if failures or not drawings else 0


if __name__ == "__main__":
    sys.exit(main())
