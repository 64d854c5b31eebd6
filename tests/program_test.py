"""The program as it is called from a shell: statuses, streams, pipes, locales, bytes.

Usage: program_test.py ROOT PROGRAM
"""
import json
import os
import pathlib
import re
import shutil
import signal
import subprocess
import sys
import tempfile
import time
import unittest

ROOT, PROGRAM = (pathlib.Path(word) for word in sys.argv[1:3])
MET = ROOT / "cases/lean-solvent-cooler.yaml"


def run(*words, **how):
    how = {"capture_output": True, "timeout": 60, **how}
    return subprocess.run([PROGRAM, *map(str, words)], **how)


def starter():
    return run("new").stdout


def readings():
    """Two days of a plant that runs as the starter case says, with a little noise."""
    lines = ["time,hot_flow[kg/s],cold_flow[m3/h],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]"]
    for hour in range(48):
        wobble = [((hour * step) % 17 - 8) / 40 for step in (3, 5, 7, 11, 13, 16)]
        values = [base + part for base, part in zip((21.5, 62, 68, 58.5, 29, 34.9), wobble)]
        lines.append(f"2026-01-{1 + hour // 24:02}T{hour % 24:02}:00Z," + ",".join(f"{value:.2f}" for value in values))
    return "\n".join(lines).encode() + b"\n"


def too_much_asked():
    return starter().replace(b"at_most: 58 degC", b"at_most: 45 degC")


def commands():
    table = run("--help").stdout.decode().split("Commands:\n")[1].split("\n\n")[0]
    return [line.split()[0] for line in table.splitlines()]


class InFolder(unittest.TestCase):
    """A folder of its own for each test."""

    def setUp(self):
        folder = tempfile.TemporaryDirectory()
        self.addCleanup(folder.cleanup)
        self.folder = pathlib.Path(folder.name)

    def write(self, name, content):
        path = self.folder / name
        path.write_bytes(content)
        return path


class Status(InFolder):
    def test_0_when_the_service_is_met(self):
        done = run("rate", MET)
        self.assertEqual((done.returncode, done.stderr), (0, b""))
        self.assertIn(b"ANSWER       Yes", done.stdout)

    def test_1_when_the_service_is_missed(self):
        done = run("rate", self.write("missed.yaml", too_much_asked()))
        self.assertEqual((done.returncode, done.stderr), (1, b""))
        self.assertIn(b"ANSWER       No", done.stdout)

    def test_2_when_an_input_is_at_fault(self):
        bad = self.write("bad.yaml", starter().replace(b"spacing: 150 mm", b"spacing: 150"))
        for words in (["rate", bad], ["rate", self.folder / "missing.yaml"], ["rate", self.folder], ["rate", "--strict", MET]):
            with self.subTest(words[-1]):
                done = run(*words)
                self.assertEqual((done.returncode, done.stdout), (2, b""))
                self.assertRegex(done.stderr, rb"error: ")

    def test_2_when_the_call_is_at_fault(self):
        for words in ([], ["rte"], ["rate"], ["rate", "--jso", MET], ["rate", "--units", "ells", MET], ["explain", "no.key"]):
            with self.subTest(words):
                done = run(*words)
                self.assertEqual((done.returncode, done.stdout), (2, b""))
                self.assertNotEqual(done.stderr, b"")

    def test_3_when_there_is_no_result(self):
        # Water that would have to pass its boiling point on the way to a balance.
        hot = starter().replace(b"flow: 62 m3/h at inlet", b"flow: 0.9 m3/h at inlet").replace(b"4 bara", b"0.2 bara")
        hot = hot.replace(b"68 degC", b"180 degC")
        done = run("rate", self.write("boils.yaml", hot))
        self.assertEqual(done.returncode, 3, done.stdout + done.stderr)
        self.assertIn(b"No result", done.stdout)

    def test_3_when_one_of_several_files_gave_no_result(self):
        bad = self.write("bad.yaml", b"dutygauge: 1\n")
        done = run("rate", "--json", MET, bad, self.write("missed.yaml", too_much_asked()))
        self.assertEqual(done.returncode, 3)
        self.assertEqual(len(done.stdout.splitlines()), 3)

    def test_4_when_the_result_cannot_be_written(self):
        if not pathlib.Path("/dev/full").exists():
            self.skipTest("no /dev/full here")
        with open("/dev/full", "wb") as full:
            for words in (["rate", MET], ["rate", "--json", MET], ["new"], ["schema"], ["--help"]):
                with self.subTest(words):
                    done = run(*words, capture_output=False, stdout=full, stderr=subprocess.PIPE)
                    self.assertEqual(done.returncode, 4)
                    self.assertIn(b"cannot write", done.stderr)
        self.assertEqual(run("new", "--out", self.folder / "no/such/folder.yaml").returncode, 4)

    def test_of_every_outcome_stands_in_the_help(self):
        for status in (0, 1, 2, 3, 4, 70, 130):
            self.assertRegex(run("--help").stdout.decode(), rf"(?m)^  {status} ")


class Streams(InFolder):
    def test_a_closed_pipe_ends_quietly(self):
        # More than a pipe holds, so that the program is still writing when the reader goes.
        many = [MET] * 8
        with subprocess.Popen([PROGRAM, "rate", "--json", *many], stdout=subprocess.PIPE, stderr=subprocess.PIPE) as writer:
            writer.stdout.read(1)
            writer.stdout.close()
            self.assertEqual(writer.stderr.read(), b"")
            self.assertEqual(writer.wait(60), -signal.SIGPIPE)

    def test_an_interrupt_ends_at_once(self):
        with subprocess.Popen([PROGRAM, "rate", "-"], stdin=subprocess.PIPE, stdout=subprocess.PIPE) as waiting:
            time.sleep(0.3)
            waiting.send_signal(signal.SIGINT)
            self.assertIn(waiting.wait(10), (130, -signal.SIGINT))  # a shell shows both as 130
            self.assertEqual(waiting.stdout.read(), b"")

    def test_an_interrupted_record_leaves_nothing_behind(self):
        case = self.write("cooler.yaml", starter())
        words = [PROGRAM, "field", case, "-", "--csv", self.folder / "hours.csv"]
        with subprocess.Popen(words, stdin=subprocess.PIPE, stdout=subprocess.PIPE, stderr=subprocess.PIPE) as waiting:
            waiting.stdin.write(readings())
            waiting.stdin.flush()
            time.sleep(0.3)
            waiting.send_signal(signal.SIGINT)
            self.assertEqual(waiting.wait(10), 130)
            self.assertEqual(waiting.stdout.read(), b"")
            self.assertIn(b"interrupted", waiting.stderr.read())
        self.assertEqual(sorted(path.name for path in self.folder.iterdir()), ["cooler.yaml"])

    def test_a_record_from_a_pipe_is_the_record_of_the_file(self):
        case, file = self.write("cooler.yaml", starter()), self.write("readings.csv", readings())
        from_file = run("field", case, file, "--csv", "-")
        piped = run("field", case, "-", "--csv", "-", input=readings())
        self.assertEqual((piped.returncode, piped.stderr), (0, b""))
        self.assertEqual(piped.stdout, from_file.stdout)
        self.assertEqual(len(piped.stdout.splitlines()), 49)

    def test_a_dash_is_standard_input(self):
        done = run("rate", "-", input=starter())
        self.assertEqual((done.returncode, done.stderr), (0, b""))
        self.assertEqual(json.loads(run("rate", "--json", "-", input=starter()).stdout)["case"]["file"], "-")
        bad = run("rate", "-", input=b"dutygauge: 1\n")
        self.assertRegex(bad.stderr, rb"(?m)^-:1:1: error: ")

    def test_results_and_messages_do_not_mix(self):
        done = run("rate", "--verbose", MET)
        self.assertIn(b"ANSWER", done.stdout)
        self.assertNotIn(b"ANSWER", done.stderr)
        self.assertEqual(run("rate", "--quiet", MET).stderr, b"")


class Help(InFolder):
    def test_every_command_shows_two_examples_that_run(self):
        for name in ("cooler.yaml", "before.yaml"):
            self.write(name, starter())
        self.write("after.yaml", too_much_asked())
        self.write("readings.csv", readings())
        (self.folder / "before.json").write_bytes(run("rate", "--json", self.folder / "before.yaml").stdout)
        shutil.copytree(ROOT / "cases", self.folder / "cases")
        path = {**os.environ, "PATH": f"{PROGRAM.parent}:{os.environ['PATH']}"}
        self.assertIn("rate", commands())
        for command in commands():
            text = run(command, "--help").stdout.decode()
            examples = text.split("Examples:\n")[1].split("\n\n")[0].splitlines()
            self.assertEqual(len(examples), 2, command)
            for example in examples:
                with self.subTest(example):
                    line, _, remark = example.strip().partition("  ")
                    done = subprocess.run(["sh", "-c", line], cwd=self.folder, env=path, capture_output=True, timeout=60)
                    self.assertIn(done.returncode, (0, 1), done.stderr)
                    (self.folder / "case.schema.json").unlink(missing_ok=True)

    def test_goes_to_stdout_and_fits_a_terminal(self):
        for words in (["--help"], ["-h"], *([command, "--help"] for command in commands())):
            with self.subTest(words):
                done = run(*words)
                self.assertEqual((done.returncode, done.stderr), (0, b""))
                self.assertLessEqual(max(map(len, done.stdout.decode().splitlines())), 100)

    def test_the_version_has_the_shape_scripts_expect(self):
        self.assertRegex(run("--version").stdout, rb"^dutygauge \d+\.\d+\.\d+ \(.+\)\n$")


class Bytes(InFolder):
    def results(self, **how):
        return [run("rate", *words, MET, **how).stdout for words in ([], ["-v"], ["--json"], ["--units", "us"])]

    def test_are_the_same_twice_and_from_anywhere(self):
        first = self.results()
        self.assertEqual(first, self.results())
        self.assertEqual(first, self.results(cwd=self.folder, env={"TZ": "Asia/Tokyo"}))
        self.assertNotIn(str(ROOT).encode(), b"".join(first))

    def test_are_the_same_at_any_number_of_jobs(self):
        one, many = (run("rate", "--json", "--jobs", jobs, *[MET] * 6).stdout for jobs in (1, 4))
        self.assertEqual(one, many)

    def test_are_the_same_in_a_locale_with_a_decimal_comma(self):
        made = subprocess.run(["localedef", "-i", "de_DE", "-f", "UTF-8", self.folder / "de_DE.UTF-8"], capture_output=True)
        if not (self.folder / "de_DE.UTF-8").exists():
            self.skipTest(f"no German locale can be made here: {made.stderr.decode()}")
        german = {"LOCPATH": str(self.folder), "LC_ALL": "de_DE.UTF-8", "LANG": "de_DE.UTF-8"}
        self.assertEqual(self.results(env={"LC_ALL": "C"}), self.results(env=german))

    def test_of_the_pages_are_ascii_within_100_columns(self):
        pages = run("rate", ROOT / "cases").stdout.decode("ascii")
        self.assertLessEqual(max(map(len, pages.splitlines())), 100)

    def test_of_the_json_are_one_object_a_line_with_the_promised_keys(self):
        lines = run("rate", "--json", ROOT / "cases").stdout.decode().splitlines()
        self.assertEqual(len(lines), len(list((ROOT / "cases").glob("*.yaml"))))
        promised = {"dutygauge", "schema_version", "input_sha256", "case", "operating_case", "verdict", "thermal",
                    "resistances_m2K_W", "tube_side", "shell_side", "margins", "solutions", "states", "operating_cases",
                    "assumed", "findings", "inputs"}
        for line in lines:
            result = json.loads(line)
            self.assertEqual(promised - set(result), set())
            self.assertEqual(result["schema_version"], 1)
            self.assertFalse(re.search(r"NaN|Infinity", line))


class Shelter(InFolder):
    def test_nothing_is_replaced_without_force_and_no_scrap_is_left(self):
        kept = self.write("kept.txt", b"mine")
        self.assertEqual(run("rate", MET, "--out", kept).returncode, 2)
        self.assertEqual(kept.read_bytes(), b"mine")
        self.assertEqual(run("rate", MET, "--out", kept, "--force").returncode, 0)
        self.assertIn(b"ANSWER", kept.read_bytes())
        self.assertEqual([file.name for file in self.folder.iterdir()], ["kept.txt"])


if __name__ == "__main__":
    unittest.main(argv=sys.argv[:1])
