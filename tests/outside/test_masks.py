"""Printable masks, read by trimesh; their openings measured with shapely."""

import numpy as np
import pytest
import shapely
import trimesh
from shapely import Polygon

import curves

# How true a pair closes round the section: the promise of the pack, mm.
CLOSES_WITHIN = 0.05


def load(path) -> trimesh.Trimesh:
    return trimesh.load(path, file_type="stl")


def face(path, height: float) -> Polygon:
    """The plate cut level at that height, as trimesh cuts it."""
    cut = load(path).section(plane_origin=[0, 0, height], plane_normal=[0, 0, 1])
    assert len(cut.discrete) == 1, f"{path.name}: cut into {len(cut.discrete)} pieces"
    # The corners carry single precision: 1e-5 mm at these sizes. Without this two plates that share a line would not.
    return shapely.set_precision(Polygon(cut.discrete[0][:, :2]), 1e-4)


def test_solids_are_closed_and_face_outwards(pack):
    for path in pack.paths("stl"):
        mesh = load(path)
        assert mesh.is_watertight, path.name
        assert mesh.is_winding_consistent, path.name
        assert mesh.is_volume, path.name
        assert mesh.volume > 0, path.name
        # One block without a hole: V - E + F = 2 (Euler's formula for polyhedra).
        assert mesh.euler_number == 2, path.name
        assert mesh.body_count == 1, path.name


def test_facets_are_whole_and_their_normals_right(pack):
    # Layout of the binary form: header of 80 bytes, count, 50 bytes a facet; from memory of the published format.
    record = np.dtype([("normal", "<3f4"), ("corners", "<(3,3)f4"), ("spare", "<u2")])
    for path in pack.paths("stl"):
        data = path.read_bytes()
        facets = np.frombuffer(data, record, offset=84)
        assert int.from_bytes(data[80:84], "little") == len(facets), path.name
        a, b, c = facets["corners"].astype(float).transpose(1, 0, 2)
        cross = np.cross(b - a, c - a)
        doubled = np.linalg.norm(cross, axis=1)
        longest = np.linalg.norm([b - a, c - b, a - c], axis=-1).max(axis=0)
        # Least height of a facet: single precision places a corner to 1e-5 mm, below that a facet has no direction.
        assert (doubled / longest).min() > 1e-4, path.name
        assert np.abs(cross / doubled[:, None] - facets["normal"]).max() < 1e-3, path.name
        assert not facets["spare"].any(), path.name


def test_header_is_that_of_the_binary_form(pack):
    # A file whose first bytes are "solid" is taken for the text form.
    for path in pack.paths("stl"):
        assert not path.read_bytes()[:80].lstrip().lower().startswith(b"solid"), path.name


def test_plates_lie_on_the_bed_and_fit_it(pack):
    design = pack.design
    room = sorted(size - 2 * design.bed_margin for size in design.bed[:2])
    for path in pack.paths("stl"):
        low, high = load(path).bounds
        assert (low[2], high[2]) == pytest.approx((0, design.mask_thickness), abs=1e-5), path.name
        assert high[2] <= design.bed[2]
        assert all(size <= space for size, space in zip(sorted((high - low)[:2]), room, strict=True)), path.name


# Depth of the engraved letters, mm.
ENGRAVED = 0.8


def letters(path, pack) -> list[Polygon]:
    """What is sunk into the upper side: the holes of a cut just below it."""
    depth = min(ENGRAVED, 0.35 * pack.design.mask_thickness)
    cut = load(path).section(plane_origin=[0, 0, pack.design.mask_thickness - 0.5 * depth], plane_normal=[0, 0, 1])
    outer, *holes = sorted((Polygon(ring[:, :2]) for ring in cut.discrete), key=lambda ring: -ring.area)
    assert all(outer.contains(hole) for hole in holes), path.name
    return holes


def test_volume_is_face_times_thickness_less_the_letters(pack):
    for path in pack.paths("stl"):
        depth = min(ENGRAVED, 0.35 * pack.design.mask_thickness)
        taken = depth * sum(letter.area for letter in letters(path, pack))
        expected = face(path, 0.4 * pack.design.mask_thickness).area * pack.design.mask_thickness - taken
        assert load(path).volume == pytest.approx(expected, rel=1e-5), path.name


def test_strokes_keep_apart_and_leave_a_rim(pack):
    """A nozzle of 0.4 mm needs a gap between strokes, and wood is read by what stands round a letter."""
    for path in pack.paths("stl"):
        strokes = letters(path, pack)
        assert len(strokes) > 20, f"{path.name}: {len(strokes)} strokes"
        for i, one in enumerate(strokes):
            for other in strokes[i + 1 :]:
                assert one.distance(other) > 0.1, path.name
        plate = face(path, 0.4 * pack.design.mask_thickness)
        assert min(plate.exterior.distance(stroke) for stroke in strokes) > 0.8, path.name


def pairs(pack):
    for shape, paths in pack.at_stations("stl"):
        [upper] = [p for p in paths if "upper" in p.name]
        [lower] = [p for p in paths if "lower" in p.name]
        yield shape, [face(path, 0.5 * pack.design.mask_thickness) for path in (upper, lower)]


def test_halves_close_to_one_opening(pack):
    for shape, (upper, lower) in pairs(pack):
        assert upper.intersection(lower).area < 1e-3, f"station {shape.at}: the halves overlap"
        closed = upper.union(lower)
        assert closed.geom_type == "Polygon", f"station {shape.at}: the halves do not meet"
        # Round each peg in its socket a slit stays free.
        opening, *slits = sorted((Polygon(ring) for ring in closed.interiors), key=lambda ring: -ring.area)
        assert all(slit.area < 3 for slit in slits), f"station {shape.at}: {len(slits) + 1} openings"
        # The upper half lies over the upper surface, the lower below.
        assert upper.centroid.y > lower.centroid.y
        assert opening.contains(Polygon(shape.ring)), f"station {shape.at}: the opening cuts the section"


def test_clearance_all_round(pack, measured):
    """Both ways: no point of the opening too near or too far, and no point of the section without its mask."""
    for shape, (upper, lower) in pairs(pack):
        opening = max(upper.union(lower).interiors, key=lambda ring: Polygon(ring).area)
        opening = shapely.segmentize(opening, 0.02)
        opening = shapely.get_coordinates(opening)
        section = curves.closed(shape.ring)
        for gap in (curves.distances(opening, section), curves.distances(section, opening)):
            measured("gap between mask and section less the clearance, mm", gap.min() - pack.design.clearance)
            measured("gap between mask and section less the clearance, mm", gap.max() - pack.design.clearance)
            assert gap.min() >= pack.design.clearance - CLOSES_WITHIN, f"station {shape.at}: {gap.min():.3f} mm"
            assert gap.max() <= pack.design.clearance + CLOSES_WITHIN, f"station {shape.at}: {gap.max():.3f} mm"


def test_halves_can_be_taken_off(pack):
    """Each half must lift straight off the section: no point of its opening lies behind a narrower one.

    Checked on the exact section: every half, moved away by steps, never cuts it.
    """
    for shape, (upper, lower) in pairs(pack):
        section = Polygon(shape.ring)
        height = section.bounds[3] - section.bounds[1]
        for half, way in ((upper, 1), (lower, -1)):
            for step in np.linspace(0, 1.5 * height, 31):
                moved = shapely.affinity.translate(half, 0, way * step)
                assert not moved.intersects(section), f"station {shape.at}: stuck after {step:.2f} mm"
