# SPDX-License-Identifier: MIT
"""The words and numbers of the page. Each number keeps the full value of the file beside its rounded text."""
import math
from dataclasses import dataclass

from .looks import prefix_for
from .mode_pictures import event_words

UNDEFINED = "not defined"


@dataclass
class Cell:
    text: str
    value: object = None  # as in the file, in its base unit; None where there is none


@dataclass
class Row:
    name: str
    value: Cell
    half_width: Cell
    unit: str


# (heading, [(key of summary.json, name, unit)])
_GROUPS = (
    ("Voltage and currents", (
        ("anode_voltage_V", "Anode voltage", "V"),
        ("anode_current_A", "Anode current", "A"),
        ("emitted_current_A", "Current emitted by the cathode, secondaries included", "A"),
        ("cathode_return_current_A", "Current returned to the cathode", "A"))),
    ("Power", (
        ("input_power_W", "Power from the supply", "W"),
        ("rf_power_W", "Radio-frequency power, electrons to resonators", "W"),
        ("drive_power_W", "Power that a generator sends in", "W"),
        ("load_power_W", "Power to the load", "W"),
        ("wall_loss_W", "Loss in the resonators' walls", "W"),
        ("electronic_efficiency", "Electronic efficiency, radio-frequency power over input", "%"),
        ("total_efficiency", "Total efficiency, load over input", "%"))),
    ("Heat", (
        ("anode_heat_W", "Anode heat, from electrons that land", "W"),
        ("cathode_heat_W", "Cathode heat, back bombardment", "W"))),
    ("Oscillation", (
        ("dominant_mode", "Dominant mode, n", ""),
        ("frequency_GHz", "Frequency", "GHz"),
        ("frequency_shift_MHz", "Shift from the cold frequency", "MHz"),
        ("spoke_count", "Spokes", ""),
        ("spoke_strength", "Bunching of the spokes, 0 even ring to 1 thin spokes", ""),
        ("hub_radius_mm", "Hub radius", "mm"))),
    ("Thresholds and books", (
        ("hull_voltage_V", "Hull cutoff voltage", "V"),
        ("hartree_voltage_V", "Hartree voltage, dominant or else pi mode", "V"),
        ("energy_imbalance", "Energy ledger open by, share of the input", "%"),
        ("charge_imbalance_C", "Charge books open by", "C"))),
)
_SCALABLE = ("V", "A", "W", "J")


def number_text(value, digits=5):
    if not math.isfinite(value):
        return UNDEFINED
    return f"{value:.{digits}g}"


def _scaled(value, half_width, unit):
    """(value, half width, unit) on the scale that suits a reader."""
    if unit == "%":
        return 100 * value, None if half_width is None else 100 * half_width, unit
    if unit not in _SCALABLE or value == 0 or 0.1 <= abs(value) < 1e4:
        return value, half_width, unit
    factor, prefix = prefix_for(abs(value))
    return value / factor, None if half_width is None else half_width / factor, prefix + unit


def _pair(mean, half_width, unit):
    """Texts of a mean and its half-width, rounded alike: the half-width to two digits."""
    value, half, unit = _scaled(mean, half_width, unit)
    if half is None:
        return Cell(number_text(value), mean), Cell("–"), unit
    if half == 0:
        return Cell(number_text(value), mean), Cell("0", 0.0), unit
    decimals = min(max(1 - math.floor(math.log10(abs(half))), 0), 9)
    return Cell(f"{value:.{decimals}f}", mean), Cell(f"{half:.{decimals}f}", half_width), unit


def _row(name, entry, unit):
    if entry is None:
        return Row(name, Cell(UNDEFINED), Cell("–"), "")
    if isinstance(entry, dict):
        return Row(name, *_pair(entry["mean"], entry["ci95"], unit))
    if isinstance(entry, int):
        return Row(name, Cell(str(entry), entry), Cell("–"), unit)
    return Row(name, *_pair(entry, None, unit))


def quantities(run):
    """[(heading, rows)] of the summary, with two figures that a tube's builder asks for next."""
    groups = []
    for heading, keys in _GROUPS:
        rows = [_row(name, run.summary[key], unit) for key, name, unit in keys]
        groups.append((heading, rows))
    area_cm2 = 2e-2 * math.pi * run.number("tube", "cathode_radius_mm") * run.number("tube", "axial_height_mm")
    if math.isfinite(area_cm2) and area_cm2 > 0:
        density, heat = run.mean("emitted_current_A") / area_cm2, run.mean("cathode_heat_W") / area_cm2
        for group, name, value, unit in ((0, "Emitted current over the cathode's surface", density, "A/cm²"),
                                         (2, "Cathode heat over its surface", heat, "W/cm²")):
            groups[group][1].append(Row(name, Cell(number_text(value, 4)), Cell("–"), unit))
    return groups


def modes(run):
    """Rows of cells: name, cold frequency, Hartree voltage, forward and backward voltage, energy."""
    rows = []
    for mode in run.summary["modes"]:
        cells = [Cell(number_text(mode["cold_frequency_GHz"]) + " GHz", mode["cold_frequency_GHz"])]
        for key, unit in (("hartree_voltage_V", "V"), ("voltage_V", "V"), ("backward_V", "V"), ("energy_J", "J")):
            row = _row("", mode[key], unit)
            half = "" if row.half_width.value in (None, 0.0) else f" ± {row.half_width.text}"
            cells.append(Cell(f"{row.value.text}{half} {row.unit}".strip(), row.value.value))
        rows.append((run.mode_name(mode["mode"]), cells))
    return rows


def events(run):
    return [(Cell(f"{event['time_ns']:.2f} ns", event["time_ns"]), event_words(run, event))
            for event in run.summary["mode_events"]]


def ledger(run):
    """Rows (description, cell, unit, share of what went in); one prefix for all energies, so that they can be added."""
    energies = {name: value for name, value, unit, _ in run.ledger if unit == "J"}
    went_in = sum(energies.get(name, 0.0) for name in ("supply_energy_J", "prime_energy_J", "drive_energy_J", "emission_energy_J"))
    factor, prefix = prefix_for(max([abs(value) for value in energies.values()] + [0.0]) / 10)
    rows = []
    for name, value, unit, description in run.ledger:
        share = ""
        if unit == "J":
            text, shown_unit = f"{value / factor:.3f}", prefix + unit
            share = f"{100 * value / went_in:.2f} %" if went_in > 0 else "–"
        elif name == "energy_imbalance":
            text, shown_unit = number_text(100 * value, 3), "%"
        else:
            text, shown_unit = number_text(value, 3), unit
        rows.append((description[:1].upper() + description[1:], Cell(text, value), shown_unit, share))
    return rows


def finished(run):
    """2026-12-01T14:21:42Z as 2026-12-01 14:21 UTC."""
    return run.provenance["finished_utc"].replace("T", " ")[:16] + " UTC"


def provenance(run):
    s, origin = run.summary, run.provenance
    return [("Program", f"spokewright {origin['version']}"), ("Build", origin["build_flags"]),
            ("Deck and overrides, SHA-256", s["deck_sha256"]),
            ("Overrides of the command line", " ".join(run.overrides) or "none"),
            ("Seed of the random numbers", str(s["seed"])), ("Threads", str(origin["threads"])),
            ("Finished", finished(run)), ("Tube time", f"{s['end_time_ns']:.3f} ns"),
            ("Steps", f"{s['steps']} of {run.deck.get('clock', 'step_ps', fallback='?')} ps"),
            ("Macro-electrons at the end", f"{s['electrons']:.0f}"),
            ("Real electrons in a macro-electron", number_text(origin["macro_weight"])),
            ("Wall clock", f"{s['wall_clock_s']:.1f} s"),
            ("Per electron and step", UNDEFINED if s["ns_per_electron_step"] is None
             else f"{s['ns_per_electron_step']:.2f} ns")]


def status_words(run):
    """What the status means, for a reader who has not met the word."""
    s = run.summary
    mode = s["dominant_mode"]
    steady = f"The tube oscillates steadily in {run.mode_name(mode)}." if mode else "The current is steady."
    thresholds = "Hull cutoff and every Hartree voltage" if run.has_modes else "Hull cutoff"
    sentences = {
        "settled": steady,
        "not settled": "The tube was still changing when the run ended: the means are a first indication, not an "
                       "operating point.",
        "no oscillation": f"A mode skip: no mode started within the {s['end_time_ns']:.1f} ns of the run. A real tube "
                          "has longer to start from its noise.",
        "cut off": f"The anode voltage is below {thresholds}, and next to no current reaches the anode.",
    }
    words = [sentences.get(s["status"], "")]
    if run.interrupted:
        words.append(f"The run was stopped at {s['end_time_ns']:.2f} of {run.number('clock', 'end_time_ns'):g} ns; "
                     "--resume goes on from there.")
    if s["early_end"] is not None:
        words.append(f"The run ended itself at {s['end_time_ns']:.1f} of {run.number('clock', 'end_time_ns'):g} ns: "
                     f"{s['early_end']}.")
    part = run.averaged_part()
    if part:
        words.append(f"The means are taken from {part[0]:.1f} to {part[1]:.1f} ns.")
    count = len(s["warnings"])
    words.append("There are no warnings." if count == 0 else
                 f"There {'is 1 warning' if count == 1 else f'are {count} warnings'}, listed after the summary.")
    return " ".join(words).strip()
