"""`plankform section`: what a section measures, against quadrature by scipy and areas by shapely."""

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.interpolate import CubicSpline
from scipy.optimize import brentq, minimize_scalar
from shapely import Polygon

from naca import Section

SECTIONS = [("0009", "published"), ("0012", "closed"), ("2412", "published"), ("4415", "published"), ("6409", "closed"),
            ("21012", "published"), ("23012", "published"), ("24015", "closed"), ("23112", "published"), ("25118", "closed"),
            ("0012-34", "published"), ("2412-64", "closed"), ("23015-95", "published"), ("0010-63", "closed")]


@pytest.fixture(scope="module", params=SECTIONS, ids=lambda p: "-".join(p))
def pair(request, run):
    digits, edge = request.param
    answer = run("section", f"NACA {digits}", "--trailing-edge", edge, "--points", 201, "--format", "json")
    return Section(digits, edge), answer


def test_points_satisfy_the_equations(pair):
    """A point lies on the section when its distance from the mean line is the half thickness there (Report 460)."""
    section, answer = pair
    points = np.array(answer["points"])
    assert len(points) == 201
    for x, y in points[np.hypot(*points.T) > 0]:
        foot = brentq(lambda s, x=x, y=y: (x - s) + (y - section.mean(s)) * section.slope(s),
                      max(x - 0.2, -0.01), x + 0.2, xtol=1e-16, rtol=1e-14)
        distance = np.hypot(x - foot, y - section.mean(foot))
        assert distance == pytest.approx(section.half_thickness(max(foot, 0.0)), abs=1e-9)


def test_points_run_from_the_upper_trailing_edge_round_the_nose(pair):
    section, answer = pair
    points = np.array(answer["points"])
    assert points[0] == pytest.approx(section.outline(-1.0), abs=1e-12)
    assert points[100] == pytest.approx([0, 0], abs=1e-12)
    assert points[-1] == pytest.approx(section.outline(1.0), abs=1e-12)


def test_area_and_centroid(pair):
    section, answer = pair
    # Thickness laid off equally on both sides of the mean line: the bend cancels, and the area is the integral of the
    # thickness along it. With x = r^2 the integrand is smooth at the nose.
    area = quad(lambda r: 2 * section.half_thickness(r * r) * np.hypot(1, section.slope(r * r)) * 2 * r, 0, 1,
                points=[np.sqrt(section.joint)] if section.joint < 1 else None, epsabs=1e-13)[0]
    assert answer["area"] == pytest.approx(area, abs=1e-9)
    polygon = Polygon(section.outline(np.linspace(-1, 1, 40001)))
    assert polygon.area == pytest.approx(area, abs=1e-8)
    assert answer["centroid"] == pytest.approx([polygon.centroid.x, polygon.centroid.y], abs=1e-7)


def test_second_moments_and_perimeter(pair):
    section, answer = pair
    # The polygon's own moments (Green's theorem side by side); 80001 points leave 1e-9 of them.
    x, y = section.outline(np.linspace(-1, 1, 80001)).T
    x1, y1 = np.roll(x, -1), np.roll(y, -1)
    cross = x * y1 - x1 * y
    polygon = Polygon(np.stack([x, y], axis=-1))
    cx, cy = polygon.centroid.x, polygon.centroid.y
    about_x = np.sum(cross * (y * y + y * y1 + y1 * y1)) / 12 - polygon.area * cy * cy
    about_y = np.sum(cross * (x * x + x * x1 + x1 * x1)) / 12 - polygon.area * cx * cx
    product = np.sum(cross * (x * y1 + 2 * x * y + 2 * x1 * y1 + x1 * y)) / 24 - polygon.area * cx * cy
    moments = answer["second_moments"]
    assert moments["about_x"] == pytest.approx(about_x, rel=1e-6)
    assert moments["about_y"] == pytest.approx(about_y, rel=1e-6)
    assert moments["product"] == pytest.approx(product, abs=1e-9)
    assert answer["perimeter"] == pytest.approx(polygon.exterior.length, rel=1e-7)


def test_a_spline_through_the_points_encloses_the_same(pair):
    """The printed points carry the shape: scipy's parametric cubic spline through 201 of them has our area and length."""
    _, answer = pair
    points = np.array(answer["points"])
    # Our points are crowded by a cosine, in which the nose is smooth.
    even = np.linspace(-np.pi / 2, np.pi / 2, len(points))
    spline = CubicSpline(even, points)
    fine = spline(np.linspace(even[0], even[-1], 40001))
    polygon = Polygon(fine)
    assert answer["area"] == pytest.approx(polygon.area, abs=3e-6)
    assert answer["perimeter"] == pytest.approx(polygon.exterior.length, abs=1e-5)


def test_sharpest_bulge_and_hollow(pair):
    section, answer = pair
    # Curvature of the outline from its mean line and thickness, by differences of the exact points.
    r = np.linspace(-1, 1, 200_001)[1:-1]
    r = r[np.abs(np.abs(r) - np.sqrt(section.joint)) > 1e-4]
    r = r[np.abs(np.abs(r) - np.sqrt(section.thickest)) > 1e-4]
    # At the nose the difference would straddle both surfaces, whose third derivatives differ.
    r = r[np.abs(r) > 1.2e-4]
    step = 1e-4 * (1 - np.abs(r)).clip(0.01, 1)
    before, here, after = (section.outline(r + k * step) for k in (-1, 0, 1))
    first, second = (after - before) / (2 * step[:, None]), (after - 2 * here + before) / step[:, None] ** 2
    curvature = (first[:, 0] * second[:, 1] - first[:, 1] * second[:, 0]) / np.hypot(*first.T) ** 3
    sharpest = 1 / curvature.max()
    if section.joint == 1.0:
        # A symmetric nose is its own nose circle: half the square of the coefficient of the root.
        sharpest = min(sharpest, (section.thickness * section.root_term) ** 2 / 2)
    assert answer["smallest_radius"] == pytest.approx(sharpest, rel=2e-5)
    hollow = answer["smallest_hollow_radius"]
    if hollow is None:
        assert curvature.min() > -1e-3
    elif hollow < 50:
        assert hollow == pytest.approx(-1 / curvature.min(), rel=2e-2)


def test_greatest_thickness_and_camber(pair):
    section, answer = pair
    thickest = minimize_scalar(lambda x: -section.half_thickness(x), bounds=(0.1, 0.6), method="bounded",
                               options={"xatol": 1e-10})
    assert answer["thickness"] == pytest.approx(-2 * thickest.fun, abs=1e-9)
    # A flat maximum is found to the square root of what its height is found to.
    assert answer["thickness_at"] == pytest.approx(thickest.x, abs=1e-6)
    if section.joint == 1.0:
        assert (answer["camber"], answer["camber_at"]) == (0, 0)
        return
    highest = minimize_scalar(lambda x: -section.mean(x), bounds=(0.01, 0.8), method="bounded", options={"xatol": 1e-10})
    assert answer["camber"] == pytest.approx(-highest.fun, abs=1e-9)
    assert answer["camber_at"] == pytest.approx(highest.x, abs=1e-6)


def test_nose_and_trailing_edge(pair):
    section, answer = pair
    # Report 460: the nose circle of the thickness form has the radius 1.1019 t^2. Report 492: a nose index I of 1 to 8 makes
    # it (I/6)^2 times that, 9 three times.
    index = int(section.name.partition("-")[2][:1] or 6)
    share = 3 if index == 9 else (index / 6) ** 2
    assert answer["nose_radius"] == pytest.approx(1.1019 * share * section.thickness**2, rel=1e-4)
    assert answer["trailing_edge_thickness"] == pytest.approx(2 * section.half_thickness(1.0), abs=1e-12)
    # The sides lean by the fall of the half thickness against the mean line, each foreshortened or stretched by its bend.
    secant = np.hypot(1, section.slope(1.0))
    fall = -section.half_thickness_slope(1.0) / secant
    bend = section.half_thickness(1.0) * section.bend(1.0) / secant**3
    angle = np.degrees(np.arctan2(fall, 1 - bend) + np.arctan2(fall, 1 + bend))
    assert answer["trailing_edge_angle_deg"] == pytest.approx(angle, abs=1e-6)


def test_a_chord_scales_all_lengths(run):
    unit = run("section", "NACA 23012", "--format", "json")
    scaled = run("section", "NACA 23012", "--chord", "120 mm", "--format", "json")
    assert scaled["unit"] == "mm"
    assert np.array(scaled["points"]) == pytest.approx(120 * np.array(unit["points"]), abs=1e-9)
    for length in ("thickness", "thickness_at", "camber", "camber_at", "nose_radius", "trailing_edge_thickness"):
        assert scaled[length] == pytest.approx(120 * unit[length], abs=1e-9), length
    assert scaled["area"] == pytest.approx(120**2 * unit["area"], abs=1e-7)
    assert scaled["trailing_edge_angle_deg"] == pytest.approx(unit["trailing_edge_angle_deg"], abs=1e-9)
