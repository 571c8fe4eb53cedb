"""Volumes of the wood against a mesh that is lofted here through the pack's own wood templates, by trimesh."""

import csv
import subprocess
import tomllib

import ezdxf
import numpy as np
import pytest
import trimesh
from shapely import Polygon

import curves
from conftest import binary
from design_file import Design, quantity

# A foil, tapered, twisted and swept, and two of its kind in two pieces; a template every 12.5 mm for the mesh, and
# closer where a tip is curved.
PLACES = ", ".join(f'"{at:g} mm"' for at in [*np.arange(0, 250, 12.5), *np.arange(250, 301, 6.25)])
FOIL = f"""
name = "Trial"
kind = "main-foil"
[planform]
span = "600 mm"
[[station]]
at = "0 mm"
chord = "140 mm"
section = "NACA 4412"
[[station]]
at = "300 mm"
chord = "80 mm"
section = "NACA 2412"
twist = "-2 deg"
sweep = "20 mm"
[templates]
at = [{PLACES}]
[[ply]]
weight = "300 g/m2"
"""
TIP = 'span = "600 mm"\ntip = "{}"\ntip-length = "50 mm"\ntip-chord = "40 mm"'
FLAP = '[flap]\nhinge = 0.7\nkind = "{}"\nclearance = "0.5 mm"\n'
CUTS = """
[[cut]]
for = "rod"
kind = "slot"
at = 0.3
width = "8 mm"
depth = "5 mm"
from = "50 mm"
to = "200 mm"
[[cut]]
for = "spar"
kind = "pocket"
face = "lower"
chord-from = 0.2
chord-to = 0.4
depth = "1.5 mm"
from = "100 mm"
to = "250 mm"
"""
DESIGNS = {
    "plain": FOIL,
    "rounded tip": FOIL.replace('span = "600 mm"', TIP.format("rounded")),
    "cut tip": FOIL.replace('span = "600 mm"', TIP.format("cut")),
    "laminate hinge": FOIL + FLAP.format("laminate-upper"),
    "pin hinge": FOIL + FLAP.format("pin"),
    "cut-outs": FOIL + CUTS,
}
# Points round a ring of the mesh.
AROUND = 400


def ring(path) -> np.ndarray:
    """The contour, evenly set from the place nearest to a fixed direction, so that rings can be joined."""
    [entity] = ezdxf.readfile(path).modelspace().query("*[layer=='CUT_OUTSIDE']")
    points = np.array(curves.along_polyline(entity))
    begin = int(np.argmax(points[:-1] @ [1.0, 1e-3]))
    points = np.vstack([points[begin:-1], points[: begin + 1]])
    along = np.concatenate([[0], np.hypot(*np.diff(points, axis=0).T).cumsum()])
    even = np.linspace(0, along[-1], AROUND, endpoint=False)
    return np.stack([np.interp(even, along, points[:, k]) for k in (0, 1)], axis=-1)


def in_space(points, shape) -> np.ndarray:
    along = (shape.tail - shape.nose) / shape.chord
    across = np.array([-along[1], along[0]])
    placed = shape.nose + points[:, :1] * along + points[:, 1:] * across
    return np.column_stack([placed, np.full(len(points), shape.at)])


def loft(rings) -> trimesh.Trimesh:
    """Walls between the rings and a fan over each end, from its middle."""
    count = len(rings)
    vertices = np.vstack([*rings, rings[0].mean(axis=0), rings[-1].mean(axis=0)])
    faces = []
    for k in range(count - 1):
        for i in range(AROUND):
            a, b = k * AROUND + i, k * AROUND + (i + 1) % AROUND
            c, d = a + AROUND, b + AROUND
            faces += [[a, b, d], [a, d, c]]
    first, last = count * AROUND, count * AROUND + 1
    for i in range(AROUND):
        j = (i + 1) % AROUND
        faces += [[first, j, i], [last, (count - 1) * AROUND + i, (count - 1) * AROUND + j]]
    return trimesh.Trimesh(vertices, faces)


@pytest.mark.parametrize("name", DESIGNS)
def test_volume_is_that_of_a_mesh_through_the_templates(name, tmp_path, measured):
    path = tmp_path / "design.toml"
    path.write_text(DESIGNS[name], encoding="utf-8")
    command = [binary(), "build", path, "--out", tmp_path / "pack", "--only", "cut,tables"]
    # A check may say that no cutter follows the core of so small a tip; its volume is that all the same.
    assert subprocess.run(command, capture_output=True).returncode in (0, 1)
    design = Design(path)
    with open(tmp_path / "pack/tables/pieces.csv", encoding="utf-8") as text:
        pieces = {row["piece"]: row for row in csv.DictReader(line for line in text if not line.startswith("#"))}
    endings = {"core": "core", "main body": "main", "flap": "flap"}
    assert set(pieces) == ({"main body", "flap"} if "[flap]" in DESIGNS[name] else {"core"})
    # What is cut out, seen from the side of each station, by shapely; between stations by the trapezoidal rule.
    for piece, row in pieces.items():
        places = design.templates
        paths = [tmp_path / "pack/cut" / f"trial-station-{at:g}-{endings[piece]}.dxf" for at in places]
        rings = [in_space(ring(p), design.shape(at)) for p, at in zip(paths, places)]
        mesh = loft(rings)
        assert mesh.is_watertight and mesh.is_winding_consistent
        volume = abs(mesh.volume)
        taken = sum(cut_volume(cut, design, tmp_path) for cut in tomllib.loads(DESIGNS[name]).get("cut", []))
        # The flap itself is shorter by the clearance at its root end.
        if piece == "flap":
            low = Polygon(rings[0][:, :2]).area
            volume -= 0.5 * low
        volume = (volume - taken) / 1000.0
        found = float(row["volume_cm3"])
        measured("volume of a piece over that of its mesh, less one", found / volume - 1)
        assert abs(found / volume - 1) < 1.5e-3, f"{piece}: {found} cm3, the mesh {volume} cm3"
        assert float(row["weight_g"]) == pytest.approx(found * 0.3, abs=0.06)
        assert row["grain"] == "along the span" and int(row["count"]) == 2


def cut_volume(cut, design, folder) -> float:
    """Area of the cut-out's drawn outline that lies in the wood, along its stretch of the span."""
    begin, end = quantity(cut["from"]), quantity(cut["to"])
    places, areas = [], []
    for at in design.templates:
        if begin <= at <= end:
            model = ezdxf.readfile(folder / "pack/cut" / f"trial-station-{at:g}-core.dxf").modelspace()
            [wood] = model.query("*[layer=='CUT_OUTSIDE']")
            wood = Polygon(curves.along_polyline(wood))
            shapes = [Polygon(curves.along_polyline(e)) for e in model.query("*[layer=='CUT_INSIDE']")]
            # Both may be drawn at one station: the slot is the one that opens the upper face.
            upper = cut.get("face", "upper") == "upper"
            [own] = [s for s in shapes if (s.centroid.y > wood.centroid.y) == upper]
            places.append(at)
            areas.append(own.intersection(wood).area)
    assert len(places) > 5
    return float(np.trapezoid(areas, places))
