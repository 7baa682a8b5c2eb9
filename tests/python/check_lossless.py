#!/usr/bin/env python3
"""Checks that a marked drawing is its original with marks inserted, and nothing else.

    check_lossless.py ORIGINAL MARKED [--allow-seed]

ORIGINAL must be a drawing that was never marked. What is checked, independently of the program that marked it:

  a  ezdxf loads both files the same way (plainly, or only with its recover mode), and its audit finds nothing
     in MARKED that it does not find in ORIGINAL;
  b  every tag of ORIGINAL stands in MARKED, byte for byte and in the same order, and so does what follows the
     end of the file (with --allow-seed, the value of $HANDSEED may differ, and only that);
  c  every entity of ORIGINAL is in MARKED, with its type, handle and layer;
  d  every entity that MARKED has beyond that lies on a layer whose name begins with TAUT-;
  e  no handle is used twice, no new handle is one that something in ORIGINAL already points at, and $HANDSEED
     lies above every new handle.

Exit status 0 if all of it holds, 1 if not, 2 if the command cannot be understood.
"""

import argparse
import sys
from collections import Counter
from pathlib import Path

import ezdxf
from ezdxf import recover

BINARY_SIGNATURES = (b"AutoCAD Binary DXF\r\n\x1a\x00", b"AutoCAD Binary DXF\n\x1a\x00")
OUR_LAYERS = "TAUT-"


# ---------------------------------------------------------------------------------------------------------------
# Tags: lists of (group code, value bytes, all bytes of the tag)


def read_tags(data):
    """The tags of a file, comments too, and whatever stands behind the last of them."""
    for signature in BINARY_SIGNATURES:
        if data.startswith(signature):
            return read_binary_tags(data, len(signature))
    return read_ascii_tags(data)


def read_ascii_tags(data):
    tags = []
    at = 3 if data.startswith(b"\xef\xbb\xbf") else 0
    head = data[:at]

    def line_end(begin):
        newline = data.find(b"\n", begin)
        return len(data) if newline < 0 else newline + 1

    while at < len(data):
        code_end = line_end(at)
        try:
            code = int(data[at:code_end])
        except ValueError:
            break  # no group code: the rest of the file is no tag
        value_end = line_end(code_end)
        value = data[code_end:value_end].rstrip(b"\r\n")
        tags.append((code, value, data[at:value_end]))
        at = value_end
        if code == 0 and value.strip() == b"EOF":
            break
    return head, tags, data[at:]


def read_binary_tags(data, at):
    head = data[:at]
    wide = data[at : at + 2] == b"\x00\x00"
    tags = []
    while at < len(data):
        begin = at
        if wide or data[at] == 255:
            at += 0 if wide else 1
            code = int.from_bytes(data[at : at + 2], "little", signed=True)
            at += 2
        else:
            code = data[at]
            at += 1
        if 310 <= code <= 319 or code == 1004:
            at += 1
            length = data[at - 1]
        elif 10 <= code <= 59 or 110 <= code <= 149 or 210 <= code <= 239 or 460 <= code <= 469 or 1010 <= code <= 1059:
            length = 8
        elif 60 <= code <= 79 or 170 <= code <= 179 or 270 <= code <= 289 or 370 <= code <= 389 or 400 <= code <= 409:
            length = 2
        elif 1060 <= code <= 1070:
            length = 2
        elif 90 <= code <= 99 or 420 <= code <= 429 or 440 <= code <= 459 or code == 1071:
            length = 4
        elif 160 <= code <= 169:
            length = 8
        elif 290 <= code <= 299:
            length = 1 if wide else 2
        else:
            length = data.index(b"\x00", at) - at
            value = data[at : at + length]
            at += length + 1
            tags.append((code, value, data[begin:at]))
            if code == 0 and value == b"EOF":
                break
            continue
        value = data[at : at + length]
        at += length
        tags.append((code, value, data[begin:at]))
    return head, tags, data[at:]


def records(tags):
    """(section name, tags) of every record, that is of every run of tags that begins with a group 0."""
    section = ""
    record = []
    for tag in tags:
        if tag[0] == 999:
            continue
        if tag[0] == 0:
            if record:
                yield section, record
            if tag[1].strip() in (b"SECTION", b"ENDSEC", b"EOF"):
                section = ""
            record = [tag]
            continue
        if record and record[0][1].strip() == b"SECTION" and tag[0] == 2:
            section = tag[1].strip().decode("latin-1")
        record.append(tag)
    if record:
        yield section, record


def number(value):
    """A handle's number, or None."""
    try:
        return int(value.strip(), 16)
    except ValueError:
        return None


def handles(tags):
    """The handle of every record that has one, as a list."""
    found = []
    for section, record in records(tags):
        name = record[0][1].strip()
        if section == "HEADER" or name in (b"SECTION", b"ENDSEC"):
            continue
        code = 105 if name == b"DIMSTYLE" else 5
        for tag in record[1:]:
            if tag[0] == 100:
                break  # behind a subclass marker, a group 5 is something else
            if tag[0] == code:
                handle = number(tag[1])
                if handle is not None:
                    found.append(handle)
                break
    return found


def pointers(tags):
    """Every handle that something points at."""
    found = set()
    for code, value, _ in tags:
        if 320 <= code <= 369 or 390 <= code <= 399 or code in (480, 481, 1005):
            handle = number(value)
            if handle:
                found.add(handle)
    return found


def seed(tags):
    """The value of $HANDSEED, or None."""
    for (code, value, _), (next_code, next_value, _) in zip(tags, tags[1:]):
        if code == 9 and value.strip() == b"$HANDSEED" and next_code == 5:
            return number(next_value)
    return None


# ---------------------------------------------------------------------------------------------------------------
# The checks; each yields what is wrong


def check_bytes(original, marked, allow_seed):
    head, tags, tail = original
    marked_head, marked_tags, marked_tail = marked
    if head != marked_head:
        yield "b: the first bytes of the file have changed"
    # An end of file without a line end is no difference: something may follow there now.
    last = len(tags) - 1
    at = 0
    previous = None
    for index, (code, value, raw) in enumerate(tags):
        seed_value = allow_seed and previous == (9, b"$HANDSEED") and code == 5
        while at < len(marked_tags):
            candidate = marked_tags[at]
            at += 1
            if candidate[2] == raw:
                break
            if seed_value and candidate[0] == 5 and at > 1 and marked_tags[at - 2][1].strip() == b"$HANDSEED":
                break
            if index == last and candidate[2].rstrip(b"\r\n") == raw:
                break
        else:
            yield f"b: tag {index} of the original ({code}, {value!r}) is lost or has moved"
            return
        previous = (code, value.strip())
    if marked_tail.endswith(tail):
        return
    # The tags of a damaged file end where the first line makes no sense: marks may stand in what follows.
    whole = bool(tags) and tags[-1][0] == 0 and tags[-1][1].strip() == b"EOF"
    following = iter(marked_tail.splitlines(keepends=True))
    if whole or not all(line in following for line in tail.splitlines(keepends=True)):
        yield "b: what follows the end of the file has changed"


def load(path):
    """(how, document, auditor) with how = "plainly", "recovered" or "not at all"."""
    try:
        document = ezdxf.readfile(path)
        return "plainly", document, document.audit()
    except Exception:  # whatever ezdxf stumbles over: the recover mode is the next attempt
        pass
    try:
        document, auditor = recover.readfile(path)
        return "recovered", document, auditor
    except Exception:
        return "not at all", None, None


def complaints(auditor):
    entries = list(auditor.errors) + list(auditor.fixes)
    return Counter(str(entry.code) for entry in entries)


def check_loading(original, marked):
    if original[0] != marked[0]:
        yield f"a: the original loads {original[0]}, the marked drawing {marked[0]}"
        return
    if original[2] is None:
        return
    for code, count in sorted((complaints(marked[2]) - complaints(original[2])).items()):
        yield f"a: the audit has {count} new findings of kind {code}"


def placed_entities(document):
    """Every entity that is drawn somewhere: in a layout or a block."""
    for block in document.blocks:
        yield from block


def check_entities(original, marked, written):
    before = {e.dxf.handle: e for e in placed_entities(original)}
    after = {e.dxf.handle: e for e in placed_entities(marked)}
    for handle, entity in before.items():
        if int(handle, 16) not in written:
            continue  # ezdxf's own number for something that has none in the file
        kept = after.get(handle)
        if kept is None:
            yield f"c: {entity.dxftype()} {handle} is lost"
        elif kept.dxftype() != entity.dxftype() or kept.dxf.layer != entity.dxf.layer:
            yield f"c: {entity.dxftype()} {handle} has become {kept.dxftype()} on layer {kept.dxf.layer}"
    old = Counter((e.dxftype(), e.dxf.layer) for e in before.values())
    new = Counter((e.dxftype(), e.dxf.layer) for e in after.values())
    for (kind, layer), count in sorted((old - new).items()):
        yield f"c: {count} {kind} on layer {layer!r} are lost"
    for (kind, layer), count in sorted((new - old).items()):
        if not layer.upper().startswith(OUR_LAYERS):
            yield f"d: {count} new {kind} on layer {layer!r}"


def check_handles(original, marked):
    before = Counter(handles(original))
    after = Counter(handles(marked))
    twice = [handle for handle, count in after.items() if count > 1 and before[handle] < count]
    for handle in sorted(twice):
        yield f"e: handle {handle:X} is used {after[handle]} times"
    new = set(after) - set(before)
    for handle in sorted(new & pointers(original)):
        yield f"e: new handle {handle:X} is one that the original points at"
    if 0 in new:
        yield "e: a new record has handle 0"
    seed_after = seed(marked)
    if new and seed_after is not None and seed_after <= max(new) and seed(original) != seed_after:
        yield f"e: $HANDSEED {seed_after:X} does not lie above the new handles"


def check(original_path, marked_path, allow_seed):
    """Prints what is wrong, or what was found right; 1 or 0."""
    original_tags = read_tags(original_path.read_bytes())
    marked_tags = read_tags(marked_path.read_bytes())
    problems = list(check_bytes(original_tags, marked_tags, allow_seed))
    problems += check_handles(original_tags[1], marked_tags[1])

    original = load(original_path)
    marked = load(marked_path)
    problems += check_loading(original, marked)
    if original[1] is not None and marked[1] is not None:
        problems += check_entities(original[1], marked[1], set(handles(original_tags[1])))
    new_tags = len(marked_tags[1]) - len(original_tags[1])

    for problem in problems:
        print(f"{marked_path}: {problem}")
    if problems:
        return 1
    print(f"{marked_path}: holds all of the original, which loads {original[0]}; {new_tags} tags more")
    return 0


def main():
    parser = argparse.ArgumentParser(description="Checks that a marked drawing is its original with marks inserted.")
    parser.add_argument("original", type=Path)
    parser.add_argument("marked", type=Path)
    parser.add_argument("--allow-seed", action="store_true", help="let the value of $HANDSEED differ")
    options = parser.parse_args()

    return check(options.original, options.marked, options.allow_seed)


if __name__ == "__main__":
    sys.exit(main())
