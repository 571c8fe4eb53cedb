"""Paper templates as SVG: true size, read by the XML parser of Python and by svgelements."""

import xml.etree.ElementTree as ElementTree

import numpy as np
import pytest
from svgelements import Path

import curves

SVG = "{http://www.w3.org/2000/svg}"
# Coordinates are written to 1e-4 mm, and points are compared at a finite spacing.
ROUNDING = 0.001


def paths_of(root, role):
    return [curves.along_path(Path(p.get("d"))) for p in root.iter(f"{SVG}path") if p.get("class") == role]


def test_one_user_unit_is_one_millimetre(pack):
    for path in pack.paths("svg"):
        root = ElementTree.parse(path).getroot()
        assert root.tag == f"{SVG}svg"
        left, top, width, height = map(float, root.get("viewBox").split())
        assert (left, top) == (0, 0), path.name
        assert root.get("width").endswith("mm") and root.get("height").endswith("mm"), path.name
        assert (float(root.get("width")[:-2]), float(root.get("height")[:-2])) == (width, height), path.name
        # No transform but the turn of a label may change the scale.
        assert all(e.get("transform", "rotate(").startswith("rotate(") for e in root.iter()), path.name


def test_check_lines_are_100_mm(pack):
    for path in pack.paths("svg"):
        lines = paths_of(ElementTree.parse(path).getroot(), "CHECK")
        spans = [np.abs(line[-1] - line[0]) for line in lines]
        for axis in (0, 1):
            long = [span[axis] for span in spans if span[axis] > 50]
            assert long == pytest.approx([100], abs=1e-4), f"{path.name}: {long}"


def test_station_outlines_follow_the_equations(pack, measured):
    for shape, [path] in pack.at_stations("svg"):
        root = ElementTree.parse(path).getroot()
        [outline] = paths_of(root, "CUT_OUTSIDE")
        chord_line = next(line for line in paths_of(root, "REFERENCE") if np.ptp(line[:, 1]) < 1e-9)
        # The chord line overruns the nose and the trailing edge by the same length; y runs downwards.
        nose = np.array([chord_line[:, 0].mean() - shape.chord / 2, chord_line[0, 1]])
        apart = curves.apart((outline - nose) * [1, -1], curves.closed(shape.ring))
        measured("SVG outline from the equations, mm", apart)
        assert apart <= pack.design.tolerance + ROUNDING, f"{path.name}: {apart:.4f} mm"


def test_all_of_the_drawing_lies_on_the_page(pack):
    for path in pack.paths("svg"):
        root = ElementTree.parse(path).getroot()
        size = np.array(root.get("viewBox").split()[2:], dtype=float)
        for role in ("CUT_OUTSIDE", "REFERENCE", "CHECK"):
            for line in paths_of(root, role):
                assert (line >= 0).all() and (line <= size).all(), f"{path.name}: {role}"
