#!/usr/bin/env python3
"""Includes go one way: a module may include only modules of a lower level.

Level 0 modules may include each other. The table is the architecture; a new
module gets its line here.
"""
import pathlib
import re
import sys

LEVELS = [
    {"findings", "sources", "units", "numerics"},
    {"fluids", "geometry"},
    {"tubeside", "shellside", "arrangement"},
    {"overall", "vibration"},
    {"rating"},
    {"service", "checks", "uncertainty"},
    {"bids", "field"},
    {"case_io", "report"},
    {"explore"},
    {"cli"},
]
LEVEL_OF = {module: level for level, modules in enumerate(LEVELS) for module in modules}
INCLUDE = re.compile(r'^\s*#include "dutygauge/(\w+)(?:/\w+)?\.hpp"', re.M)


def main():
    root = pathlib.Path(__file__).resolve().parent.parent
    files = [(p, p.stem) for p in (root / "include/dutygauge").glob("*.hpp")]
    files += [(p, p.parent.name) for p in (root / "include/dutygauge").glob("*/*.hpp")]
    files += [(p, p.parent.name) for p in (root / "src").glob("*/*.[ch]pp")]
    faults = []
    for path, module in sorted(files):
        if module not in LEVEL_OF:
            faults.append(f"{path.relative_to(root)}: module '{module}' has no level in the table")
            continue
        for included in INCLUDE.findall(path.read_text()):
            level, target = LEVEL_OF[module], LEVEL_OF.get(included, 99)
            if included != module and target >= level and not (level == target == 0):
                faults.append(f"{path.relative_to(root)}: level {level} includes '{included}' of level {target}")
    print("\n".join(faults) or f"{len(files)} files keep to their level")
    return bool(faults)


sys.exit(main())
