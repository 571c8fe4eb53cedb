"""The tables of the pack: offsets against the equations, pressures against the lift they add up to."""

import csv

import numpy as np
import pytest

# Printed to 0.001 mm: half a unit, and the interpolation between closely spaced exact points.
HALF_UNIT = 0.0006


def rows(pack, name):
    with open(pack.folder / "tables" / name, newline="", encoding="utf-8") as file:
        return list(csv.DictReader(file))


def test_offsets_lie_on_the_section(pack):
    table = rows(pack, "offsets.csv")
    for shape in pack.design.shapes:
        mine = [row for row in table if float(row["station_mm"]) == pytest.approx(shape.at, abs=1e-3)]
        assert len(mine) >= 15, f"station {shape.at}"
        upper, lower = shape.outline[:10001][::-1], shape.outline[10000:]
        for row in mine:
            x = float(row["percent_of_chord"]) / 100 * shape.chord
            assert float(row["x_mm"]) == pytest.approx(x, abs=HALF_UNIT)
            # At the nose the table gives the nose itself, though a cambered nose hangs over it by a hair; and behind the
            # end of a surface that leans forward the end of that surface.
            for side, heights in (("upper_mm", upper), ("lower_mm", lower)):
                exact = 0.0 if x == 0 else np.interp(x, heights[100:, 0], heights[100:, 1])
                assert float(row[side]) == pytest.approx(exact, abs=HALF_UNIT), f"station {shape.at}, {row}"


def test_offsets_run_to_the_trailing_edge_at_every_station(pack):
    table = rows(pack, "offsets.csv")
    for shape in pack.design.shapes:
        percent = [float(r["percent_of_chord"]) for r in table if abs(float(r["station_mm"]) - shape.at) < 1e-3]
        assert percent == sorted(set(percent)) and (percent[0], percent[-1]) == (0, 100)


def test_stations_lie_where_the_loft_puts_them(pack):
    """Where the nose of each station goes, and how it is turned: what a builder sets the twist by."""
    table = rows(pack, "stations.csv")
    shapes = pack.design.shapes
    assert len(table) == len(shapes)
    root = shapes[0]
    for row, shape in zip(table, shapes):
        along = shape.tail - shape.nose
        expected = {
            "station_mm": shape.at,
            "chord_mm": shape.chord,
            "nose_aft_mm": shape.nose[0] - root.nose[0],
            "nose_above_mm": shape.nose[1] - root.nose[1],
            "nose_overhang_mm": -min(0.0, shape.outline[:, 0].min()),
        }
        for key, value in expected.items():
            assert float(row[key]) == pytest.approx(value, abs=2 * HALF_UNIT), f"{key} at {shape.at}"
        assert float(row["twist_deg"]) == pytest.approx(-np.degrees(np.arctan2(along[1], along[0])), abs=1e-4)


def test_every_row_carries_the_fingerprint(pack):
    for name in ("stations.csv", "offsets.csv", "lift.csv", "pressure.csv"):
        assert {row["fingerprint"] for row in rows(pack, name)} == {pack.fingerprint}, name


def test_lift_curves_cover_every_section(pack):
    table = rows(pack, "lift.csv")
    names = {station.section.name for station in pack.design.stations}
    assert {row["section"] for row in table} == names
    for name in names:
        cl = [float(row["cl"]) for row in table if row["section"] == name]
        # Without friction lift rises all the way, by 0.10 to 0.13 a degree for thicknesses up to a quarter.
        angle = [float(row["angle_deg"]) for row in table if row["section"] == name]
        assert ((np.diff(cl) / np.diff(angle) > 0.10) & (np.diff(cl) / np.diff(angle) < 0.13)).all(), name


def test_pressures_add_up_to_the_design_lift(pack, measured):
    """Lift from the circulation and lift from the pressure are computed apart; the pressure over the outline is added up
    here by trapezoids, which at these distances is good to a few thousandths."""
    lift, pressure = rows(pack, "lift.csv"), rows(pack, "pressure.csv")
    for name in {row["section"] for row in pressure}:
        curve = np.array([[float(r["cl"]), float(r["angle_deg"])] for r in lift if r["section"] == name])
        alpha = np.radians(np.interp(pack.design.design_lift, *curve.T))
        x, y, cp = np.array([[float(r[k]) for k in ("x_over_chord", "y_over_chord", "cp")] for r in pressure if r["section"] == name]).T
        middle = (cp[1:] + cp[:-1]) / 2
        # From the upper trailing edge over the nose to the lower one: force on the surface from outside.
        across, along = (middle * np.diff(x)).sum(), -(middle * np.diff(y)).sum()
        found = across * np.cos(alpha) - along * np.sin(alpha)
        measured("lift from pressures less the design lift", found - pack.design.design_lift)
        assert found == pytest.approx(pack.design.design_lift, abs=0.01), name
        assert cp.max() <= 1 + 1e-9, "more than the pressure of a stagnation point"
