# SPDX-License-Identifier: MIT
"""How every figure looks, and what becomes of it: sizes for A4, one palette, PNG bytes with a title and a caption."""
import io
import logging
from dataclasses import dataclass

import matplotlib

matplotlib.use("Agg")
logging.getLogger("matplotlib").setLevel(logging.ERROR)  # no word about its font cache
import matplotlib.pyplot as plt  # noqa: E402
import numpy as np  # noqa: E402
from matplotlib.transforms import ScaledTranslation  # noqa: E402

WIDTH = 7.1  # inches: the text width of an A4 page with 15 mm margins, so that 9 pt is 9 pt on paper
DOTS_PER_INCH = 170

# Any two stand 19 or more apart in CIE L*a*b*, for normal sight and for red, green and blue blindness (by the matrices
# of G. M. Machado et al., IEEE Trans. Vis. Comput. Graph. 15, 1291 (2009)); each has 2.75:1 of contrast with the page.
# Lines have a dash pattern of their own besides.
NAVY, RUST, TEAL, OCHRE, PLUM, SLATE = "#1d2f5e", "#b4501e", "#36a394", "#c49012", "#8f3f9a", "#565f69"
METAL, METAL_EDGE, PAPER_SHADE = "#c9ced6", "#596270", "#e7ecf4"
ORDER = (NAVY, RUST, TEAL, OCHRE, PLUM, SLATE)
DASHES = ("-", (0, (6, 1.5)), (0, (1.5, 1.2)), (0, (6, 1.5, 1.5, 1.5)), (0, (3, 1)), (0, (9, 2)))
ELECTRONS = "cividis"  # Matplotlib's own, even in lightness

plt.rcParams.update({
    "font.family": "DejaVu Sans", "font.size": 8.5, "axes.titlesize": 9, "axes.labelsize": 8.5,
    "xtick.labelsize": 8, "ytick.labelsize": 8, "legend.fontsize": 8, "legend.frameon": False,
    "axes.spines.top": False, "axes.spines.right": False, "axes.linewidth": 0.7, "axes.edgecolor": "#333a44",
    "axes.grid": True, "grid.color": "#dfe3e8", "grid.linewidth": 0.6, "axes.axisbelow": True,
    "axes.titleweight": "bold", "axes.titlelocation": "left", "lines.linewidth": 1.4, "figure.dpi": DOTS_PER_INCH,
    "axes.formatter.useoffset": False, "figure.constrained_layout.use": True,
    "figure.constrained_layout.h_pad": 0.06,
})

BINS = 250  # points of a drawn line, about: more would not show on paper


@dataclass
class Picture:
    name: str      # of its file, without .png
    title: str
    caption: str   # what is seen; where png is None, why there is nothing to see
    png: bytes = None


def finish(figure, name, title, caption):
    buffer = io.BytesIO()
    figure.savefig(buffer, format="png", dpi=DOTS_PER_INCH)
    plt.close(figure)
    return Picture(name, title, caption, buffer.getvalue())


def bin_size(run):
    """Samples behind one point of a line over time. With an oscillation close to a whole number of its periods, so that
    the ripple of the radio frequency averages out instead of beating with the bins."""
    time = run.series["time_ns"]
    least = max(1, len(time) // BINS)
    if run.summary["frequency_GHz"] is None or least < 2:
        return least
    period = (len(time) - 1) / ((time[-1] - time[0]) * run.mean("frequency_GHz"))  # in samples
    first = int(np.ceil(least / period))
    counts = np.arange(first, first + 4) * period
    return int(round(counts[np.argmin(np.abs(counts - np.round(counts)) / counts)]))


def binned(run, values):
    """(time, mean, least, greatest) of stretches of bin_size samples; the last stretch takes what is left over."""
    size = bin_size(run)
    starts = np.arange(max(len(values) // size, 1)) * size
    counts = np.diff(np.append(starts, len(values)))
    mean, middle = (np.add.reduceat(column, starts) / counts for column in (values, run.series["time_ns"]))
    return middle, mean, np.minimum.reduceat(values, starts), np.maximum.reduceat(values, starts)


def bin_words(run):
    time = run.series["time_ns"]
    return f"means over {bin_size(run) * (time[-1] - time[0]) / (len(time) - 1):.2g} ns"


def shade_averaged(axes, run, label=True):
    """Marks the part behind the means; False when it is unknown."""
    part = run.averaged_part()
    if part is None:
        return False
    axes.axvspan(*part, color=PAPER_SHADE, zorder=0, lw=0)
    if label:
        word = "settled" if run.summary["status"] == "settled" else "averaged"
        axes.text(part[1], 1.0, word + " part ", transform=axes.get_xaxis_transform(), ha="right", va="bottom",
                  fontsize=7.5, color=METAL_EDGE)
    return True


def time_axis(axes, run, bottom=True):
    axes.set_xlim(0, max(run.summary["end_time_ns"], 1e-6))
    if bottom:
        axes.set_xlabel("tube time, ns")
    else:
        axes.tick_params(labelbottom=False)


def prefix_for(size):
    """(factor, prefix) that brings a number of this size between 1 and 10 000 or so."""
    for factor, prefix in ((1e6, "M"), (1e3, "k"), (1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p")):
        if size >= factor * 0.9995:
            return factor, prefix
    return 1.0, ""


def legend_below(axes, columns):
    """Under the label of the time axis, whatever the height of the panel."""
    drop = ScaledTranslation(0, -0.42, axes.figure.dpi_scale_trans)  # inches: tick labels and axis label
    axes.legend(loc="upper center", bbox_to_anchor=(0.5, 0), bbox_transform=axes.transAxes + drop, ncol=columns,
                handlelength=3.2, columnspacing=1.6, borderaxespad=0)


def shading_words(run, shaded):
    if shaded:
        return "Shaded: the part behind the means of the summary."
    if run.averaged_part() is None:
        return "The part behind the means is not marked: the files do not tell where it lies."
    return ""
