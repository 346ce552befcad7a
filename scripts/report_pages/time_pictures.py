# SPDX-License-Identifier: MIT
"""Pictures over time: anode voltage and currents, powers."""
import numpy as np

from .looks import (DASHES, NAVY, OCHRE, ORDER, RUST, TEAL, WIDTH, Picture, bin_words, binned, finish, legend_below,
                    plt, prefix_for, shade_averaged, shading_words, time_axis)

CURRENTS = (("anode_current_A", "anode", NAVY, DASHES[0]),
            ("emitted_current_A", "emitted by the cathode", TEAL, DASHES[1]),
            ("cathode_return_current_A", "returned to the cathode", OCHRE, DASHES[2]))
POWERS = (("input_power_W", "from the supply"), ("mode_power_W", "electrons to resonators"),
          ("load_power_W", "to the load"), ("wall_loss_W", "loss in the resonators"), ("anode_heat_W", "anode heat"),
          ("cathode_heat_W", "cathode heat"))
POWERS_WITHOUT_MODES = ("input_power_W", "anode_heat_W", "cathode_heat_W")
TOO_SHORT = "The run is too short for a line over time."


def voltage_and_currents(run):
    name, title = "voltage_and_currents", "Anode voltage and currents"
    time = run.series["time_ns"]
    if len(time) < 2:
        return Picture(name, title, TOO_SHORT)
    figure, (top, bottom) = plt.subplots(2, 1, figsize=(WIDTH, 4.6), gridspec_kw={"height_ratios": [1, 1.5]})
    shaded = shade_averaged(top, run)
    shade_averaged(bottom, run, label=False)
    _draw_voltage(top, run)
    time_axis(top, run, bottom=False)
    lines = []
    for column, word, colour, dashes in CURRENTS:
        at, mean, low, high = binned(run, run.series[column])
        if column == "anode_current_A" and len(at) < len(time):
            bottom.fill_between(at, low, high, color=colour, alpha=0.18, lw=0, label="anode, least to greatest")
            lines += [low, high]
        bottom.plot(at, mean, color=colour, ls=dashes, label=word)
        lines.append(mean)
    bottom.set_ylabel("current, A")
    clipped = _scale_to_later_part(bottom, lines)
    time_axis(bottom, run)
    legend_below(bottom, 4)
    return finish(figure, name, title, " ".join((
        f"Lines: {bin_words(run)}.",
        "Band: least and greatest sample of the anode current, which ripples at the radio frequency."
        if len(lines) > 3 else "",
        _threshold_words(run), _clip_words(clipped), shading_words(run, shaded))))


def _draw_voltage(axes, run):
    volts = run.series["anode_voltage_V"]
    highest = max(float(np.nanmax(volts)), 1e-9)
    axes.plot(*binned(run, volts)[:2], color=NAVY)
    limit = 1.15 * highest
    for value, word in _thresholds(run):
        limit = max(limit, 1.1 * value)
        axes.axhline(value, color=RUST, ls=(0, (5, 2)), lw=1)
        axes.text(0.995, value, word, ha="right", va="bottom" if value > highest else "top", fontsize=7.5, color=RUST,
                  transform=axes.get_yaxis_transform())
    axes.set(ylabel="anode voltage, V", ylim=(min(0.0, float(np.nanmin(volts))), limit))


def _thresholds(run):
    """Hull and Hartree voltages near enough to the voltage to be drawn beside it."""
    lines = [(run.summary["hull_voltage_V"], "Hull cutoff")]
    lines += [(mode["hartree_voltage_V"], f"Hartree, {run.mode_name(mode['mode'])}") for mode in run.summary["modes"]]
    highest = float(np.nanmax(run.series["anode_voltage_V"]))
    return [(value, word) for value, word in lines if value is not None and 0 < value < 1.3 * highest]


def _threshold_words(run):
    return "Dashed red: thresholds near the anode voltage." if _thresholds(run) else ""


def _scale_to_later_part(axes, lines):
    """A spike at switch-on must not flatten the rest: the scale follows the second half, with room to spare.
    Returns whether something is cut off."""
    later = np.concatenate([line[len(line) // 2:] for line in lines])
    whole = np.concatenate(lines)
    if not np.isfinite(whole).all():
        return False
    low, high = min(later.min(), 0.0), max(later.max(), 0.0)
    room = 0.5 * (high - low)
    bottom, top = max(low - room, min(whole.min(), 0.0)), min(high + room, max(whole.max(), 0.0))
    if not top > bottom:
        return False
    margin = 0.05 * (top - bottom)
    axes.set_ylim(bottom - margin, top + margin)
    return whole.min() < bottom - margin or whole.max() > top + margin


def _clip_words(clipped):
    return "The scale follows the later part; the switch-on goes beyond it." if clipped else ""


def powers(run):
    name, title = "powers", "Powers"
    time = run.series["time_ns"]
    if len(time) < 2:
        return Picture(name, title, TOO_SHORT)
    drawn = [(column, word, colour, dashes) for (column, word), colour, dashes in zip(POWERS, ORDER, DASHES)
             if run.has_modes or column in POWERS_WITHOUT_MODES]
    lines = [binned(run, run.series[column])[1] for column, *_ in drawn]
    factor, prefix = prefix_for(max(np.abs(line[len(line) // 2:]).max() for line in lines))
    figure, axes = plt.subplots(figsize=(WIDTH, 3.6))
    shaded = shade_averaged(axes, run)
    at = binned(run, time)[0]
    for line, (_, word, colour, dashes) in zip(lines, drawn):
        axes.plot(at, line / factor, color=colour, ls=dashes, label=word)
    clipped = _scale_to_later_part(axes, [line / factor for line in lines])
    axes.set_ylabel(f"power, {prefix}W")
    time_axis(axes, run)
    legend_below(axes, 3)
    return finish(figure, name, title, " ".join((
        f"{bin_words(run).capitalize()}. While space charge and resonators fill, more goes in than comes out.",
        _clip_words(clipped), shading_words(run, shaded))))
