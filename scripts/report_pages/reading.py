# SPDX-License-Identifier: MIT
"""Reads run.h5 and summary.json into one plain object and refuses what is missing, broken or of two different runs."""
import configparser
import json
import math
import os
from dataclasses import dataclass

import h5py
import numpy as np

from .problems import ReportError, cannot

MOST_SNAPSHOTS = 4  # one large picture and a row of three
RUN_AGAIN = "run spokewright again with --replace"

_NEEDED_IN_SUMMARY = (
    "program version deck_sha256 seed status settled_from_ns averaged_from_ns averaged_to_ns end_time_ns early_end "
    "anode_voltage_V anode_current_A emitted_current_A cathode_return_current_A input_power_W rf_power_W load_power_W wall_loss_W anode_heat_W "
    "cathode_heat_W electronic_efficiency total_efficiency dominant_mode spoke_count spoke_strength hub_radius_mm "
    "frequency_GHz frequency_shift_MHz drive_power_W modes mode_events energy_imbalance charge_imbalance_C hull_voltage_V "
    "hartree_voltage_V electrons steps wall_clock_s ns_per_electron_step warnings").split()
_NEEDED_SERIES = (
    "time_ns anode_voltage_V anode_current_A emitted_current_A cathode_return_current_A input_power_W mode_power_W "
    "load_power_W wall_loss_W anode_heat_W cathode_heat_W").split()


@dataclass
class Snapshot:
    time_ns: float
    density: np.ndarray    # 1/m^3 [r][theta]
    potential: np.ndarray  # V [r][theta]
    radius: np.ndarray     # m, a macro-electron each
    theta: np.ndarray      # rad
    u_r: np.ndarray        # m/s, gamma times velocity
    u_theta: np.ndarray


@dataclass
class Wall:
    sectors: list
    energy_J: np.ndarray
    bin_edges_eV: np.ndarray  # one more than hits
    bin_hits: np.ndarray


@dataclass
class Run:
    summary: dict
    series: dict           # name -> samples; units stand in the names
    spectra: dict
    radii: np.ndarray      # m
    angles: np.ndarray     # rad
    snapshots: list        # at most MOST_SNAPSHOTS, in time, the last one among them
    snapshots_kept: int    # in run.h5
    anode: Wall
    cathode: Wall
    ledger: list           # (name, value, unit, description)
    deck: configparser.ConfigParser
    deck_text: str         # resolved
    overrides: list
    provenance: dict

    def number(self, section, key, otherwise=math.nan):
        try:
            return float(self.deck.get(section, key, fallback=otherwise))
        except ValueError:
            return otherwise

    @property
    def tube_name(self):
        return self.deck.get("tube", "name", fallback="unnamed tube")

    @property
    def vane_count(self):
        return int(self.number("tube", "vane_count", 0))

    @property
    def has_modes(self):
        return bool(self.summary["modes"])

    def mean(self, key):
        """Mean of a quantity of the summary, NaN when it is undefined."""
        entry = self.summary[key]
        return math.nan if entry is None else entry["mean"]

    def mode_name(self, mode):
        return f"n = {mode} (pi)" if 2 * mode == self.vane_count else f"n = {mode}"

    @property
    def interrupted(self):
        if self.summary["early_end"] is not None:
            return False
        last_step = 2e-3 * self.number("clock", "step_ps", 0)
        return self.summary["end_time_ns"] + last_step < self.number("clock", "end_time_ns", 0)

    def averaged_part(self):
        """(from, to) in ns behind every mean, or None when nothing was averaged."""
        start, end = self.summary["averaged_from_ns"], self.summary["averaged_to_ns"]
        return None if start is None or end is None else (start, end)


def read_run(folder):
    if not os.path.isdir(folder):
        fault = "is not a folder" if os.path.exists(folder) else "no such folder"
        raise ReportError(folder, fault, "give the folder named after --out of a run")
    archive, summary_file = os.path.join(folder, "run.h5"), os.path.join(folder, "summary.json")
    for path in (archive, summary_file):
        if not os.path.exists(path):
            raise ReportError(path, "is missing", "give the folder of a run that has ended")
    summary = _read_summary(summary_file)
    run = _read_archive(archive, summary)
    last_sample = run.series["time_ns"][-1:] if len(run.series["time_ns"]) else [0.0]
    same_end = abs(last_sample[0] - summary["end_time_ns"]) <= 1e-6 * abs(summary["end_time_ns"])
    if run.provenance["deck_sha256"] != summary["deck_sha256"] or not same_end:
        raise ReportError(summary_file, "is of another run than run.h5", RUN_AGAIN)
    return run


def _read_summary(path):
    try:
        with open(path, encoding="utf-8") as file:
            summary = json.load(file)
    except OSError as error:
        raise cannot("read", path, error) from None
    except ValueError as error:
        raise ReportError(path, f"is not JSON: {error}", RUN_AGAIN) from None
    if not isinstance(summary, dict) or summary.get("program") != "spokewright":
        raise ReportError(path, "is not a summary of spokewright", "give the folder named after --out of a run")
    for key in _NEEDED_IN_SUMMARY:
        if key not in summary:
            raise ReportError(path, f"has no {key}", RUN_AGAIN)
    return summary


def _read_archive(path, summary):
    try:
        # The library takes its own messages to standard error only when asked to; they come as OSError.
        with open(path, "rb"):
            pass
    except OSError as error:
        raise cannot("read", path, error) from None
    if not h5py.is_hdf5(path):
        raise ReportError(path, "is not an HDF5 file", RUN_AGAIN)
    try:
        with h5py.File(path, "r") as file:
            return _collect(file, summary)
    except KeyError as missing:
        raise ReportError(path, f"has no {missing.args[0]}", RUN_AGAIN) from None
    except (OSError, RuntimeError) as error:
        raise ReportError(path, f"is damaged: {str(error).splitlines()[0]}", RUN_AGAIN) from None
    except (ValueError, TypeError, IndexError, AttributeError, configparser.Error) as error:
        reason = (str(error).splitlines() or [type(error).__name__])[0]
        raise ReportError(path, f"holds something unexpected: {reason}", RUN_AGAIN) from None


def _dataset(file, name):
    if name not in file:
        raise KeyError(name)
    return file[name][()]


def _text(file, name):
    value = _dataset(file, name)
    return value.decode("utf-8", "replace") if isinstance(value, bytes) else str(value)


def _texts(file, name):
    return [item.decode("utf-8", "replace") for item in _dataset(file, name)]


def _one(file, name):
    return np.ravel(_dataset(file, name))[0].item()


def _collect(file, summary):
    for name in _NEEDED_SERIES:
        if f"/series/{name}" not in file:
            raise KeyError(f"/series/{name}")
    for mode in summary["modes"]:
        for name in (f"/series/mode_{mode['mode']}_voltage_V", f"/series/mode_{mode['mode']}_energy_J"):
            if name not in file:
                raise KeyError(name)
    series = {name: data[()] for name, data in file["/series"].items()}
    if len({len(column) for column in series.values()}) > 1:
        raise ValueError("the columns of /series differ in length")
    deck = configparser.ConfigParser(delimiters=("=",), comment_prefixes=("#",), interpolation=None)
    deck_text = _text(file, "/deck/resolved")
    deck.read_string(deck_text)
    origin = {name: _text(file, f"/provenance/{name}") for name in ("version", "build_flags", "finished_utc")}
    origin.update({name: _one(file, f"/provenance/{name}") for name in ("seed", "threads", "macro_weight")})
    origin["deck_sha256"] = _text(file, "/deck/sha256")
    chosen, kept = _read_snapshots(file)
    return Run(summary, series, {name: data[()] for name, data in file["/spectra"].items()},
               _dataset(file, "/axes/r_m"), _dataset(file, "/axes/theta_rad"), chosen, kept,
               _read_wall(file, "/walls/anode"), _read_wall(file, "/walls/cathode"),
               _read_ledger(file), deck, deck_text, _texts(file, "/deck/overrides"), origin)


def _read_snapshots(file):
    groups = sorted(file["/snapshots"], key=int) if "snapshots" in file else []
    picks = np.unique(np.linspace(0, len(groups) - 1, MOST_SNAPSHOTS).round().astype(int)) if groups else []
    snapshots = []
    for pick in picks:
        group = f"/snapshots/{groups[pick]}"
        snapshots.append(Snapshot(
            _one(file, f"{group}/time_s") * 1e9, _dataset(file, f"{group}/density_per_m3"),
            _dataset(file, f"{group}/potential_V"),
            *(_dataset(file, f"{group}/electron_{name}").astype(float)
              for name in ("radius_m", "theta_rad", "u_r", "u_theta"))))
    return snapshots, len(groups)


def _read_wall(file, group):
    lower = _dataset(file, f"{group}/impact_energy_eV")
    edges = np.append(lower, _one(file, f"{group}/impact_energy_range_eV"))
    return Wall(_texts(file, f"{group}/sector"), _dataset(file, f"{group}/energy_J"), edges,
                _dataset(file, f"{group}/impact_energy_hits"))


def _read_ledger(file):
    rows = []
    for name, data in file["/ledger"].items():
        unit, text = data.attrs.get("unit", ""), data.attrs.get("description", "")
        rows.append((name, np.ravel(data[()])[0].item(), str(unit), str(text)))
    return rows
