"""The yardsticks themselves: each must see an error a little larger than what the checks allow, or they prove nothing."""

import numpy as np
import pytest
from ezdxf.entities import LWPolyline
from svgelements import Path

import curves
from naca import Section

CIRCLE = np.stack([np.cos(np.linspace(0, 2 * np.pi, 20001)), np.sin(np.linspace(0, 2 * np.pi, 20001))], axis=-1) * 50


@pytest.mark.parametrize("error", [0.012, 0.05])
def test_a_shift_and_a_missing_piece_are_seen(error):
    assert curves.apart(CIRCLE + [error, 0], CIRCLE) == pytest.approx(error, abs=2e-4)
    assert curves.apart(CIRCLE * (1 + error / 50), CIRCLE) == pytest.approx(error, abs=2e-4)
    assert curves.apart(CIRCLE[:19000], CIRCLE) > 1


def test_arcs_of_both_formats_lie_on_their_circle():
    # A bulge is the tangent of a quarter of the arc's angle (DXF reference, group code 42): 1 for half a circle.
    polyline = LWPolyline.new()
    polyline.set_points([(-50, 0, 1), (50, 0, 1)], format="xyb")
    polyline.closed = True
    assert curves.apart(curves.along_polyline(polyline), CIRCLE) < 1e-4
    half_turns = Path("M-50 0A50 50 0 0 0 50 0A50 50 0 0 0 -50 0Z")
    assert curves.apart(curves.along_path(half_turns), CIRCLE) < 1e-4


def test_sections_agree_with_printed_ordinates():
    # I. H. Abbott, A. E. von Doenhoff and L. S. Stivers, NACA Report 824, 1945, ordinates of NACA 0012 (printed to
    # 0.001 % of chord) and NACA 23012 (to 0.01 %), from memory. The hand computation of the cambered tables strays by up
    # to 0.02 % below the nose, so the upper surface is taken, to one unit of the last digit.
    assert 100 * Section("0012").half_thickness(np.array([0.0125, 0.3, 0.6, 1.0])) == pytest.approx(
        [1.894, 6.002, 4.563, 0.126], abs=0.0006)
    upper = Section("23012").outline(-np.sqrt(np.linspace(0, 1, 20001)))
    ordinates = 100 * np.interp([0.05, 0.15, 0.3, 0.6], upper[:, 0], upper[:, 1])
    assert ordinates == pytest.approx([4.91, 7.19, 7.55, 5.47], abs=0.015)
