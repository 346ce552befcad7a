# SPDX-License-Identifier: MIT
"""Where the power of the supply, and of a generator, goes."""
import numpy as np

from .looks import METAL_EDGE, NAVY, OCHRE, PLUM, RUST, SLATE, TEAL, WIDTH, Picture, finish, plt, prefix_for


def parts_of_the_input(run):
    """(name, W, colour): load, loss and heat as in the summary, and what is left of the input."""
    parts = [("to the load", run.mean("load_power_W"), TEAL),
             ("loss in the resonators", run.mean("wall_loss_W"), OCHRE),
             ("anode heat", run.mean("anode_heat_W"), RUST),
             ("cathode heat", run.mean("cathode_heat_W"), PLUM)]
    if not run.has_modes:
        parts = parts[2:]
    return parts + [("open remainder", input_power(run) - sum(part[1] for part in parts), SLATE)]


def input_power(run):
    """Of the supply, and of the wave that a generator sends in, W."""
    return run.mean("input_power_W") + run.summary["drive_power_W"]


def power_budget(run):
    name, title = "power_budget", "Where the power goes"
    supply = input_power(run)
    driven = run.summary["drive_power_W"] > 0
    if not (np.isfinite(supply) and supply > 0):
        return Picture(name, title, "In the averaged part the supply gave no power on balance, so that it cannot be "
                                    "shared out.")
    parts = parts_of_the_input(run)
    factor, prefix = prefix_for(supply)
    figure, axes = plt.subplots(figsize=(WIDTH, 0.9 + 0.3 * (len(parts) + 1)))
    axes.barh(0, supply / factor, 0.62, color=NAVY)
    start, highest, lowest = 0.0, supply, 0.0
    rows = [("from supply and generator" if driven else "from the supply", supply, 0.0)]
    for k, (word, watts, colour) in enumerate(parts, 1):
        axes.barh(k, watts / factor, 0.62, left=start / factor, color=colour)
        axes.plot([start / factor] * 2, [k - 0.69, k + 0.31], color=METAL_EDGE, lw=0.7)
        rows.append((word, watts, start))
        start += watts
        highest, lowest = max(highest, start), min(lowest, start)
    span = (highest - lowest) / factor
    for k, (_, watts, left) in enumerate(rows):
        end = max(left, left + watts) / factor
        axes.text(end + 0.012 * span, k, f"{watts / factor:.3f} {prefix}W, {100 * watts / supply:.2f} %", va="center",
                  fontsize=8)
    axes.set_yticks(range(len(rows)))
    axes.set_yticklabels([row[0] for row in rows])
    axes.invert_yaxis()
    axes.set(xlabel=f"power, {prefix}W", xlim=(lowest / factor - 0.01 * span, highest / factor + 0.3 * span))
    axes.grid(axis="y", visible=False)
    return finish(figure, name, title, (
        "Means over the averaged part, one after the other: each bar starts where the one above ends, and all together "
        "make up the input. The open remainder is what is still being stored, less the electrons' energy at emission, "
        "and the error of the ledger; in a steady tube it is small."))
