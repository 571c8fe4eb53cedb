"""Wood templates: the outline less its laminate, by shapely; ply thickness by the rule of its fibre volume."""

import re
import tomllib

import ezdxf
import numpy as np
import pytest
import shapely
import shapely.affinity
from shapely import Point, Polygon

import curves
from conftest import FILES, WOOD
from design_file import quantity

DENSITY = {"kg/m3": 1.0, "g/cm3": 1000.0}
WEIGHT = {"g/m2": 1.0, "kg/m2": 1000.0}
# The designs that have a laminate.
LAMINATED = pytest.mark.parametrize("pack", [p for p in FILES if "[[ply]]" in p.read_text(encoding="utf-8")], indirect=True)


class Skin:
    def __init__(self, path):
        data = tomllib.loads(path.read_text(encoding="utf-8"))
        laminate = data.get("laminate", {})
        self.finish = quantity(laminate.get("finish", "0 mm"))
        self.rise = quantity(laminate.get("rise", "5 mm"))
        self.plies = data.get("ply", [])

    def thickness(self, upper, at, x, chord):
        total = self.finish
        for ply in self.plies:
            on = ply.get("on", "both")
            inside = quantity(ply.get("from", "0 mm")) <= at <= quantity(ply.get("to", "99 m"))
            if not inside or on == ("lower" if upper else "upper"):
                continue
            weight, unit = ply["weight"].split()
            fibre, fibre_unit = ply.get("fibre-density", "1800 kg/m3").split()
            thick = float(weight) * WEIGHT[unit] / (float(fibre) * DENSITY[fibre_unit] * ply.get("fibre-share", 0.45))
            if "thickness" in ply:
                thick = quantity(ply["thickness"])
            front, back = ply.get("chord-from", 0), ply.get("chord-to", 1)
            share = 1.0
            if front > 0 or on != "both":
                share *= smoothstep((x - front * chord) / self.rise)
            if back < 1:
                share *= smoothstep((back * chord - x) / self.rise)
            total += thick * share
        return total


def smoothstep(s):
    s = np.clip(s, 0, 1)
    return s * s * (3 - 2 * s)


def contour(path):
    [entity] = ezdxf.readfile(path).modelspace().query("*[layer=='CUT_OUTSIDE']")
    return np.array(curves.along_polyline(entity))


@pytest.fixture
def wood(pack):
    found = [f for f in pack.manifest["files"]
             if f["kind"] == "dxf" and f["role"] in WOOD and not f["path"].endswith("-r12.dxf")]
    skin = Skin(pack.design.path)
    assert found
    return skin, [(pack.design.shape(f["station_mm"]), pack.folder / f["path"], f["role"]) for f in found]


@LAMINATED
def test_wood_lies_the_skin_inside(wood, pack, measured):
    """Every point of a core's contour lies as deep as the skin is thick where it is nearest to the finished surface. On a
    tapered foil the depth in the plane is a trace more than across the skin: the loft's lean, below a thousandth here, and
    far more in a rounded tip, where it is only held from below."""
    skin, templates = wood
    for shape, path, role in templates:
        finished = Polygon(shape.ring)
        outline = shape.outline
        for x, y in contour(path)[::7]:
            assert finished.contains(Point(x, y)), path.name
            distances = np.hypot(*(outline - [x, y]).T)
            nearest = int(np.argmin(distances))
            foot = outline[nearest]
            upper = nearest < len(outline) // 2
            depth = skin.thickness(upper, shape.at, foot[0], shape.chord)
            off = distances[nearest] - depth
            # A cut face lies deeper. In a tip the bend along the span is left out, as the hand-book says.
            in_tip = pack.design.tip is not None and shape.at > pack.design.tip.begins
            short = 0.1 if in_tip else pack.design.tolerance + 0.004
            assert off > -short, f"{path.name} at {x:.2f}, {y:.2f}: {off:.4f}"
            if role == "core template" and foot[0] < 0.93 * shape.chord and not in_tip:
                measured("depth of the wood less the skin, mm", off)
                assert off < pack.design.tolerance + 0.004 + 2e-3 * depth, f"{path.name} at {x:.2f}, {y:.2f}: {off:.4f}"


@LAMINATED
def test_two_pieces_keep_apart(wood):
    _, templates = wood
    by_station = {}
    for shape, path, role in templates:
        by_station.setdefault(shape.at, {})[role] = Polygon(contour(path))
    for at, pieces in by_station.items():
        assert all(piece.is_valid and piece.exterior.is_simple for piece in pieces.values()), at
        if "flap template" in pieces:
            gap = pieces["main body template"].distance(pieces["flap template"])
            assert gap > 0.3, f"station {at}: {gap}"
            assert pieces["main body template"].centroid.x < pieces["flap template"].centroid.x


@LAMINATED
def test_masks_close_on_the_wood(wood, pack, measured):
    """The opening of a mask for the wood lies inside of the finished surface by the skin less the clearance."""
    import test_masks

    skin, _ = wood
    halves = {}
    for at, path in pack.with_role("core mask half"):
        halves.setdefault(at, []).append(test_masks.face(path, 0.5 * pack.design.mask_thickness))
    assert halves.keys() == set(pack.design.templates)
    for at, plates in halves.items():
        shape = pack.design.shape(at)
        opening = max(shapely.union_all(plates).interiors, key=lambda ring: Polygon(ring).area)
        finished = Polygon(shape.ring)
        for x, y in shapely.get_coordinates(shapely.segmentize(opening, 0.5)):
            distances = np.hypot(*(shape.outline - [x, y]).T)
            nearest = int(np.argmin(distances))
            foot = shape.outline[nearest]
            if not 0.02 * shape.chord < foot[0] < 0.9 * shape.chord:
                continue
            inside = 1 if finished.contains(Point(x, y)) else -1
            depth = skin.thickness(nearest < len(shape.outline) // 2, at, foot[0], shape.chord)
            off = inside * distances[nearest] - (depth - pack.design.clearance)
            measured("opening of a mask for the wood from the skin, mm", off)
            assert abs(off) < test_masks.CLOSES_WITHIN, f"station {at} at {x:.2f}, {y:.2f}: {off:.3f} mm"


FLAPPED = pytest.mark.parametrize("pack", [p for p in FILES if "[flap]" in p.read_text(encoding="utf-8")], indirect=True)


@FLAPPED
def test_the_flap_turns_freely(pack, measured):
    """The wood of both pieces, the flap turned about the axis that its template names, all through the travel: they keep
    apart by the clearance and what is laid on the cut faces. Of the gap the outlines may take their tolerance."""
    flap = tomllib.loads(pack.design.path.read_text(encoding="utf-8"))["flap"]
    clearance = quantity(flap.get("clearance", "0.5 mm")) + 2 * quantity(flap.get("face", "0 mm"))
    up, down = (np.degrees(quantity(flap.get(key, default))) for key, default in (("up", "8 deg"), ("down", "12 deg")))
    turned = 0
    for entry in pack.manifest["files"]:
        if entry["role"] != "flap template" or entry["kind"] != "dxf":
            continue
        moving, fixed = (
            ezdxf.readfile(pack.folder / entry["path"].replace("-flap.", f"-{part}.")).modelspace() for part in ("flap", "main"))
        words = " ".join(text.dxf.text for text in moving.query("TEXT"))
        axis = [float(v) for v in re.search(r"hinge axis (-?[\d.]+) mm from the nose, (-?[\d.]+) mm above", words).groups()]
        pieces = []
        for model in (moving, fixed):
            [entity] = model.query("*[layer=='CUT_OUTSIDE']")
            pieces.append(Polygon(curves.along_polyline(entity)))
        gaps = []
        for angle in np.linspace(-up, down, 61):
            # Trailing edge down is clockwise.
            gaps.append(shapely.affinity.rotate(pieces[0], -angle, origin=axis).distance(pieces[1]))
        measured("least gap between flap and main body less the clearance, mm", min(gaps) - clearance)
        assert min(gaps) >= clearance - 0.05, f"{entry['path']}: {min(gaps):.3f} mm"
        if flap.get("kind", "laminate-upper") == "laminate-upper":
            # A wedge closes to the clearance at full travel, and not before.
            assert gaps[-1] == pytest.approx(min(gaps), abs=0.02) and gaps[0] > gaps[-1]
        turned += 1
    assert turned > 0
