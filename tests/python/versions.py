#!/usr/bin/env python3
"""Writes one drawing in every DXF version that is in use, ASCII and binary.

    versions.py SRC OUTDIR

SRC is a DXF file of any version; OUTDIR gets <stem>-R12.dxf, <stem>-R12-binary.dxf and so on up to R2018. For R12,
what that version does not know (LWPOLYLINE, MTEXT, ...) is turned into what it does.
"""

import argparse
import sys
from pathlib import Path

import ezdxf
from ezdxf.addons import r12export

VERSIONS = ("R12", "R2000", "R2004", "R2007", "R2010", "R2013", "R2018")


def main():
    parser = argparse.ArgumentParser(description="Writes one drawing in every DXF version, ASCII and binary.")
    parser.add_argument("src", type=Path)
    parser.add_argument("outdir", type=Path)
    options = parser.parse_args()

    # No clock and no random identifiers: the same drawing gives the same files.
    ezdxf.options.write_fixed_meta_data_for_testing = True
    options.outdir.mkdir(parents=True, exist_ok=True)
    for version in VERSIONS:
        document = ezdxf.readfile(options.src)
        if version == "R12":
            document = r12export.convert(document)
        document.dxfversion = version
        for form, suffix in (("asc", ""), ("bin", "-binary")):
            path = options.outdir / f"{options.src.stem}-{version}{suffix}.dxf"
            document.saveas(path, fmt=form)
            print(path)
    return 0


if __name__ == "__main__":
    sys.exit(main())
