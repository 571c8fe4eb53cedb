"""Printable masks, read by trimesh; their openings measured with shapely."""

import re

import numpy as np
import pytest
import scipy.optimize
import shapely
import shapely.affinity
import trimesh
from shapely import Point, Polygon

import curves
import test_wood
from conftest import FILES

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


def test_pieces_lie_on_the_bed_and_fit_it(pack):
    design = pack.design
    room = [size - 2 * design.bed_margin for size in design.bed[:2]]
    for path in pack.paths("stl"):
        low, high = load(path).bounds
        assert low[2] == pytest.approx(0, abs=1e-5), path.name
        if path in pack.plates():
            assert high[2] == pytest.approx(design.mask_thickness, abs=1e-5), path.name
        assert high[2] <= design.bed[2]
        sides = sorted((high - low)[:2])
        assert all(size <= space for size, space in zip(sides, sorted(room), strict=True)), path.name


def test_nothing_hangs_over(pack, measured):
    """No facet but those on the bed looks down: printed as it lies, nothing needs support."""
    for path in pack.paths("stl"):
        mesh = load(path)
        lies = mesh.triangles[:, :, 2].max(axis=1) < 1e-4
        lowest = mesh.face_normals[~lies, 2].min()
        measured("steepest overhang, sine", lowest)
        assert lowest > -1e-3, path.name


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
    for path in pack.plates():
        depth = min(ENGRAVED, 0.35 * pack.design.mask_thickness)
        taken = depth * sum(letter.area for letter in letters(path, pack))
        expected = face(path, 0.4 * pack.design.mask_thickness).area * pack.design.mask_thickness - taken
        assert load(path).volume == pytest.approx(expected, rel=1e-5), path.name


def test_strokes_keep_apart_and_leave_a_rim(pack):
    """A nozzle of 0.4 mm needs a gap between strokes, and wood is read by what stands round a letter."""
    for path in pack.plates():
        strokes = letters(path, pack)
        assert len(strokes) > 20, f"{path.name}: {len(strokes)} strokes"
        for i, one in enumerate(strokes):
            for other in strokes[i + 1 :]:
                assert one.distance(other) > 0.1, path.name
        plate = face(path, 0.4 * pack.design.mask_thickness)
        assert min(plate.exterior.distance(stroke) for stroke in strokes) > 0.8, path.name


def pairs(pack):
    for shape, paths in pack.at_stations("stl"):
        # A half that is longer than the bed comes in several pieces.
        halves = [[face(path, 0.5 * pack.design.mask_thickness) for path in paths if word in path.name]
                  for word in ("upper", "lower")]
        yield shape, [shapely.union_all(pieces, grid_size=1e-4) for pieces in halves]


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


def cradles(pack):
    """Span and face of each cradle, with its blocks put together."""
    found = {}
    for _, path in pack.with_role("cradle"):
        start, end, face_name = re.search(r"cradle-([\d.]+)-to-([\d.]+)-(lower|upper)", path.name).groups()
        found.setdefault((float(start), float(end), face_name), []).append(load(path))
    return found


SHOP = pytest.mark.parametrize("pack", [p for p in FILES if "cradles" in p.read_text(encoding="utf-8")], indirect=True)


@SHOP
def test_the_wood_lies_in_its_cradles(pack, measured):
    """The core, from the exact finished outline and its even skin, laid into the cradle at a place between its ends: all of
    the face lies the clearance away. The board's height is common to all: found once, from the first."""
    skin = test_wood.Skin(pack.design.path)
    assert len(cradles(pack)) == 2 * (len(pack.design.templates) - 1)
    heights = {}
    for (start, end, face_name), blocks in cradles(pack).items():
        for share in (0.15, 0.5, 0.9):
            at = start + share * (end - start)
            shape = pack.design.shape(at)
            depth = skin.thickness(True, at, 0.5 * shape.chord, shape.chord)
            core = Polygon(shape.ring).buffer(-depth, quad_segs=64)
            along = shape.tail - shape.nose
            turn = np.degrees(np.arctan2(along[1], along[0]))
            core = shapely.affinity.translate(shapely.affinity.rotate(core, turn, origin=(0, 0)), *shape.nose)
            sign = 1 if face_name == "lower" else -1
            points = shapely.get_coordinates(shapely.segmentize(core.exterior, 0.2)) * [1, sign]
            cuts = [block.section(plane_origin=[0, sign * at, 0], plane_normal=[0, 1, 0]) for block in blocks]
            block = shapely.union_all([Polygon(cut.discrete[0][:, [0, 2]]) for cut in cuts], grid_size=1e-4)
            inner = points[(points[:, 0] > points[:, 0].min() + 3) & (points[:, 0] < points[:, 0].max() - 3)]
            lower = inner[inner[:, 1] < np.interp(inner[:, 0], *middle_line(points))]
            top = block.boundary
            # Let down until the mean gap is the clearance: the same height for every cradle of a face.
            height = heights.get(face_name)
            if height is None:
                height = scipy.optimize.brentq(
                    lambda h: np.mean([top.distance(Point(x, y + h)) for x, y in lower[::9]]) - pack.design.clearance, 5, 80)
                heights[face_name] = height
            gaps = np.array([top.distance(Point(x, y + height)) for x, y in lower])
            assert not any(block.contains(Point(x, y + height)) for x, y in lower)
            measured("gap between wood and cradle less the clearance, mm", gaps.min() - pack.design.clearance)
            measured("gap between wood and cradle less the clearance, mm", gaps.max() - pack.design.clearance)
            assert abs(gaps - pack.design.clearance).max() < CLOSES_WITHIN, f"{at} {face_name}: {gaps.min():.3f} {gaps.max():.3f}"


def middle_line(points):
    """Half way between the lowest and the highest point of each stretch along the chord."""
    places = np.linspace(points[:, 0].min(), points[:, 0].max(), 60)
    near = [points[abs(points[:, 0] - x) < 1.0, 1] for x in places]
    return places, [0.5 * (ys.min() + ys.max()) for ys in near]


@SHOP
def test_rails_stand_proud_of_the_wood_by_what_was_asked(pack, measured):
    skin = test_wood.Skin(pack.design.path)
    by_place = {}
    for at, path in pack.with_role("end rail"):
        by_place.setdefault((at, "upper" if "-upper" in path.name else "lower"), []).append(face(path, 0.3 * pack.design.mask_thickness))
    assert len(by_place) == 2 * len(pack.design.stations)
    heights = {}
    for (at, face_name), plates in by_place.items():
        shape = pack.design.shape(at)
        depth = skin.thickness(True, at, 0.5 * shape.chord, shape.chord)
        core = Polygon(shape.ring).buffer(-depth, quad_segs=64)
        along = shape.tail - shape.nose
        core = shapely.affinity.rotate(core, np.degrees(np.arctan2(along[1], along[0])), origin=(0, 0))
        core = shapely.affinity.translate(core, *shape.nose)
        proud = core.buffer(pack.design.rail_offset, quad_segs=64)
        sign = 1 if face_name == "upper" else -1
        proud = shapely.affinity.scale(proud, 1, sign, origin=(0, 0))
        plate = shapely.union_all(plates, grid_size=1e-4)
        left, _, right, _ = core.bounds
        for x in np.linspace(left + 2, right - 2, 25):
            upright = shapely.LineString([(x, -200), (x, 200)])
            edge = plate.intersection(upright).bounds[3]
            wanted = proud.intersection(upright).bounds[3]
            # Rails of one face stand on one board.
            height = heights.setdefault(face_name, edge - wanted)
            measured("edge of a rail from the wood moved out, mm", edge - wanted - height)
            assert abs(edge - wanted - height) < CLOSES_WITHIN, f"{at} {face_name} at {x:.1f}"
