#!/usr/bin/env python3
"""Every id of a finding that the sources can emit is explained, and nothing else is.

usage: finding_ids_test.py SOURCE_DIR PROGRAM
"""
import json
import pathlib
import re
import subprocess
import sys

NAME = r"[a-z][a-z_0-9]*\.[a-z][a-z_0-9]*"
# A literal id of a finding; an id handed to a helper stands before the severity.
LITERAL = re.compile(rf'\.id = "({NAME})"|"({NAME})",\s*Severity::')
# An id that is not a literal: only helpers that are given it may have one.
ANY_ID = re.compile(r"\.id = (?!\")([^,;]+)")
HANDED_ON = "std::move(id)"


def without_comments(text):
    return re.sub(r"//[^\n]*", "", text)


def emitted(source):
    """Ids in the sources, and the places where an id is made in a way this test cannot see."""
    ids, unseen = set(), []
    for path in sorted((source / "src").rglob("*.[ch]pp")):
        text = without_comments(path.read_text())
        ids.update(one or other for one, other in LITERAL.findall(text))
        for expression in ANY_ID.findall(text):
            if expression.strip() != HANDED_ON:
                unseen.append(f"{path.relative_to(source)}: .id = {expression.strip()}: not a literal, not handed on")
    return ids, unseen


def explained(source):
    """Ids that have a row of the table."""
    ids = set()
    for path in sorted((source / "src/report").glob("finding_rows_*.cpp")):
        ids.update(re.findall(rf'^    \{{"({NAME})",', path.read_text(), re.M))
    return ids


def check_page(program, name):
    """The program explains the id, as a page and as JSON."""
    page = subprocess.run([program, "explain", name], capture_output=True, text=True)
    record = subprocess.run([program, "explain", name, "--json"], capture_output=True, text=True)
    faults = []
    if page.returncode != 0 or not page.stdout.startswith(name + "\n"):
        faults.append(f"explain {name}: status {page.returncode}: {page.stdout}{page.stderr}")
    elif max(map(len, page.stdout.splitlines())) > 100:
        faults.append(f"explain {name}: a line is longer than 100 columns")
    if record.returncode != 0 or json.loads(record.stdout)["id"] != name:
        faults.append(f"explain {name} --json: status {record.returncode}: {record.stdout}{record.stderr}")
    return faults


def main():
    source, program = pathlib.Path(sys.argv[1]), sys.argv[2]
    found, faults = emitted(source)
    rows = explained(source)
    if len(found) < 60:
        faults.append(f"only {len(found)} ids found in src: does this test still know how they are written?")
    faults += [f"{name}: emitted, but without a row in src/report/finding_rows_*.cpp" for name in sorted(found - rows)]
    faults += [f"{name}: has a row, but nothing emits it" for name in sorted(rows - found)]
    for name in sorted(found & rows):
        faults += check_page(program, name)
    print("\n".join(faults) or f"{len(found)} ids of findings are explained")
    return bool(faults)


sys.exit(main())
