"""How far curves lie apart, and closely spaced points on what other people's libraries read."""

import numpy as np
from ezdxf.math import bulge_to_arc
from scipy.spatial import cKDTree
from svgelements import Close, Line, Path

# Points on arcs lie this close, mm: a chord of 0.02 mm strays less than 1e-4 mm from any arc of 0.5 mm or more.
SPACING = 0.02


def farthest(points, line) -> float:
    """Greatest distance of the points from the polyline."""
    return float(distances(points, line).max())


def distances(points, line) -> np.ndarray:
    """Of each point from a closely sampled line: from the two pieces at its nearest sample."""
    line = np.asarray(line)
    joined = np.array_equal(line[0], line[-1])
    before, after = (line[-2], line[1]) if joined else (line[0], line[-1])
    nearest = cKDTree(line).query(points)[1] + 1
    line = np.vstack([before, line, after])
    return np.minimum(from_pieces(points, line[nearest - 1], line[nearest]),
                      from_pieces(points, line[nearest], line[nearest + 1]))


def from_pieces(points, starts, ends) -> np.ndarray:
    along = ends - starts
    length = np.maximum((along**2).sum(axis=1), 1e-300)
    share = (((points - starts) * along).sum(axis=1) / length).clip(0, 1)
    return np.hypot(*(points - starts - share[:, None] * along).T)


def apart(one, other) -> float:
    """Hausdorff distance of two closely sampled lines: each must lie near all of the other."""
    return max(farthest(one, other), farthest(other, one))


def closed(points) -> np.ndarray:
    return np.vstack([points, points[:1]])


def straight(start, end) -> np.ndarray:
    count = int(np.ceil(np.hypot(*np.subtract(end, start)) / SPACING)) + 1
    return np.linspace(start, end, count)


def polyline_segments(polyline):
    """Start, end and bulge of each segment of an LWPOLYLINE or a POLYLINE, as ezdxf reads it."""
    if polyline.dxftype() == "POLYLINE":
        corners = [(*v.dxf.location.vec2, v.dxf.bulge) for v in polyline.vertices]
        closed = polyline.is_closed
    else:
        corners, closed = polyline.get_points("xyb"), polyline.closed
    ends = corners[1:] + (corners[:1] if closed else [])
    return [(a[:2], b[:2], a[2]) for a, b in zip(corners, ends)]


def along_polyline(polyline) -> np.ndarray:
    """Closely spaced points along an LWPOLYLINE, arcs and all, from its first corner back to it."""
    pieces = [along_segment(*segment) for segment in polyline_segments(polyline)]
    return np.vstack([piece[:-1] for piece in pieces] + [pieces[-1][-1:]])


def along_segment(start, end, bulge) -> np.ndarray:
    if bulge == 0:
        return straight(start, end)
    centre, first, last, radius = bulge_to_arc(start, end, bulge)
    last += 2 * np.pi if last < first else 0
    angles = np.linspace(first, last, int(np.ceil(radius * (last - first) / SPACING)) + 1)
    points = [centre.x, centre.y] + radius * np.stack([np.cos(angles), np.sin(angles)], axis=-1)
    points = points if bulge > 0 else points[::-1]
    # The corners as the file has them, without the rounding of the arc's centre.
    points[0], points[-1] = start, end
    return points


def along_path(path: Path) -> np.ndarray:
    """Closely spaced points along an SVG path."""
    pieces = []
    for segment in path:
        # A move, or a way back to where the pen is already.
        if segment.start is None or segment.start == segment.end:
            continue
        if isinstance(segment, (Line, Close)):
            pieces.append(straight(tuple(segment.start), tuple(segment.end)))
        else:
            chord = abs(complex(*segment.end) - complex(*segment.start))
            steps = np.linspace(0, 1, int(np.ceil(1.6 * chord / SPACING)) + 1)
            pieces.append(segment.npoint(steps))
    return np.vstack(pieces)
