"""Every equation of calculation sheets, worked out again from the numbers that the sheet itself puts in.

Usage: workings.py PROGRAM DRAWING JOB MARK...

A line is `symbol = formula = numbers = value unit   [clause]`. The numbers are read as they stand on paper, with `x`, `^` and
multiplication by mere neighbourhood. They have six digits, so the value must agree to 2e-5, or to what is left of six digits
where a difference of near numbers stands in it.
"""

import math
import re
import subprocess
import sys

TOLERANCE = 2e-5
FUNCTIONS = {"sqrt": math.sqrt, "exp": math.exp, "log": math.log10}
TOKEN = re.compile(r"\s*(\d+ 000(?!\d)|\d+\.?\d*(?:e[-+]?\d+)?|sqrt|exp|log|e(?=\^)|<=|[-+/^x()\[\]])")
# What a symbol's clause does to the number that comes out.
BOUNDS = {"k_6": (1.0, math.inf), "t_0,adjusted": (0.5, math.inf), "f_cir": (0.0, math.inf), "CR": (0.0, math.inf),
          "RE": (0.0, math.inf)}
STRESSES = ("sigma", "stress")


def tokens(text):
    found, at = [], 0
    while at < len(text.rstrip()):
        token = TOKEN.match(text, at)
        if token is None:
            return None
        found.append(token.group(1).replace(" ", ""))
        at = token.end()
    return found


def worked_out(text):
    """The value of a right side in numbers, and the greatest number added or taken away on the way; None where it is none."""
    found = tokens(text)
    if not found:
        return None
    out, before = [], ""
    for token in found:
        starts = token[0].isdigit() or token in "([e" or token in FUNCTIONS
        if starts and (before[-1:].isdigit() or before in (")", "]", "e-")):
            out.append("*")
        out.append({"x": "*", "^": "**", "[": "(", "]": ")", "e": "math.e", "<=": ","}.get(token, token))
        before = token
    expression = "".join(out)
    names = {"math": math, "__builtins__": {}, **FUNCTIONS}
    values = eval(expression, names)  # digits, signs and three functions only: see TOKEN
    return min(values) if isinstance(values, tuple) else values


def parts(line):
    body, clause = line.rsplit("   [", 1)
    body = body.split(", at ")[0]
    pieces = body.strip().split(" = ")
    if pieces[-1].endswith(" ksi"):
        pieces.pop()
    return pieces, clause.rstrip("]")


def check(sheet, name):
    checked, wrong = 0, []
    for line in sheet.splitlines():
        if not line.startswith("  ") or not line.endswith("]") or "   [" not in line:
            continue
        pieces, _ = parts(line)
        if len(pieces) != 4:
            continue
        symbol, _, numbers, value = pieces
        value = float(value.split()[0])
        found = worked_out(numbers)
        if found is None:
            wrong.append(f"{name}: cannot be read: {line.strip()}")
            continue
        low, high = BOUNDS.get(symbol, (-math.inf, math.inf))
        if any(word in symbol for word in STRESSES) and "permanent" in line:
            low = 0.0
        found = min(max(found, low), high)
        checked += 1
        if abs(found - value) > TOLERANCE * max(abs(value), 1e-9):
            wrong.append(f"{name}: {found:.7g} comes out: {line.strip()}")
    return checked, wrong


def main():
    program, drawing, job, *marks = sys.argv[1:]
    checked, wrong = 0, []
    for mark in marks:
        done = subprocess.run([program, "tendon", drawing, mark, "--job", job], capture_output=True, text=True, check=True)
        count, more = check(done.stdout, mark)
        checked, wrong = checked + count, wrong + more
        if count == 0:
            wrong.append(f"{mark}: no equation on its sheet")
    print(f"{drawing} by {job}: {checked} equations worked out again, {len(wrong)} otherwise")
    if wrong:
        print("\n".join(wrong[:20]))
        raise SystemExit(1)


if __name__ == "__main__":
    main()
