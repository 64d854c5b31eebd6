"""What DEVELOPERS.md names is there: its commands run, its files and functions exist.

Usage: developers_test.py ROOT BUILD
"""
import json
import pathlib
import re
import shlex
import subprocess
import sys

ROOT, BUILD = (pathlib.Path(word) for word in sys.argv[1:3])
TEXT = (ROOT / "DEVELOPERS.md").read_text()
PRESETS = json.loads((ROOT / "CMakePresets.json").read_text())


def names(kind):
    return [preset["name"] for preset in PRESETS[kind] if not preset.get("hidden")]


def preset_fault(words, kind):
    preset = words[words.index("--preset") + 1]
    return "" if preset in names(kind) else f"no preset {preset}"


def build_fault(words):
    target = words[words.index("--target") + 1]
    known = re.search(rf"^build {re.escape(target)}: ", (BUILD / "build.ninja").read_text(), re.M)
    return preset_fault(words, "buildPresets") or ("" if known else f"no target {target}")


def ctest_fault(words):
    tests = subprocess.run(["ctest", "--test-dir", BUILD, "-N", "-R", words[words.index("-R") + 1]],
                           capture_output=True, text=True).stdout
    return preset_fault(words, "testPresets") or ("no such test" if "Total Tests: 0" in tests else "")


def script_fault(words):
    """A script is run by CI, by a test of its own, or by whoever releases; here it has to be there."""
    script = ROOT / words[0]
    if not script.exists() or not script.stat().st_mode & 0o100:
        return "no such script"
    runs = [(ROOT / file).read_text() for file in (".ci/run", "scripts/test", "README.md", "tests/readme_test.py")]
    runs.append(TEXT.split("## 10. Release")[1].split("## 11.")[0])
    return "" if any(words[0] in text for text in runs) else "neither CI, nor a test, nor the release runs it"


def program_fault(words):
    program = BUILD / pathlib.Path(words[0]).relative_to("build/release")
    if "bench" in program.name:  # too slow to run here
        return "" if program.exists() else "no such program"
    return "" if subprocess.run([program, *words[1:]], cwd=ROOT, capture_output=True).returncode == 0 else "it fails"


def command_fault(line):
    words = shlex.split(line, comments=True)
    if words[0].startswith("scripts/"):
        return script_fault(words)
    if words[0].startswith("build/release/"):
        return program_fault(words)
    if words[:2] == ["cmake", "--build"]:
        return build_fault(words)
    if words[0] == "cmake":
        return preset_fault(words, "configurePresets")
    if words[0] == "ctest":
        return ctest_fault(words)
    return "no rule of this test runs it"


def path_fault(path):
    pattern = re.sub(r"\*+", "*", path.replace("<module>", "*")).rstrip("/")
    return "" if list(ROOT.glob(pattern)) else "no such file"


def function_fault(module, name):
    places = [*ROOT.glob(f"include/dutygauge/{module}*.hpp"), *ROOT.glob(f"src/{module}/*.[ch]pp")]
    return "" if any(re.search(rf"\b{name}\b", place.read_text()) for place in places) else "no such name"


commands = [line for block in re.findall(r"```sh\n(.*?)```", TEXT, re.S) for line in block.splitlines()]
paths = re.findall(r"`((?:src|include|tests|scripts|cases|\.ci)/[\w./<>*-]*|CMakeLists\.txt)(?: [^`]*)?`", TEXT)
functions = [pair for pair in re.findall(r"`([a-z_]+)::([a-z_]+)`", TEXT) if pair[0] != "std"]

faults = [f"{line}: {fault}" for line in commands if (fault := command_fault(line))]
faults += [f"{path}: {fault}" for path in sorted(set(paths)) if (fault := path_fault(path))]
faults += [f"{module}::{name}: {fault}" for module, name in functions if (fault := function_fault(module, name))]
print("\n".join(faults) or f"{len(commands)} commands, {len(set(paths))} files and {len(functions)} functions are as DEVELOPERS.md says")
if faults or not (commands and paths and functions):
    sys.exit("DEVELOPERS.md names what is no longer so")
