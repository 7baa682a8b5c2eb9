#!/usr/bin/env python3
"""Proves that check_lossless.py can fail: a good marking passes, and every way of spoiling it is found.

    python3 -m unittest discover tests/python
"""

import contextlib
import io
import tempfile
import unittest
from pathlib import Path

import ezdxf

from check_lossless import check


def original_text():
    document = ezdxf.new("R2010")
    document.modelspace().add_line((0, 0), (5, 5), dxfattribs={"layer": "SLAB-EDGE"})
    stream = io.StringIO()
    document.write(stream)
    return stream.getvalue()


def mark(text, layer="TAUT-TABLE", handle="FFF0"):
    """The text with a circle at the end of ENTITIES."""
    circle = f"  0\nCIRCLE\n  5\n{handle}\n100\nAcDbEntity\n  8\n{layer}\n100\nAcDbCircle\n 10\n1.0\n 20\n1.0\n 30\n0.0\n 40\n2.0\n"
    end = text.index("  0\nENDSEC\n", text.index("ENTITIES\n"))
    return text[:end] + circle + text[end:]


def verdict(original, marked, allow_seed=False):
    with tempfile.TemporaryDirectory() as folder:
        paths = Path(folder, "original.dxf"), Path(folder, "marked.dxf")
        for path, text in zip(paths, (original, marked)):
            path.write_text(text, encoding="utf-8")
        output = io.StringIO()
        with contextlib.redirect_stdout(output):
            status = check(*paths, allow_seed)
        return status, output.getvalue()


class CheckLossless(unittest.TestCase):
    def setUp(self):
        self.original = original_text()
        self.marked = mark(self.original)

    def assert_found(self, marked, letter):
        self.assertNotEqual(marked, self.marked)
        status, output = verdict(self.original, marked)
        self.assertEqual(status, 1)
        self.assertIn(f": {letter}: ", output)

    def test_a_good_marking_passes(self):
        self.assertEqual(verdict(self.original, self.original)[0], 0)
        self.assertEqual(verdict(self.original, self.marked)[0], 0)

    def test_a_changed_value_is_found(self):
        self.assert_found(self.marked.replace(" 11\n5.0\n", " 11\n5.00\n"), "b")

    def test_a_lost_tag_is_found(self):
        self.assert_found(self.marked.replace("  9\n$CLAYER\n  8\n0\n", ""), "b")

    def test_a_moved_entity_is_found(self):
        begin = self.marked.index("  0\nLINE\n")
        circle = self.marked.index("  0\nCIRCLE\n")
        end = self.marked.index("  0\nENDSEC\n", circle)
        moved = self.marked[:begin] + self.marked[circle:end] + self.marked[begin:circle] + self.marked[end:]
        self.assertEqual(verdict(self.original, moved)[0], 0)  # inserted before the line: nothing has moved
        lost = self.marked[:begin] + self.marked[circle:]
        self.assert_found(lost, "c")

    def test_a_changed_seed_is_found_unless_it_may_change(self):
        at = self.original.index("$HANDSEED\n  5\n") + len("$HANDSEED\n  5\n")
        end = self.original.index("\n", at)
        marked = mark(self.original[:at] + "FFFF" + self.original[end:])
        self.assert_found(marked, "b")
        self.assertEqual(verdict(self.original, marked, allow_seed=True)[0], 0)
        low = mark(self.original[:at] + "FFF0" + self.original[end:])
        self.assertIn(": e: ", verdict(self.original, low, allow_seed=True)[1])

    def test_a_mark_on_another_layer_is_found(self):
        self.assert_found(mark(self.original, layer="SLAB-EDGE"), "d")

    def test_a_handle_that_is_taken_is_found(self):
        line = self.original.index("  0\nLINE\n  5\n") + len("  0\nLINE\n  5\n")
        taken = self.original[line : self.original.index("\n", line)]
        self.assert_found(mark(self.original, handle=taken), "e")

    def test_a_record_that_the_audit_dislikes_is_found(self):
        self.assert_found(self.marked.replace("\nTAUT-TABLE\n", "\nTAUT-TABLE\n  6\nNO-SUCH-LINETYPE\n"), "a")

    def test_bytes_behind_the_end_are_compared(self):
        status, output = verdict(self.original + "\n\x1a", self.marked)
        self.assertEqual((status, ": b: " in output), (1, True))


if __name__ == "__main__":
    unittest.main()
