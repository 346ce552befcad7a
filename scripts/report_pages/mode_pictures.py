# SPDX-License-Identifier: MIT
"""Pictures of the modes: their voltages over time, their spectra, the harmonics of the charge, the thresholds."""
import numpy as np

from .looks import (DASHES, METAL_EDGE, NAVY, ORDER, RUST, TEAL, WIDTH, Picture, bin_words, binned, finish,
                    legend_below, plt, prefix_for, shade_averaged, shading_words, time_axis)

MOST_MODES = 6        # drawn, the strongest: one colour and dash pattern each
LOG_FLOOR = 1e-4      # of the strongest mode; below are rounding and shot noise
ZOOM_BINS = 15        # of the spectrum, on either side of the dominant mode
COARSEST = 0.1        # spacing of a spectrum worth drawing, over the lowest cold frequency
NO_MODES = "This tube has no resonators, hence no modes."


def strongest_modes(run):
    """Entries of the summary's modes by mean energy, at most MOST_MODES, then by mode number from the pi mode down."""
    def energy(mode):
        return mode["energy_J"]["mean"] if mode["energy_J"] else 0.0
    chosen = sorted(run.summary["modes"], key=energy, reverse=True)[:MOST_MODES]
    return sorted(chosen, key=lambda mode: -mode["mode"])


def _lines(run):
    """(mode number, colour, dashes) of the modes drawn; the same in every picture."""
    return [(mode["mode"], ORDER[k], DASHES[k]) for k, mode in enumerate(strongest_modes(run))]


def event_words(run, event):
    if event["kind"] == "mode skip":
        return "mode skip: none started"
    names = [run.mode_name(n) if n else "none" for n in (event["from"], event["to"])]
    return f"{event['kind']}: {names[1]}" if event["from"] is None else f"{event['kind']}: {names[0]} to {names[1]}"


def mode_voltages(run):
    name, title = "mode_voltages", "Mode voltages"
    if not run.has_modes:
        return Picture(name, title, NO_MODES)
    time = run.series["time_ns"]
    highest = max(float(np.nanmax(run.series[f"mode_{n}_voltage_V"], initial=0)) for n, *_ in _lines(run))
    if len(time) < 2 or not highest > 0:
        return Picture(name, title, "No mode has a voltage yet, or the run is too short for a line over time.")
    figure, axes = plt.subplots(figsize=(WIDTH, 3.8))
    shaded = shade_averaged(axes, run)
    for number, colour, dashes in _lines(run):
        at, mean, _, _ = binned(run, run.series[f"mode_{number}_voltage_V"])
        axes.plot(at, np.where(mean > 0, mean, np.nan), color=colour, ls=dashes, label=run.mode_name(number))
    axes.set_yscale("log")
    axes.set_ylim(LOG_FLOOR * highest, 6 * highest)
    axes.set_ylabel("vane voltage of the forward wave, V")
    time_axis(axes, run)
    end = max(run.summary["end_time_ns"], 1e-9)
    for k, event in enumerate(run.summary["mode_events"]):
        late = event["time_ns"] > 0.6 * end
        axes.axvline(event["time_ns"], color=METAL_EDGE, lw=1, ls=":")
        axes.text(event["time_ns"], 0.97 - 0.055 * (k % 4), f" {event_words(run, event)} ", va="top", fontsize=7.5,
                  ha="right" if late else "left", transform=axes.get_xaxis_transform(), color="#333a44")
    legend_below(axes, MOST_MODES)
    left_out = len(run.summary["modes"]) - len(_lines(run))
    return finish(figure, name, title, " ".join((
        f"Amplitude on the vanes of the wave that turns with the electrons, {bin_words(run)}, "
        "logarithmic scale; dotted verticals are mode events.",
        f"{left_out} weaker modes are left out." if left_out else "", shading_words(run, shaded))))


def spectrum(run):
    name, title = "spectrum", "Spectra"
    if not run.has_modes:
        return Picture(name, title, NO_MODES)
    frequency = run.spectra.get("frequency_GHz")
    lowest = min(mode["cold_frequency_GHz"] for mode in run.summary["modes"])
    if frequency is None or len(frequency) < 2 or frequency[1] > COARSEST * lowest:
        return Picture(name, title, "The averaged part is too short for a spectrum.")
    figure = plt.figure(figsize=(WIDTH, 5.4))
    grid = figure.add_gridspec(2, 2, height_ratios=[1.15, 1])
    _whole_spectrum(figure.add_subplot(grid[0, :]), run, frequency)
    zoomed = _zoom(figure.add_subplot(grid[1, 0]), run, frequency)
    _harmonics(figure.add_subplot(grid[1, 1]), run)
    return finish(figure, name, title, (
        "Top: amplitude spectra of the vane voltages over the averaged part (Hann window), logarithmic scale; dotted "
        f"verticals are the cold frequencies. Bottom left: the lines near {zoomed}, against the cold frequency "
        f"(dashed: the mean frequency); points stand {1e3 * frequency[1]:.3g} MHz apart, one over the length of the "
        "averaged part, so that nothing finer can be seen. Bottom right: azimuthal harmonics of the charge beyond "
        "mid-gap against the whole; the number of spokes stands out."))


def _amplitude(run, number):
    values = run.spectra[f"mode_{number}_V"]
    return np.where(values > 0, values, np.nan)


def _whole_spectrum(axes, run, frequency):
    cold = [mode["cold_frequency_GHz"] for mode in run.summary["modes"]]
    low, high = 0.85 * min(cold), min(1.15 * max(cold), frequency[-1])
    within = (frequency >= low) & (frequency <= high)
    top = 0.0
    for number, colour, dashes in _lines(run):
        values = _amplitude(run, number)[within]
        top = max(top, float(np.nanmax(np.append(values, 0.0))))
        axes.plot(frequency[within], values, color=colour, ls=dashes, lw=1.1, label=run.mode_name(number))
    for mode in strongest_modes(run):
        axes.axvline(mode["cold_frequency_GHz"], color=METAL_EDGE, ls=":", lw=1)
    axes.set_yscale("log")
    if top > 0:
        axes.set_ylim(1e-6 * top, 4 * top)
    axes.set(title="All modes", xlabel="frequency, GHz", ylabel="vane voltage, V", xlim=(low, high))
    axes.legend(loc="upper right", handlelength=3.2)


def _zoom(axes, run, frequency):
    """Around the dominant mode, or the strongest when none oscillates; returns its name."""
    number = run.summary["dominant_mode"] or max(
        run.summary["modes"], key=lambda mode: mode["energy_J"]["mean"] if mode["energy_J"] else 0.0)["mode"]
    cold = next(mode["cold_frequency_GHz"] for mode in run.summary["modes"] if mode["mode"] == number)
    name = f"Near {run.mode_name(number)}"
    around = np.abs(frequency - cold) <= ZOOM_BINS * frequency[1]
    for other, colour, dashes in _lines(run):
        axes.plot(1e3 * (frequency[around] - cold), _amplitude(run, other)[around], color=colour, ls=dashes, marker=".",
                  ms=3, lw=1)
    axes.axvline(0, color=METAL_EDGE, ls=":", lw=1)
    if run.summary["frequency_shift_MHz"] is not None:
        shift = run.mean("frequency_shift_MHz")
        axes.axvline(shift, color=RUST, ls=(0, (5, 2)), lw=1)
        name += f": shift {shift:+.2f} MHz"
    axes.set_yscale("log")
    axes.set(title=name, ylabel="vane voltage, V",
             xlabel=f"frequency above {cold:g} GHz, MHz")
    return run.mode_name(number)


def _harmonics(axes, run):
    harmonic, charge = run.spectra["azimuthal_harmonic"][1:], run.spectra["azimuthal_charge_C"]
    axes.set(title="Harmonics of the charge", xlabel="azimuthal harmonic m", ylabel="ratio to harmonic 0", ylim=(0, 1))
    if not (len(charge) > 1 and charge[0] > 0):
        axes.text(0.5, 0.5, "no charge beyond mid-gap", transform=axes.transAxes, ha="center")
        return
    share = charge[1:] / charge[0]
    chosen = harmonic == (run.summary["spoke_count"] or -1)
    axes.bar(harmonic, share, 0.7, color=np.where(chosen, NAVY, TEAL))
    axes.set_xticks(harmonic if len(harmonic) <= 12 else harmonic[1::2])
    axes.grid(axis="x", visible=False)


def thresholds(run):
    """The operating point and what it must pass, at the run's field; other fields would need another chart."""
    name, title = "thresholds", "Operating point beside Hull and Hartree voltages"
    rows = [(run.mode_name(mode["mode"]) + ", Hartree", mode["hartree_voltage_V"], RUST, "s")
            for mode in sorted(run.summary["modes"], key=lambda mode: -mode["mode"])]
    rows.append(("Hull cutoff", run.summary["hull_voltage_V"], TEAL, "D"))
    rows = [row for row in rows if row[1] is not None and row[1] > 0]
    voltage = run.mean("anode_voltage_V")
    if not rows or not np.isfinite(voltage):
        return Picture(name, title, "The tube has no magnetic field, or no voltage has been averaged yet.")
    factor, prefix = prefix_for(max([voltage] + [row[1] for row in rows]))
    figure, axes = plt.subplots(figsize=(WIDTH, 0.95 + 0.27 * len(rows)))
    most = 1.28 * max([voltage] + [row[1] for row in rows]) / factor
    axes.axvline(voltage / factor, color=NAVY, lw=1.6)
    axes.text(voltage / factor, len(rows) - 0.4, f"anode voltage {voltage / factor:.4g} {prefix}V", color=NAVY,
              fontsize=8, ha="center", va="bottom")
    for k, (_, value, colour, marker) in enumerate(reversed(rows)):
        axes.plot([value / factor], [k], marker=marker, color=colour, ms=6, ls="none")
        words = f"{value / factor:.4g} {prefix}V" + (f" ({100 * value / voltage:.0f} %)" if voltage > 0 else "")
        side = -1 if 0.5 * voltage < value < voltage else 1  # keeps clear of the line of the anode voltage
        axes.text(value / factor + side * 0.014 * most, k, words, va="center", ha="right" if side < 0 else "left",
                  fontsize=8)
    axes.set_yticks(range(len(rows)))
    axes.set_yticklabels([row[0] for row in reversed(rows)])
    axes.set(xlabel=f"voltage, {prefix}V", xlim=(0, most), ylim=(-0.6, len(rows) - 0.4))
    axes.grid(axis="y", visible=False)
    field = run.number("magnet", "field_T") * run.number("magnet", "field_scale", 1.0)
    where = f"At the run's field of {1e3 * field:.4g} mT" if np.isfinite(field) else "At the run's mean field"
    return finish(figure, name, title, (
        f"{where}. A mode can run when the anode voltage stands to the right of its Hartree voltage; to the right of "
        "Hull cutoff electrons reach the anode without oscillation. Percentages are of the anode voltage."))
