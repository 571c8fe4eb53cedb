"""Router files, read and audited by ezdxf."""

import itertools
import re

import ezdxf
import numpy as np
import pytest
import shapely
from ezdxf import recover

import curves

# Layers and their colour numbers, as docs/pack.md tells the maker.
LAYERS = {"CUT_OUTSIDE": 1, "CUT_INSIDE": 2, "DRILL": 6, "ENGRAVE": 30, "TAB": 7, "REFERENCE": 5, "LABEL": 3, "CHECK": 8}
# A layer for each depth of a pocket comes with the pocket.
POCKET = re.compile(r"POCKET_(\d+)(?:_(\d+))?MM")
# Lines are cut or measured from; words are on a layer of their own, and no check line is in a router file.
KINDS = {("CUT_OUTSIDE", "LWPOLYLINE"), ("REFERENCE", "LWPOLYLINE"), ("LABEL", "TEXT")}
# What only some pieces have.
MORE = {("CUT_INSIDE", "LWPOLYLINE"), ("DRILL", "LWPOLYLINE"), ("ENGRAVE", "LWPOLYLINE"), ("TAB", "LWPOLYLINE")}
# A decimal of the router's tolerance for the spacing of the points compared and the rounding of the file, mm.
ROUNDING = 0.001
# Shortest segment that a router's controller takes without a dwell, mm: common practice, no source.
SHORTEST = 0.05


def modelspace(path):
    return ezdxf.readfile(path).modelspace()


def test_audit_finds_nothing_to_repair(pack):
    for path in [*pack.paths("dxf"), *pack.sheets(), *pack.r12()]:
        audit = ezdxf.readfile(path).audit()
        assert (audit.errors, audit.fixes) == ([], []), path.name
        _, audit = recover.readfile(path)
        assert (audit.errors, audit.fixes) == ([], []), path.name


def test_release_and_units(pack):
    # DXF reference, header variables: AC1015 is release 2000, $INSUNITS 4 millimetres, $MEASUREMENT 1 metric.
    for path in [*pack.paths("dxf"), *pack.sheets()]:
        document = ezdxf.readfile(path)
        found = document.dxfversion, document.header["$INSUNITS"], document.header["$MEASUREMENT"]
        assert found == ("AC1015", 4, 1), path.name


def test_layers_are_those_of_the_hand_book(pack):
    for path in pack.paths("dxf"):
        document = ezdxf.readfile(path)
        # Layer 0 is in every drawing; ezdxf adds Defpoints when it reads one.
        layers = {layer.dxf.name: layer.color for layer in document.layers if layer.dxf.name not in ("0", "Defpoints")}
        pockets = {name for name in layers if POCKET.fullmatch(name)}
        assert all(layers.pop(name) == 4 for name in pockets), path.name
        assert layers == LAYERS, path.name


def test_each_layer_holds_what_it_is_for(pack):
    for path in pack.paths("dxf"):
        kinds = {(entity.dxf.layer, entity.dxftype()) for entity in modelspace(path)}
        pockets = {kind for kind in kinds if POCKET.fullmatch(kind[0]) and kind[1] == "LWPOLYLINE"}
        kinds -= MORE | pockets
        assert kinds == KINDS, f"{path.name}: {sorted(kinds ^ KINDS)}"


def test_one_closed_contour_is_cut(pack):
    for path in pack.paths("dxf"):
        [contour] = modelspace(path).query("*[layer=='CUT_OUTSIDE']")
        assert contour.closed, path.name
        corners = contour.get_points("xy")
        assert corners[0] != corners[-1], f"{path.name}: the first corner is repeated at the end"


def test_header_extents_hold_every_line(pack):
    for path in pack.paths("dxf"):
        document = ezdxf.readfile(path)
        low, high = (np.array(document.header[name][:2]) for name in ("$EXTMIN", "$EXTMAX"))
        for entity in document.modelspace().query("LWPOLYLINE"):
            points = curves.along_polyline(entity)
            assert (points >= low - 1e-5).all() and (points <= high + 1e-5).all(), path.name


def test_nothing_is_drawn_twice(pack):
    for path in pack.paths("dxf"):
        # A line drawn backwards is the same line.
        drawn = [e for e in modelspace(path) if e.dxftype() != "TEXT"]
        lines = [np.round(curves.along_polyline(e), 4) if e.dxftype() == "LWPOLYLINE"
                 else np.round([e.dxf.start[:2], e.dxf.end[:2]], 4) for e in drawn if e.dxf.layer != "TAB"]
        for one, other in itertools.combinations(lines, 2):
            same = one.shape == other.shape and (np.array_equal(one, other) or np.array_equal(one, other[::-1]))
            assert not same, path.name


def test_no_segment_is_too_short(pack):
    for path in pack.paths("dxf"):
        for entity in modelspace(path).query("LWPOLYLINE"):
            for start, end, _ in curves.polyline_segments(entity):
                assert np.hypot(*np.subtract(end, start)) > 1e-4, f"{path.name}: a segment without length"


def test_station_outlines_have_no_segment_below_the_shortest(pack):
    for shape, paths in pack.at_stations("dxf"):
        # A trailing edge narrower than that cannot be drawn otherwise.
        [contour] = modelspace(paths[0]).query("*[layer=='CUT_OUTSIDE']")
        lengths = sorted(np.hypot(*np.subtract(b, a)) for a, b, _ in curves.polyline_segments(contour))
        narrow = 1 if 0 < shape.base < SHORTEST else 0
        assert lengths[narrow] >= SHORTEST, f"{paths[0].name}: {lengths[:3]}"


def test_station_outlines_follow_the_equations(pack, measured):
    for shape, paths in pack.at_stations("dxf"):
        [contour] = modelspace(paths[0]).query("*[layer=='CUT_OUTSIDE']")
        apart = curves.apart(curves.along_polyline(contour), curves.closed(shape.ring))
        measured("DXF outline from the equations, mm", apart)
        assert apart <= pack.design.tolerance + ROUNDING, f"{paths[0].name}: {apart:.4f} mm"


def test_arcs_run_on_smoothly(pack, measured):
    """Where two segments meet, a corner the cutter would mark; the trailing edge's own corners do not count."""
    for shape, paths in pack.at_stations("dxf"):
        [contour] = modelspace(paths[0]).query("*[layer=='CUT_OUTSIDE']")
        segments = curves.polyline_segments(contour)
        worst = 0.0
        for before, after in zip(segments, segments[1:] + segments[:1]):
            if min(np.hypot(*(np.array(after[0]) - shape.outline[i])) for i in (0, -1)) < 0.05:
                continue
            turn = tangent(*after)[0] - tangent(*before)[1]
            worst = max(worst, abs((np.degrees(turn) + 180) % 360 - 180))
        measured("corner between DXF arcs, degrees", worst)
        # A tenth of a degree over a cutter's width stays below the tolerance of the outline (0.0017 * 6 mm = 0.01 mm).
        assert worst < 0.1, f"{paths[0].name}: {worst:.3f} degrees"


def tangent(start, end, bulge):
    """Direction at the start and at the end of a segment, radians."""
    chord = np.arctan2(end[1] - start[1], end[0] - start[0])
    half = 2 * np.arctan(bulge)
    return chord - half, chord + half


def test_reference_lines_lie_where_the_label_says(pack):
    for shape, paths in pack.at_stations("dxf"):
        lines = [np.array(e.get_points("xy")) for e in modelspace(paths[0]).query("LWPOLYLINE[layer=='REFERENCE']")]
        chord_lines = [line for line in lines if abs(line[:, 1]).max() < 1e-4]
        assert any(line[:, 0].min() < 0 and line[:, 0].max() > shape.chord for line in chord_lines), paths[0].name
        words = " ".join(e.dxf.text for e in modelspace(paths[0]).query("TEXT"))
        assert f"chord {shape.chord:.2f} mm" in words, words


def test_planform_corners_are_the_lofted_edges(pack):
    """Every corner is the nose or the trailing edge at its place, and no station or beginning of a tip is without one."""
    design = pack.design
    [contour] = modelspace(pack.planform("dxf")).query("*[layer=='CUT_OUTSIDE']")
    corners = np.array(contour.get_points("xy"))
    for x, y in corners:
        shape = design.shape(min(abs(x), design.stations[-1].at))
        assert min(abs(-y - shape.nose[0]), abs(-y - shape.tail[0])) < 1e-4, f"corner at {x}, {y}"
    places = [s.at for s in design.stations] + ([design.tip.begins] if design.tip else [])
    for shape in map(design.shape, places):
        for x in (shape.nose[0], shape.tail[0]):
            for side in (1, -1) if design.mirrored else (1,):
                assert np.hypot(*(corners - [side * shape.at, -x]).T).min() < 1e-4, f"no corner at {side * shape.at}"


def closed_rings(path) -> dict[str, list]:
    """Closed contours of a file by layer, as closely spaced points, in either release."""
    rings = {}
    for entity in modelspace(path).query("LWPOLYLINE POLYLINE"):
        closed = entity.closed if entity.dxftype() == "LWPOLYLINE" else entity.is_closed
        if closed:
            rings.setdefault(entity.dxf.layer, []).append(curves.along_polyline(entity))
    return rings


def test_sheets_hold_every_piece_and_nothing_beyond_their_edge(pack, measured):
    stock = pack.design.stock
    pieces = sorted(shapely.Polygon(closed_rings(path)["CUT_OUTSIDE"][0]).area for path in pack.paths("dxf"))
    laid = []
    for path in pack.sheets():
        rings = closed_rings(path)
        [edge] = rings.pop("REFERENCE", [])[:1]
        assert (edge.min(axis=0), edge.max(axis=0)) == (pytest.approx([0, 0]), pytest.approx([stock.length, stock.width])), path.name
        for entity in modelspace(path).query("LWPOLYLINE"):
            points = curves.along_polyline(entity)
            assert (points >= -1e-6).all() and (points <= np.array([stock.length, stock.width]) + 1e-6).all(), path.name
        cut = [shapely.Polygon(ring) for ring in rings["CUT_OUTSIDE"]]
        inside = shapely.box(stock.margin, stock.margin, stock.length - stock.margin, stock.width - stock.margin)
        assert all(inside.buffer(1e-6).contains(piece) for piece in cut), path.name
        gap = 99.0
        for one, other in itertools.combinations(cut, 2):
            # Boxes that far apart hold no nearer pieces.
            if shapely.box(*one.bounds).distance(shapely.box(*other.bounds)) < gap:
                gap = min(gap, one.distance(other))
        assert gap >= stock.spacing - 1e-6, f"{path.name}: {gap} mm between two pieces"
        measured("gap between pieces on a sheet, mm", gap)
        laid += [piece.area for piece in cut]
    assert sorted(laid) == pytest.approx(pieces, rel=1e-6)


def test_r12_says_the_same_as_release_2000(pack):
    for path in pack.r12():
        document = ezdxf.readfile(path)
        assert document.dxfversion == "AC1009", path.name
        newer = path.with_name(path.name.replace("-r12.dxf", ".dxf"))
        one, other = closed_rings(path), closed_rings(newer)
        assert one.keys() == other.keys(), path.name
        for layer, rings in one.items():
            for a, b in zip(rings, other[layer], strict=True):
                assert curves.apart(a, b) < 1e-4, f"{path.name}, {layer}"
