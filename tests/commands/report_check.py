#!/usr/bin/python3
# SPDX-License-Identifier: MIT
"""scripts/report as a user runs it, on short runs: what the page says, the figures, the errors. Argument: the path of
the spokewright binary. Exit status 0 when every check holds."""
import base64
import html
import json
import pathlib
import re
import resource
import shutil
import signal
import subprocess
import sys
import tempfile
import time
import unittest

import h5py
import matplotlib.image

REPORT = pathlib.Path(__file__).resolve().parents[2] / "scripts" / "report"
SPOKEWRIGHT = None  # from the command line

# Invented, and coarse: a nanosecond takes a tenth of a second. The name must be escaped in the page.
GRID = """[grid]
radial_cells = 40
azimuthal_cells = 100
[electrons]
target_count = 5000
"""
DIODE = """[tube]
name = Smooth <bore> & sons
cathode_radius_mm = 2
anode_radius_mm = 4.6
axial_height_mm = 10
vane_count = {vanes}
[supply]
anode_voltage_V = 4150
programme = 0:0 0.2:1
[magnet]
field_T = {field}
"""
VANED = DIODE.format(vanes=10, field=0.175) + """[circuit]
source = table
mode_numbers = 4 5
frequencies_GHz = 3.2 2.45
unloaded_Q = 1500
external_Q = 167
capacitance_pF = 1
[prime]
mode = 5
voltage_V = 600
""" + GRID
BORE = DIODE.format(vanes=0, field=0.12) + "[circuit]\nsource = none\n" + GRID

ALWAYS = ["spokes", "voltage_and_currents", "powers", "landing", "thresholds"]
WITH_MODES = ["mode_voltages", "power_budget", "spectrum", "earlier_snapshots"]
# Row of the page: key of summary.json. Typed in again here, so that a row with another row's number fails.
ROWS = {
    "Anode voltage": "anode_voltage_V", "Anode current": "anode_current_A",
    "Current emitted by the cathode, secondaries included": "emitted_current_A",
    "Current returned to the cathode": "cathode_return_current_A", "Power from the supply": "input_power_W",
    "Radio-frequency power, electrons to resonators": "rf_power_W", "Power to the load": "load_power_W",
    "Loss in the resonators&#39; walls": "wall_loss_W",
    "Electronic efficiency, radio-frequency power over input": "electronic_efficiency",
    "Total efficiency, load over input": "total_efficiency", "Anode heat, from electrons that land": "anode_heat_W",
    "Cathode heat, back bombardment": "cathode_heat_W", "Dominant mode, n": "dominant_mode",
    "Frequency": "frequency_GHz", "Shift from the cold frequency": "frequency_shift_MHz", "Spokes": "spoke_count",
    "Bunching of the spokes, 0 even ring to 1 thin spokes": "spoke_strength", "Hub radius": "hub_radius_mm",
    "Hull cutoff voltage": "hull_voltage_V", "Hartree voltage, dominant or else pi mode": "hartree_voltage_V",
    "Energy ledger open by, share of the input": "energy_imbalance", "Charge books open by": "charge_imbalance_C",
}
CAUTIONS = ["High voltage", "charged capacitors", "Microwave radiation", "X-rays", "Strong magnets", "Beryllia", "dust",
            "Local codes and licensed practice decide", "a simulation", "never a clearance"]
SCALE = {"k": 1e3, "M": 1e6, "m": 1e-3, "µ": 1e-6, "n": 1e-9, "p": 1e-12}


def report(*arguments, **options):
    return subprocess.run([REPORT, *map(str, arguments)], capture_output=True, text=True, check=False, **options)


def run_tube(folder, deck, *more):
    """A finished run in `folder`/out."""
    (folder / "tube.ini").write_text(deck)
    subprocess.run([SPOKEWRIGHT, "run", folder / "tube.ini", "--out", folder / "out", "--quiet", *more], check=True,
                   capture_output=True)
    return folder / "out"


def interrupt_tube(folder):
    """A run stopped by SIGINT at a fifth of its way."""
    (folder / "tube.ini").write_text(VANED)
    log = folder / "log"
    with log.open("w") as errors:
        run = subprocess.Popen([SPOKEWRIGHT, "run", folder / "tube.ini", "--out", folder / "out", "--set",
                                "clock.end_time_ns=8"], stdout=subprocess.DEVNULL, stderr=errors)
    while " 20 %" not in log.read_text() and run.poll() is None:
        time.sleep(0.002)
    run.send_signal(signal.SIGINT)
    return folder / "out", run.wait()


def unit_factor(unit, key):
    """What the number shown must be multiplied with to compare with the file."""
    if unit == "%":
        return 0.01
    base = key.rpartition("_")[2]
    return SCALE[unit[0]] if unit != base and unit.endswith(base) and unit[:-len(base)] in SCALE else 1.0


class Folder(unittest.TestCase):
    def setUp(self):
        self.scratch = pathlib.Path(tempfile.mkdtemp(prefix="spokewright-report-"))
        self.addCleanup(shutil.rmtree, self.scratch)

    def made_report(self, out):
        outcome = report(out)
        self.assertEqual((outcome.returncode, outcome.stderr), (0, ""))
        self.assertEqual(outcome.stdout, f"report: {out}/report.html\n")
        self.assertEqual([str(path) for path in out.rglob("*.partial")], [])
        return (out / "report.html").read_text(), json.loads((out / "summary.json").read_text())

    def check_cautions(self, page):
        for words in CAUTIONS:
            self.assertIn(words, re.sub(r"\s+", " ", page))

    def check_numbers(self, page, summary):
        for name, key in ROWS.items():
            with self.subTest(key=key):
                found = re.findall(rf'<tr><th>{re.escape(name)}</th><td class="number">(.*?)</td><td class="number">'
                                   r'(.*?)</td><td class="unit">(.*?)</td></tr>', page)
                self.assertEqual(len(found), 1)
                value, half, unit = found[0]
                entry = summary[key] if isinstance(summary[key], dict) else {"mean": summary[key], "ci95": None}
                self.check_cell(value, entry["mean"], unit, key)
                if entry["ci95"] is None:
                    self.assertEqual(half, "–")
                else:
                    self.check_cell(half, entry["ci95"], unit, key)

    def check_cell(self, cell, expected, unit, key):
        if expected is None:
            self.assertEqual(cell, "not defined")
            return
        exact, text = re.fullmatch(r'<data value="(.*?)">(.*?)</data>', cell).groups()
        self.assertEqual(float(exact), expected)  # to the last bit: the page carries the file's number
        digits = text.partition("e")[0]
        # Half a unit of the last digit shown, and a rounding error of the decimal arithmetic.
        step = 10.0 ** -len(digits.partition(".")[2]) * 10.0 ** int(text.partition("e")[2] or 0)
        if "." not in digits and "e" not in text:
            step = max(step, 10.0 ** (len(digits.lstrip("-")) - 5))
        factor = unit_factor(unit, key)
        self.assertLessEqual(abs(float(text) * factor - expected), (0.5 * step + 1e-12) * factor)

    def check_figures(self, out, page, names):
        self.assertEqual(sorted(path.name for path in (out / "figures").iterdir()), sorted(f"{n}.png" for n in names))
        self.assertEqual(page.count("<figure"), len(names))
        self.assertNotRegex(page, r'(src|href)="(?!data:)')  # nothing from outside
        for name in names:
            with self.subTest(figure=name):
                data = (out / "figures" / f"{name}.png").read_bytes()
                self.assertIn(base64.b64encode(data).decode(), page)
                pixels = matplotlib.image.imread(out / "figures" / f"{name}.png")[:, :, :3]
                # Axes and letters are grey, curves are not: 0.5 % of the barest figure here, none of an empty one.
                coloured = pixels.max(axis=2) - pixels.min(axis=2) > 0.15
                self.assertGreater(coloured.mean(), 0.002)
                self.assertGreater(pixels.shape[1], 1000)
                border = [pixels[:2], pixels[-2:], pixels[:, :2], pixels[:, -2:]]
                self.assertEqual([side.min() for side in border], [1.0] * 4)  # white: nothing is cut off

    def check_fault(self, folder, message, **options):
        outcome = report(folder, **options)
        self.assertEqual((outcome.returncode, outcome.stdout), (4, ""))
        self.assertEqual(outcome.stderr, f"report: {message}\n")


class Pages(Folder):
    def test_vaned_tube(self):
        times = "output.snapshot_times_ns=3 5 7 9"
        out = run_tube(self.scratch, VANED, "--set", "clock.end_time_ns=12", "--set", times)
        page, summary = self.made_report(out)
        self.assertEqual(summary["dominant_mode"], 5)  # else the rows below would not be tried
        self.check_numbers(page, summary)
        self.check_cautions(page)
        self.check_figures(out, page, ALWAYS + WITH_MODES)
        self.assertIn("<h1>Smooth &lt;bore&gt; &amp; sons</h1>", page)
        self.assertIn(f"<strong>Status: {summary['status']}.</strong>", page)
        self.assertIn("mode start: n = 5 (pi)", page)
        for mode in summary["modes"]:
            self.assertIn(f'<data value="{mode["voltage_V"]["mean"]}">', page)
        for warning in summary["warnings"]:
            self.assertIn(f"<li>{html.escape(warning)}</li>", page)
        with h5py.File(out / "run.h5") as file:
            self.assertIn(html.escape(file["/deck/resolved"][()].decode()), page)
            self.assertIn(f'<data value="{file["/ledger/load_energy_J"][0]}">', page)
        for words in (summary["deck_sha256"], "spokewright " + summary["version"], times):
            self.assertIn(words, page)

    def check_old_report_survives(self, out):
        """A disk that is full in mid-write: the old files stay as they were, no partial file stays."""
        before = {path: path.read_bytes() for path in out.rglob("*") if path.is_file()}
        limit = 50000  # bytes: less than the first figure
        self.check_fault(out, f"{out}/figures/spokes.png: cannot write: File too large; "
                              "free some space or choose another folder",
                         preexec_fn=lambda: resource.setrlimit(resource.RLIMIT_FSIZE, (limit, limit)))
        self.assertEqual({path: path.read_bytes() for path in out.rglob("*") if path.is_file()}, before)

    def test_smooth_bore(self):
        out = run_tube(self.scratch, BORE, "--set", "clock.end_time_ns=3")
        (out / "figures").mkdir()
        (out / "figures" / "mode_voltages.png").write_bytes(b"of an earlier report on a tube with modes")
        page, summary = self.made_report(out)
        self.assertEqual(summary["modes"], [])
        self.check_numbers(page, summary)
        self.check_cautions(page)
        drawn = ALWAYS + (["power_budget"] if summary["input_power_W"]["mean"] > 0 else [])
        self.check_figures(out, page, drawn)
        self.assertIn("This tube has no resonators, hence no modes.", page)

    def test_interrupted(self):
        out, status = interrupt_tube(self.scratch)
        self.assertEqual(status, 130)
        page, summary = self.made_report(out)
        self.assertIsNone(summary["settled_from_ns"])
        self.check_numbers(page, summary)
        self.check_cautions(page)
        self.assertIn(f"The run was stopped at {summary['end_time_ns']:.2f} of 8 ns", page)
        self.assertIn("<li>stopped at ", page)
        self.assertIn("not defined", page)  # no frequency yet

    def test_one_sample(self):
        out = run_tube(self.scratch, VANED, "--set", "clock.end_time_ns=0.001")
        page, summary = self.made_report(out)
        self.check_numbers(page, summary)
        self.check_cautions(page)
        self.assertIn("The run is too short for a line over time.", page)
        self.check_old_report_survives(out)


class Faults(Folder):
    """What cannot be read: exit status 4, one line, and nothing new in the folder."""

    @classmethod
    def setUpClass(cls):
        cls.source = pathlib.Path(tempfile.mkdtemp(prefix="spokewright-report-"))
        cls.addClassCleanup(shutil.rmtree, cls.source)
        run_tube(cls.source, BORE, "--set", "clock.end_time_ns=0.5")

    def setUp(self):
        super().setUp()
        self.out = self.scratch / "out"
        shutil.copytree(self.source / "out", self.out)

    def check_refused(self, file, fault):
        before = sorted(self.out.iterdir())
        self.check_fault(self.out, f"{self.out}/{file}: {fault}")
        self.assertEqual(sorted(self.out.iterdir()), before)

    def test_missing(self):
        gone = self.scratch / "gone"
        self.check_fault(gone, f"{gone}: no such folder; give the folder named after --out of a run")
        deck = self.source / "tube.ini"
        self.check_fault(deck, f"{deck}: is not a folder; give the folder named after --out of a run")
        (self.out / "summary.json").unlink()
        self.check_refused("summary.json", "is missing; give the folder of a run that has ended")
        (self.out / "run.h5").unlink()
        self.check_refused("run.h5", "is missing; give the folder of a run that has ended")

    def test_archive(self):
        archive = self.out / "run.h5"
        with h5py.File(archive, "a") as file:
            del file["/series/input_power_W"]
        self.check_refused("run.h5", "has no /series/input_power_W; run spokewright again with --replace")
        with h5py.File(archive, "w") as file:
            file["something"] = 1
        self.check_refused("run.h5", "has no /series/time_ns; run spokewright again with --replace")
        archive.write_bytes(archive.read_bytes()[:600])
        outcome = report(self.out)
        self.assertEqual(outcome.returncode, 4)
        self.assertRegex(outcome.stderr, rf"^report: {archive}: is damaged: [^\n]*truncated[^\n]*; run spokewright "
                                         r"again with --replace\n$")
        archive.write_text("no archive")
        self.check_refused("run.h5", "is not an HDF5 file; run spokewright again with --replace")

    def test_summary(self):
        path = self.out / "summary.json"
        good = json.loads(path.read_text())
        path.write_text(json.dumps(dict(good, deck_sha256="0" * 64)))
        self.check_refused("summary.json", "is of another run than run.h5; run spokewright again with --replace")
        path.write_text(json.dumps({key: value for key, value in good.items() if key != "status"}))
        self.check_refused("summary.json", "has no status; run spokewright again with --replace")
        path.write_text("[1, 2]")
        self.check_refused("summary.json",
                           "is not a summary of spokewright; give the folder named after --out of a run")
        path.write_text("{")
        self.check_refused("summary.json", "is not JSON: Expecting property name enclosed in double quotes: line 1 "
                                           "column 2 (char 1); run spokewright again with --replace")

    def test_folder_in_the_way(self):
        (self.out / "figures").write_text("a file of that name")
        self.check_refused("figures", "cannot write: File exists; move it away")

    def test_command_line(self):
        self.assertEqual(report().returncode, 2)
        self.assertEqual(report(self.out, "--colour").returncode, 2)
        shown = report("--help")
        self.assertEqual((shown.returncode, shown.stderr), (0, ""))
        self.assertIn("usage: report [-h] DIR", shown.stdout)


if __name__ == "__main__":
    if len(sys.argv) < 2:
        sys.exit("report_check.py: give the path of the spokewright binary")
    SPOKEWRIGHT = sys.argv.pop(1)
    unittest.main()
