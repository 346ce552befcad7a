# SPDX-License-Identifier: MIT
"""A run in, report.html and figures out. Everything is made in memory before the first file is written."""
import base64
import os

import jinja2

from . import budget_pictures, landing_pictures, mode_pictures, space_pictures, tables, time_pictures
from .whole_file import make_folder, remove_stale, write_whole_file

PICTURES = (space_pictures.spokes, space_pictures.earlier_snapshots, time_pictures.voltage_and_currents,
            time_pictures.powers, mode_pictures.mode_voltages, budget_pictures.power_budget, mode_pictures.spectrum,
            landing_pictures.landing, mode_pictures.thresholds)


def write_report(run, folder):
    """Returns the path of report.html, which is written last. Raises ReportError."""
    pictures = [draw(run) for draw in PICTURES]
    page = _render(run, pictures)
    figures = os.path.join(folder, "figures")
    make_folder(figures)
    for picture in pictures:
        path = os.path.join(figures, f"{picture.name}.png")
        if picture.png is None:
            remove_stale(path)
        else:
            write_whole_file(path, picture.png)
    target = os.path.join(folder, "report.html")
    write_whole_file(target, page.encode("utf-8"))
    return target


def _render(run, pictures):
    environment = jinja2.Environment(
        loader=jinja2.FileSystemLoader(os.path.dirname(os.path.abspath(__file__))), autoescape=True,
        undefined=jinja2.StrictUndefined, trim_blocks=True, lstrip_blocks=True)
    environment.filters["data_uri"] = lambda png: "data:image/png;base64," + base64.b64encode(png).decode("ascii")
    return environment.get_template("page.html.jinja").render(
        run=run, summary=run.summary, status=tables.status_words(run), finished=tables.finished(run),
        drawn=[picture for picture in pictures if picture.png is not None],
        missing=[picture for picture in pictures if picture.png is None],
        quantities=tables.quantities(run), modes=tables.modes(run), events=tables.events(run),
        ledger=tables.ledger(run), provenance=tables.provenance(run))
