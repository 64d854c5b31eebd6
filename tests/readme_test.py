"""What README.md shows is what the program prints today.

Usage: readme_test.py ROOT PROGRAM SCOREBOARD
"""
import importlib.machinery
import importlib.util
import pathlib
import sys

root, program, scoreboard = (pathlib.Path(word) for word in sys.argv[1:4])
sys.dont_write_bytecode = True
loader = importlib.machinery.SourceFileLoader("refresh_readme", str(root / "scripts/refresh_readme"))
refresh_readme = importlib.util.module_from_spec(importlib.util.spec_from_loader(loader.name, loader))
loader.exec_module(refresh_readme)

text = (root / "README.md").read_text()
commands = [block["command"] for block in refresh_readme.BLOCK.finditer(text)]
faults = refresh_readme.faults(text, program, scoreboard)
faults += [f"README.md does not show {command}" for command in
           ("scripts/run rate cases/lean-solvent-cooler.yaml", "scripts/test", "scripts/scoreboard")
           if command not in commands]
for fault in faults:
    print(fault)
if faults:
    sys.exit("README.md shows what is no longer so; run scripts/refresh_readme and look at the difference")
print(f"{len(commands)} blocks of README.md are as printed today")
