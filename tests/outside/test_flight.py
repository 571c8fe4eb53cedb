"""The foil under its boat worked out again: statics by a linear solve, sums along the span, cavitation and speeds by SciPy."""

import csv
import math
import tomllib

import numpy as np
import pytest
from scipy.integrate import simpson
from scipy.optimize import brentq

from conftest import ROOT
from design_file import quantity

DEMO = ROOT / "demo-sections/main-foil.toml"
GRAVITY = 9.80665
KNOT = 1852 / 3600


def table(folder, name):
    with open(folder / "tables" / name, encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


@pytest.fixture(scope="module", params=["main-foil", "elevator"])
def flown(request, run, tmp_path_factory):
    folder = tmp_path_factory.mktemp("flight") / "pack"
    run("build", ROOT / f"demo-sections/{request.param}.toml", "--out", folder, "--only", "tables")
    return request.param, table(folder, "flight.csv"), table(folder, "span-load.csv")


def mass(text):
    return float(text.split()[0])


def test_both_foils_balance_the_boat(flown, measured):
    """Forces up and moments about the bow: two equations for two foils, the foils' own moments among them."""
    name, flights, _ = flown
    data = tomllib.loads(DEMO.read_text(encoding="utf-8"))
    boat = data["boat"]
    places = np.array([quantity(boat["foil-at"]), quantity(boat["other-at"])]) * 1e-3
    weights = np.array([[mass(w["mass"]) * GRAVITY, quantity(w["aft"]) * 1e-3] for w in data["weight"]])
    drive = float(boat["drive"].split()[0]) * quantity(boat["effort-height"]) * 1e-3
    upright = math.cos(quantity(boat["heel"]))
    for row in flights:
        # Those of the foils flat under the boat, by incidence, of which the table holds the flapped one: they differ by a few N m.
        own = float(row["pitching_moment_Nm"]) + float(row["other_pitching_moment_Nm"])
        # Nose up about the bow: lift at x aft gives -x L, a weight + x W, the drive - T h.
        right = [weights[:, 0].sum(), (weights[:, 0] * weights[:, 1]).sum() - drive + own]
        main, other = np.linalg.solve([[1, 1], places], right) / upright
        found = np.array([float(row["load_N"]), float(row["other_load_N"])])
        found = found if name == "main-foil" else found[::-1]
        off = np.abs(found - [main, other]).max()
        measured("share of a foil, off by N", off)
        assert found.sum() == pytest.approx(weights[:, 0].sum() / upright, abs=0.01)
        # A flap at 10 degrees shifts the moment of the demo's foil by some tens of N m over 2.75 m.
        assert off < 25


def test_the_lift_along_the_span_adds_up(flown, measured):
    name, flights, span = flown
    for row in flights:
        strips = np.array([[float(s[k]) for k in ("from_root_mm", "width_mm", "lift_N_per_mm")] for s in span if s["speed"] == row["speed"]])
        total = 2 * (strips[:, 1] * strips[:, 2]).sum()
        assert total == pytest.approx(float(row["lift_N"]), rel=1e-4)
        assert float(row["lift_N"]) == pytest.approx(float(row["load_N"]), rel=1e-5), "it carries its load"
        # Glauert's angle makes the load smooth at the tip.
        half = strips[:, 1].sum()
        theta = np.arccos(np.clip(strips[:, 0] / half, -1, 1))[::-1]
        smooth = 2 * simpson((strips[:, 2] * np.sqrt(1 - (strips[:, 0] / half) ** 2))[::-1] * half, x=theta)
        measured("lift by Simpson's rule less the sum, %", 100 * (smooth / total - 1))
        assert smooth == pytest.approx(total, rel=0.02)


def test_induced_drag_is_the_lift_turned_by_the_wake(flown):
    _, flights, span = flown
    for row in flights:
        strips = np.array([[float(s[k]) for k in ("width_mm", "lift_N_per_mm", "downwash_deg")] for s in span if s["speed"] == row["speed"]])
        drag = 2 * (strips[:, 0] * strips[:, 1] * np.radians(strips[:, 2])).sum()
        assert drag == pytest.approx(float(row["induced_drag_N"]), rel=2e-3)


def test_the_least_speed_is_where_greatest_lift_meets_the_load(run):
    """Lift at given coefficients goes with the square of the speed: the check's value at the named speed gives the least speed."""
    answer = run_checks(run)
    carries = next(c for c in answer["checks"] if c["name"] == "the foil carries its load at take-off")
    least = brentq(lambda v: carries["value"] * (v / (10.5 * KNOT)) ** 2 - carries["limit"], 1, 30)
    said = float(carries["why"].split("carried from ")[1].split()[0])
    assert least == pytest.approx(said, abs=0.006)


def run_checks(run):
    return run("check", DEMO, "--format", "json")
