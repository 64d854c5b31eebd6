"""The schema that editors use: valid itself, true of every case, and not true of broken ones.

Usage: schema_test.py ROOT PROGRAM
"""
import copy
import json
import pathlib
import subprocess
import sys
import unittest

import jsonschema
import yaml

ROOT, PROGRAM = (pathlib.Path(word) for word in sys.argv[1:3])


class Loader(yaml.SafeLoader):
    """YAML as an editor reads it: a date is text."""


Loader.yaml_implicit_resolvers = {
    first: [(tag, pattern) for tag, pattern in resolvers if tag != "tag:yaml.org,2002:timestamp"]
    for first, resolvers in yaml.SafeLoader.yaml_implicit_resolvers.items()}


def read(text):
    return yaml.load(text, Loader)


def printed(*words):
    return subprocess.run([PROGRAM, *words], capture_output=True, text=True, check=True).stdout


def uncommented(starter):
    """The starter case with every key that stands in it as a comment."""
    return "\n".join(line.replace("# ", "", 1) if line.lstrip().startswith("# ") else line
                     for line in starter.splitlines()[1:])


# Each is one change to a good case: where, and what is put there (None: the key is taken out).
BROKEN = {
    "a key nobody knows": ("exchanger.tubes.numbr", 208),
    "no streams": ("streams", None),
    "no flow": ("streams.tube_side.flow", None),
    "no fluid": ("streams.shell_side.fluid", None),
    "neither material nor conductivity": ("exchanger.tubes.material", None),
    "a length without a unit": ("exchanger.tubes.outside_diameter", 19.05),
    "half a tube": ("exchanger.tubes.count", 207.5),
    "no tube at all": ("exchanger.tubes.count", 0),
    "a layout that does not exist": ("exchanger.tubes.layout", 35),
    "a word that is none of the choices": ("methods.shell_side", "guess"),
    "a format of the future": ("dutygauge", 99),
    "a list where a block belongs": ("exchanger.baffles", ["cut", "25 %"]),
    "two kinds of data for one fluid": ("streams.tube_side.fluid", {"constant": {}, "table": {}}),
    "a service that limits nothing known": ("service.noise", {"at_most": 80}),
}


def changed(case, key, value):
    case = copy.deepcopy(case)
    *blocks, last = key.split(".")
    place = case
    for block in blocks:
        place = place.setdefault(block, {})
    place.pop(last, None)
    if value is not None:
        place[last] = value
    return case


class Schema(unittest.TestCase):
    def setUp(self):
        self.schema = json.loads(printed("schema"))
        self.validator = jsonschema.Draft7Validator(self.schema)

    def faults(self, case):
        return [f"{'.'.join(map(str, error.absolute_path))}: {error.message}" for error in self.validator.iter_errors(case)]

    def test_is_a_draft_07_schema(self):
        self.assertEqual(self.schema["$schema"], "http://json-schema.org/draft-07/schema#")
        jsonschema.Draft7Validator.check_schema(self.schema)

    def test_every_case_of_the_project_is_valid(self):
        files = sorted(ROOT.glob("cases/*.yaml"))
        self.assertTrue(files)
        for file in files:
            with self.subTest(file=file.name):
                self.assertEqual(self.faults(read(file.read_text())), [])

    def test_the_starter_case_is_valid(self):
        self.assertEqual(self.faults(read(printed("new"))), [])

    def test_every_key_of_the_starter_case_is_known(self):
        starter = read(uncommented(printed("new")))
        self.assertIn("orientation", starter["exchanger"])
        unknown = [fault for fault in self.faults(starter) if "Additional properties" in fault]
        self.assertEqual(unknown, [])

    def test_every_broken_case_is_refused_here_and_by_the_program(self):
        good = read(printed("new"))
        for name, (key, value) in BROKEN.items():
            with self.subTest(name):
                case = changed(good, key, value)
                self.assertNotEqual(self.faults(case), [])
                run = subprocess.run([PROGRAM, "rate", "-"], input=yaml.safe_dump(case), capture_output=True, text=True)
                self.assertEqual(run.returncode, 2, run.stderr)


if __name__ == "__main__":
    unittest.main(argv=sys.argv[:1])
