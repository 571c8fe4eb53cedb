"""`plankform lift --inviscid` against exact theory, another panel method and its own pressures."""

import tomllib

import numpy as np
import pytest

import vortex_panels
from conftest import ROOT
from naca import Section

ANGLES = [-4, 0, 4, 8]
# What docs and methods promise at the panels of the default: 0.1 % of a lift coefficient of one.
PROMISE = 0.001


def lift_of(run, name, *arguments):
    arguments = ("--inviscid", "--trailing-edge", "closed", "--format", "json", *arguments)
    return run("lift", f"NACA {name}", *arguments)["curves"][0]["points"]


class Joukowski:
    """The symmetric section that z + 1/z makes of a circle through 1 with its centre on the axis.

    Its lift is 8 pi (R/c) sin(alpha) exactly. Source: L. M. Milne-Thomson, Theoretical Aerodynamics, 4th edition, 1958,
    chapter 7, from memory.
    """

    def __init__(self, centre=-0.1):
        self.centre, self.radius = centre, 1 - centre
        nose = centre - self.radius
        self.nose = nose + 1 / nose
        self.chord = 2 - self.nose

    def outline(self, r):
        circle = self.centre + self.radius * np.exp(1j * np.pi * (1 - np.abs(r)))
        z = circle + 1 / circle
        return np.stack([(z.real - self.nose) / self.chord, -np.sign(r) * z.imag / self.chord], axis=-1)

    def lift(self, degrees):
        return 8 * np.pi * self.radius / self.chord * np.sin(np.radians(degrees))


def test_the_other_method_meets_an_exact_section(measured):
    section = Joukowski()
    error = np.abs(vortex_panels.lift(section, ANGLES) - section.lift(ANGLES)).max()
    measured("lift of the other panels on an exact section, error", error)
    assert error < PROMISE


@pytest.mark.parametrize("name", ["0009", "0012", "2412", "4412", "23012", "23112"])
def test_lift_agrees_with_the_other_method(run, measured, name):
    points = lift_of(run, name, "--angles", "-4:8:4")
    assert [p["angle_deg"] for p in points] == ANGLES
    difference = np.abs([p["cl"] for p in points] - vortex_panels.lift(Section(name, "closed"), ANGLES)).max()
    measured("lift against the other panels, difference", difference)
    assert difference < PROMISE


@pytest.mark.parametrize("name", ["0012", "4412", "23012"])
def test_pressures_add_up_to_lift_and_moment(run, name):
    """Lift comes from the circulation; the pressures, added up by trapezoids here, must give it again.

    The trapezoids are good to a few thousandths at the 200 or so points of the outline."""
    for point in lift_of(run, name, "--angles", "0:8:4", "--pressure"):
        x, y, cp = np.array(point["pressure"]).T
        middle, dx, dy = (cp[1:] + cp[:-1]) / 2, np.diff(x), np.diff(y)
        alpha = np.radians(point["angle_deg"])
        lift = (middle * dx).sum() * np.cos(alpha) + (middle * dy).sum() * np.sin(alpha)
        arm_x, arm_y = (x[1:] + x[:-1]) / 2 - 0.25, (y[1:] + y[:-1]) / 2
        moment = -(middle * (arm_x * dx + arm_y * dy)).sum()
        assert lift == pytest.approx(point["cl"], abs=0.005)
        assert moment == pytest.approx(point["cm"], abs=0.005)
        assert point["cp_min"] == pytest.approx(cp.min(), abs=1e-9)


def theory():
    """Exact lifts of closed sections, computed for the reference; the file names its sources."""
    path = ROOT / "tests/reference/theory.toml"
    data = tomllib.loads(path.read_text(encoding="utf-8")) if path.is_file() else {}
    return data.get("inviscid_lift", {}).get("section", [])


@pytest.mark.parametrize("exact", theory(), ids=lambda section: section["name"])
def test_lift_agrees_with_the_reference(run, measured, exact):
    for angle, cl, cm in zip(exact["alpha"], exact["cl"], exact["cm_c4"], strict=True):
        [point] = lift_of(run, exact["name"], "--angles", str(angle))
        measured("lift against the exact one, difference", abs(point["cl"] - cl))
        assert (point["cl"], point["cm"]) == pytest.approx((cl, cm), abs=PROMISE)
