"""The beam of a part worked out again with SciPy from the pack's own table: moments from shear, deflection and twist from
moments and stiffness. The rules are Euler and Bernoulli's beam and Saint-Venant's torsion, as in any textbook."""

import csv

import numpy as np
import pytest
from scipy.integrate import solve_ivp
from scipy.interpolate import PchipInterpolator

from conftest import ROOT


def cases(folder):
    with open(folder / "tables/strength.csv", encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    names = dict.fromkeys(row["case"] for row in rows)
    columns = [key for key in rows[0] if key not in ("case", "fingerprint")]
    return {name: {k: np.array([float(r[k]) for r in rows if r["case"] == name]) for k in columns} for name in names}


@pytest.fixture(scope="module", params=["strut", "main-foil"])
def part(request, run, tmp_path_factory):
    folder = tmp_path_factory.mktemp("strength") / "pack"
    run("build", ROOT / f"demo-sections/{request.param}.toml", "--out", folder, "--only", "tables")
    return cases(folder)


def integrated(at, slope, start=0.0):
    """The integral from the first place on of a quantity known at places."""
    f = PchipInterpolator(at, slope)
    return np.array([start + f.integrate(at[0], x) for x in at])


def in_one_place(shear):
    """Whether a load acts in one place: the shear jumps, and between such places the moment is straight."""
    return np.abs(np.diff(shear)).max() > 0.2 * max(np.abs(shear).max(), 1e-9)


def test_every_case_is_there(part):
    assert len(part) >= 4
    for table in part.values():
        assert (np.diff(table["station_mm"]) > 0).all() and (table["load_factor"] >= 1).all()


def test_moments_are_the_integral_of_the_shear(part, measured):
    for name, t in part.items():
        for way in ("across", "along"):
            moment, shear = t[f"moment_{way}_Nmm"], t[f"shear_{way}_N"]
            # A load in one place jumps at its own station, from which shear counts outwards.
            at = t["station_mm"]
            step = np.diff(at)
            # Between stations the shear is at most linear where no load in one place lies: trapezoids, and the load that
            # stands at the outer end is in the shear of both.
            found = np.concatenate([np.cumsum((0.5 * (shear[1:] + shear[:-1]) * step)[::-1])[::-1], [0.0]])
            scale = max(np.abs(moment).max(), 1.0)
            if not in_one_place(shear):
                off = np.abs(found - moment).max() / scale
                measured("moment from shear, off by", off)
                assert off < 3e-3, (name, way)


def test_deflection_and_twist_follow_from_moments(part, measured):
    for name, t in part.items():
        at = t["station_mm"]
        for way in ("across", "along"):
            smooth = PchipInterpolator(at, t[f"moment_{way}_Nmm"])
            straight = in_one_place(t[f"shear_{way}_N"])

            def bend(x, y):
                moment = np.interp(x, at, t[f"moment_{way}_Nmm"]) if straight else smooth(x)
                return [y[1], moment / np.interp(x, at, t[f"EI_{way}_Nmm2"])]

            solved = solve_ivp(bend, (at[0], at[-1]), [0.0, 0.0], t_eval=at,
                               rtol=1e-8, atol=1e-10, max_step=2.0)
            found, given = solved.y[0], t[f"deflection_{way}_mm"]
            off = np.abs(found - given).max() / max(np.abs(given).max(), 1e-2)
            measured("deflection, off by", off)
            assert off < 5e-3, (name, way)
        rate = t["torque_Nmm"] / t["GJ_Nmm2"]
        if in_one_place(t["shear_across_N"]):
            # Straight between stations, and beyond the load what the outer one says.
            inner = rate[:-1].copy()
            drop = np.abs(np.diff(rate)).argmax()
            inner[drop] = rate[drop + 1]
            twist = np.degrees(np.concatenate([[0.0], np.cumsum(0.5 * (inner + rate[1:]) * np.diff(at))]))
        else:
            twist = np.degrees(integrated(at, rate))
        off = np.abs(twist - t["twist_deg"]).max() / max(np.abs(t["twist_deg"]).max(), 1e-2)
        measured("twist, off by", off)
        assert off < 1e-2, name


def test_the_foil_carries_half_of_its_load_beyond_its_fitting(run, tmp_path):
    """165 kg, of which each half carries half, times the load factor; the fitting takes what lies on its 40 mm."""
    run("build", ROOT / "demo-sections/main-foil.toml", "--out", tmp_path / "pack", "--only", "tables")
    for name, t in cases(tmp_path / "pack").items():
        if name.startswith("flight"):
            half = 0.5 * 165 * 9.80665 * t["load_factor"][0]
            assert 0.85 * half < t["shear_across_N"][0] < half, name
