# SPDX-License-Identifier: MIT
"""Pictures in space: the electrons between cathode and vanes."""
import numpy as np
from matplotlib.colors import LogNorm
from matplotlib.patches import Circle, Wedge
from matplotlib.ticker import MaxNLocator

from .looks import ELECTRONS, METAL, METAL_EDGE, WIDTH, Picture, finish, plt

REST_ENERGY_EV = 510998.95  # CODATA 2018
LIGHT_SPEED = 299792458.0   # m/s, exact
MOST_DOTS = 40000           # more would only darken the print
DECADES = 3                 # of density shown
VANE_DEPTH, BACK_WALL = 1.17, 1.24  # drawn, in anode radii: the model ends at the vane tips


def spokes(run):
    name, title = "spokes", "Electrons between cathode and anode"
    if not run.snapshots:
        return Picture(name, title, "run.h5 holds no snapshot.")
    last = run.snapshots[-1]
    figure, (left, right) = plt.subplots(1, 2, figsize=(WIDTH, 4.7))
    top_energy = _energy_scale([last])
    dots = _draw_electrons(left, last, top_energy)
    figure.colorbar(dots, ax=left, orientation="horizontal", label="kinetic energy, eV", shrink=0.85, pad=0.02)
    _draw_tube(left, run, numbers=True)
    left.set_title("Electrons")
    step = _draw_potential(right, run, last)
    map_ = _draw_density(right, run, last)
    if map_ is not None:
        figure.colorbar(map_, ax=right, orientation="horizontal", label="electron density, 1/m³", shrink=0.85,
                        pad=0.02)
    _draw_tube(right, run, numbers=True)
    right.set_title("Density and equipotentials")
    shown = min(len(last.radius), MOST_DOTS)
    caption = (f"At {last.time_ns:.2f} ns. Left: {shown} of {len(last.radius)} macro-electrons by their kinetic "
               f"energy. Right: electron density on a logarithmic scale over {DECADES} decades (white: below), with "
               f"equipotentials every {step:g} V. Electrons drift counter-clockwise (+theta) in a field towards the "
               f"reader. {_metal_words(run)}")
    return finish(figure, name, title, caption)


def earlier_snapshots(run):
    name, title = "earlier_snapshots", "Earlier snapshots"
    earlier = run.snapshots[:-1]
    if not earlier:
        return Picture(name, title, "The run kept one snapshot only (output.snapshot_times_ns asks for more).")
    figure, panels = plt.subplots(1, len(earlier), figsize=(WIDTH, 3.3 if len(earlier) > 2 else 4.6),
                                  squeeze=False)
    top_energy = _energy_scale(earlier)
    for axes, snapshot in zip(panels[0], earlier):
        dots = _draw_electrons(axes, snapshot, top_energy)
        _draw_tube(axes, run, numbers=False)
        axes.set_title(f"{snapshot.time_ns:.2f} ns")
    figure.colorbar(dots, ax=list(panels[0]), orientation="horizontal", label="kinetic energy, eV",
                    shrink=0.5, pad=0.02, aspect=40)
    picked = "" if run.snapshots_kept == len(run.snapshots) else \
        f" {len(run.snapshots)} of the {run.snapshots_kept} snapshots in run.h5 are drawn in this report."
    return finish(figure, name, title,
                  f"Macro-electrons, coloured by kinetic energy on one scale, on the way to the picture above.{picked}")


def _metal_words(run):
    if run.vane_count == 0:
        return "Grey: cathode and smooth anode bore."
    return ("Grey: cathode and vanes, with the vane numbers of the heat figure; slot i follows vane i "
            "counter-clockwise. The depth of the slots is not part of the model and not to scale.")


def _energy_scale(snapshots):
    """99.5th percentile: a few fast electrons must not make all others look alike."""
    energies = [_kinetic_energy_eV(s) for s in snapshots if len(s.radius)]
    return max([float(np.percentile(e, 99.5)) for e in energies] + [1.0])


def _kinetic_energy_eV(snapshot):
    u_squared = (snapshot.u_r**2 + snapshot.u_theta**2) / LIGHT_SPEED**2
    return REST_ENERGY_EV * u_squared / (1 + np.sqrt(1 + u_squared))  # (gamma - 1) m c^2 without cancellation


def _draw_electrons(axes, snapshot, top_energy):
    chosen = slice(None)
    if len(snapshot.radius) > MOST_DOTS:  # at random: a stride could follow the order of the store
        chosen = np.random.default_rng(1).choice(len(snapshot.radius), MOST_DOTS, replace=False)
    size = np.clip(0.8 * (25000 / max(len(snapshot.radius), 1))**0.5, 0.6, 3)  # points^2: ink as the count allows
    r, theta = snapshot.radius[chosen] * 1e3, snapshot.theta[chosen]
    return axes.scatter(r * np.cos(theta), r * np.sin(theta), c=_kinetic_energy_eV(snapshot)[chosen], s=size,
                        cmap=ELECTRONS, vmin=0, vmax=top_energy, linewidths=0)


def _draw_density(axes, run, snapshot):
    most = float(np.max(snapshot.density)) if snapshot.density.size else 0.0
    if not most > 0:
        return None
    r, theta = run.radii * 1e3, run.angles
    half = 0.5 * (theta[1] - theta[0])
    edge_r = np.concatenate([r[:1], 0.5 * (r[1:] + r[:-1]), r[-1:]])
    edge_theta = np.append(theta - half, theta[-1] + half)
    x, y = np.outer(edge_r, np.cos(edge_theta)), np.outer(edge_r, np.sin(edge_theta))
    floor = most / 10**DECADES
    shown = np.ma.masked_less(snapshot.density, floor)
    return axes.pcolormesh(x, y, shown, cmap=ELECTRONS + "_r", norm=LogNorm(floor, most))


def _draw_potential(axes, run, snapshot):
    """Equipotentials; returns their step in V, a round number."""
    top = float(np.max(np.abs(snapshot.potential))) or 1.0
    step = 10.0**np.floor(np.log10(top / 5))
    step *= next(factor for factor in (1, 2, 5, 10) if top / (step * factor) <= 10)
    closed = np.append(snapshot.potential, snapshot.potential[:, :1], axis=1)
    theta = np.append(run.angles, run.angles[0] + 2 * np.pi)
    r = run.radii * 1e3
    levels = step * np.arange(np.floor(np.min(closed) / step) + 1, np.ceil(np.max(closed) / step))
    if len(levels):
        axes.contour(np.outer(r, np.cos(theta)), np.outer(r, np.sin(theta)), closed, levels=levels,
                     colors=METAL_EDGE, linewidths=0.6, linestyles="solid", zorder=3)
    return step


def _draw_tube(axes, run, numbers):
    r_c, r_a, vanes = run.radii[0] * 1e3, run.radii[-1] * 1e3, run.vane_count
    outer = BACK_WALL * r_a
    axes.add_patch(Circle((0, 0), r_c, facecolor=METAL, edgecolor=METAL_EDGE, lw=0.7))
    axes.add_patch(Wedge((0, 0), outer, 0, 360, width=outer - (VANE_DEPTH if vanes else 1.0) * r_a, facecolor=METAL,
                         edgecolor="none"))
    half_vane = 180 / max(vanes, 1) * (1 - run.number("tube", "gap_share", 0.0))
    for vane in range(vanes):
        middle = 360 * vane / vanes
        axes.add_patch(Wedge((0, 0), VANE_DEPTH * r_a * 1.002, middle - half_vane, middle + half_vane,
                             width=(VANE_DEPTH - 1) * r_a, facecolor=METAL, edgecolor=METAL, lw=0.3))
        tip = np.radians(np.linspace(middle - half_vane, middle + half_vane, 9))
        axes.plot(r_a * np.cos(tip), r_a * np.sin(tip), color=METAL_EDGE, lw=0.9)
        if numbers and vanes <= 24:
            at = np.radians(middle)
            axes.text(1.12 * r_a * np.cos(at), 1.12 * r_a * np.sin(at), str(vane), ha="center", va="center", fontsize=7)
    if vanes == 0:
        axes.add_patch(Circle((0, 0), r_a, fill=False, edgecolor=METAL_EDGE, lw=0.9))
    if numbers:
        axes.text(0, 0, "cathode" if r_c > 0.28 * r_a else "", ha="center", va="center", fontsize=7)
    axes.set(aspect="equal", xlim=(-1.02 * outer, 1.02 * outer), ylim=(-1.02 * outer, 1.02 * outer), xlabel="x, mm")
    axes.set_ylabel("y, mm", labelpad=0)
    for axis in (axes.xaxis, axes.yaxis):
        axis.set_major_locator(MaxNLocator(6, steps=[1, 2, 5, 10]))
        axis.set_major_formatter("{x:g}")
    axes.grid(False)
