"""Contours as areas, by shapely."""

import ezdxf
import shapely
from shapely import LinearRing, Polygon

import curves


def contour(path) -> Polygon:
    [entity] = ezdxf.readfile(path).modelspace().query("*[layer=='CUT_OUTSIDE']")
    return Polygon(curves.along_polyline(entity))


def test_contours_are_valid_and_simple(pack):
    for path in pack.paths("dxf"):
        polygon = contour(path)
        assert polygon.is_valid, f"{path.name}: {shapely.is_valid_reason(polygon)}"
        assert polygon.exterior.is_simple, path.name


def test_contours_run_anticlockwise(pack):
    for path in pack.paths("dxf"):
        assert LinearRing(contour(path).exterior).is_ccw, path.name


def test_area_of_stations(pack, measured):
    """An outline within the tolerance all round cannot differ by more than its perimeter times the tolerance."""
    for shape, paths in pack.at_stations("dxf"):
        exact, drawn = Polygon(shape.ring), contour(paths[0])
        off = abs(drawn.area - exact.area)
        measured("area of a station, share of the allowance", off / (exact.length * pack.design.tolerance))
        assert off < exact.length * pack.design.tolerance, f"{paths[0].name}: {off:.3f} mm2"


def test_area_of_the_planform(pack):
    area = contour(pack.planform("dxf")).area
    # Corners are rounded to the file's decimals: far below a millionth of the area.
    assert abs(area / pack.design.planform_area - 1) < 1e-6
