# SPDX-License-Identifier: MIT
"""Where the electrons land, and how hard: heat by place, energies of impact."""
import numpy as np

from .looks import NAVY, OCHRE, RUST, TEAL, WIDTH, Picture, finish, plt


def landing(run):
    name, title = "landing", "Where the electrons land, and how hard"
    if not run.anode.energy_J.sum() > 0 and not run.cathode.energy_J.sum() > 0:
        return Picture(name, title, "No electron has struck a wall in this run.")
    figure, panels = plt.subplots(2, 2, figsize=(WIDTH, 5.2))
    _heat_by_sector(panels[0][0], run)
    _heat_by_angle(panels[0][1], run.cathode, "Cathode heat by angle", RUST)
    _impact_energies(panels[1][0], run.anode, "Anode: energy of impact", NAVY)
    _impact_energies(panels[1][1], run.cathode, "Cathode: energy of impact", RUST)
    return finish(figure, name, title, " ".join((
        "Top: share of the electrode's heat by place, since the start of the run; dotted: an even spread over the "
        "circumference (blue for a vane, red for a slot).",
        "Bottom: electrons by their kinetic energy at impact, logarithmic scale; the last bin holds all above it.",
        _fastest_words(run), _slot_words(run))).strip())


def _slot_words(run):
    total = run.anode.energy_J.sum()
    if run.vane_count == 0 or not total > 0:
        return ""
    vanes = run.anode.energy_J[0::2]
    hottest = int(np.argmax(vanes))
    return (f"Hottest vane: {hottest}, with {100 * vanes[hottest] / total:.1f} % of the anode's heat; what falls into "
            f"the slots: {100 * run.anode.energy_J[1::2].sum() / total:.1f} %.")


def _fastest_words(run):
    filled = np.flatnonzero(run.anode.bin_hits)
    if len(filled) == 0:
        return "No electron has struck the anode."
    if filled[-1] == len(run.anode.bin_hits) - 1:
        return f"Some electrons strike the anode with more than {run.anode.bin_edges_eV[-2] / 1e3:.2f} keV."
    return (f"No electron strikes the anode with more than {run.anode.bin_edges_eV[filled[-1] + 1] / 1e3:.2f} keV; "
            "X-rays reach up to the energy of impact.")


def _heat_by_sector(axes, run):
    total, vanes = run.anode.energy_J.sum(), run.vane_count
    if not total > 0 or vanes == 0:
        _heat_by_angle(axes, run.anode, "Anode heat by angle", NAVY)
        return
    share = 100 * run.anode.energy_J / total
    index = np.arange(vanes)
    axes.bar(index, share[0::2], 0.42, color=NAVY, label="vane tip")
    axes.bar(index + 0.5, share[1::2], 0.42, color=OCHRE, hatch="////", edgecolor="white", lw=0,
             label="slot after it")
    gap_share = run.number("tube", "gap_share", 0.0)
    for even, colour in ((1 - gap_share, NAVY), (gap_share, RUST)):
        axes.axhline(100 * even / vanes, color=colour, ls=":", lw=1.2)
    every = 1 if vanes <= 12 else 2 if vanes <= 24 else 5
    axes.set_xticks(index[::every])
    axes.set(title="Anode heat by vane and slot", xlabel="vane number", ylabel="share of the heat, %",
             ylim=(0, 1.25 * max(share.max(), 100 / vanes * max(gap_share, 1 - gap_share))))
    axes.legend(loc="upper center", ncol=2)
    axes.grid(axis="x", visible=False)


def _heat_by_angle(axes, wall, title, colour):
    total = wall.energy_J.sum()
    axes.set(title=title, xlabel="angle theta, degrees", ylabel="share of the heat per degree, %", xlim=(0, 360))
    axes.set_xticks(range(0, 361, 60))
    if not total > 0:
        axes.text(0.5, 0.5, "no hits", transform=axes.transAxes, ha="center")
        return
    count = len(wall.energy_J)
    edges = np.linspace(0, 360, count + 1)
    axes.stairs(100 * wall.energy_J / total * count / 360, edges, baseline=None, color=colour, lw=1.0)
    axes.axhline(100 / 360, color=TEAL, ls=":", lw=1.2)
    axes.set_ylim(bottom=0)


def _impact_energies(axes, wall, title, colour):
    axes.set(title=title, ylabel="share of hits in a bin, %")
    filled = np.flatnonzero(wall.bin_hits)
    if len(filled) == 0:
        axes.set_xlabel("kinetic energy at impact, eV")
        axes.text(0.5, 0.5, "no hits", transform=axes.transAxes, ha="center")
        return
    share = 100 * wall.bin_hits / wall.bin_hits.sum()
    highest = wall.bin_edges_eV[min(filled[-1] + 3, len(wall.bin_edges_eV) - 1)]
    factor, unit = (1e3, "keV") if highest > 5e3 else (1, "eV")
    axes.set_xlabel(f"kinetic energy at impact, {unit}")
    axes.stairs(share, wall.bin_edges_eV / factor, fill=True, color=colour, baseline=1e-9)
    axes.set_yscale("log")
    axes.set_ylim(0.5 * share[filled].min(), 2 * share.max())
    axes.set_xlim(0, highest / factor)
