"""Draw small floors in other offices' habits, with the truth beside each: what was meant, not what was read.

Usage: offices.py [--check]

Writes NAME.dxf, NAME.json (the truth) and NAME.toml (the lines that an engineer adds, where the defaults cannot know)
below tests/data/offices/. With --check draws them into a scratch folder and compares bytes.
"""

import json
import pathlib
import re
import sys
import tempfile

from office import anchors, heights, joints, lines, marks, names, pointing, seen, slabs

HERE = pathlib.Path(__file__).resolve().parent
OUT = HERE.parent / "data" / "offices"
LARGEST = 60_000
ROOMS = [names, anchors, joints, heights, marks, lines, slabs, pointing, seen]


def name_of(office):
    """EndsByWord: ends-by-word."""
    return re.sub(r"(?<!^)(?=[A-Z])", "-", office.__name__).lower()


def text_of(truth):
    """The truth, a tendon to a line."""
    rows = ",\n".join(json.dumps(tendon, ensure_ascii=False) for tendon in truth["tendons"])
    return (f'{{"habit": {json.dumps(truth["habit"], ensure_ascii=False)}, "unit_m": {truth["unit_m"]}, '
            f'"tendons": [\n{rows}\n]}}\n')


def draw(folder):
    """Writes everything below a folder; gives the relative paths."""
    written = []
    folder.mkdir(parents=True, exist_ok=True)
    for office in (case for room in ROOMS for case in room.CASES):
        made, name = office(), name_of(office)
        path = folder / f"{name}.dxf"
        made.draw().save(path, made.binary)
        if path.stat().st_size > LARGEST:
            raise SystemExit(f"{path.name}: {path.stat().st_size} bytes, at most {LARGEST}")
        (folder / f"{name}.json").write_text(text_of(made.truth()), encoding="utf-8")
        written += [path, folder / f"{name}.json"]
        if made.job:
            (folder / f"{name}.toml").write_text(made.job, encoding="utf-8")
            written.append(folder / f"{name}.toml")
    return [path.relative_to(folder) for path in written]


def main():
    if sys.argv[1:] != ["--check"]:
        print(f"{len(draw(OUT))} files written")
        return
    with tempfile.TemporaryDirectory() as scratch:
        scratch = pathlib.Path(scratch)
        written = draw(scratch)
        wrong = [str(path) for path in written
                 if not (OUT / path).exists() or (OUT / path).read_bytes() != (scratch / path).read_bytes()]
        there = {path.relative_to(OUT) for path in OUT.rglob("*") if path.is_file()}
        wrong += sorted(str(path) for path in there - set(written))
    print(f"{len(written)} files drawn again, {len(wrong)} differ")
    for path in wrong:
        print("  " + path)
    raise SystemExit(1 if wrong or not written else 0)


if __name__ == "__main__":
    main()
