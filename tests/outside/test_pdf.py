"""Paper templates as PDF, read by poppler and pypdf: is the print true to size, whole and legible everywhere?"""

import re
import xml.etree.ElementTree as ElementTree

import ezdxf
import numpy as np
import pytest

import curves
import pdf_reading

# What each page keeps for the check lines (left and below) and for its title (above), mm: the layout of our own pages.
STRIP, TITLE = 12.0, 9.0
OUTLINE_PEN = 0.35
# The outline's own tolerance, and single precision and the Béziers' 0.001 mm on the way to paper.
ROUNDING = 0.005
CHECK_LENGTH = 100.0


@pytest.fixture
def pdf(pack):
    [path] = [p for p in pack.paths("pdf") if not p.stem.endswith("-wood")]
    return path


def test_pages_have_the_size_of_the_paper(pack, pdf):
    for number, size in enumerate(pdf_reading.page_sizes(pdf), 1):
        if pack.design.roll:
            assert min(abs(side - pack.design.roll) for side in size) < 0.1, f"page {number}"
            continue
        assert sorted(size) == pytest.approx(sorted(pack.design.paper), abs=0.1), f"page {number}"


def test_every_font_is_embedded(pdf):
    lines = pdf_reading.poppler("pdffonts", pdf).splitlines()
    embedded = lines[0].index("emb")
    assert len(lines) > 2, "no font at all: the words are gone"
    for line in lines[2:]:
        assert line[embedded : embedded + 3] == "yes", line


def tiles_needed(extent, paper, margin, overlap):
    """Fewest tiles for a drawing of that size, upright or on their side."""
    def across(length, window):
        return max(1, int(np.ceil((length - overlap) / (window - overlap) - 1e-9)))

    return min(
        across(extent[0], w - 2 * margin - STRIP) * across(extent[1], h - 2 * margin - STRIP - TITLE)
        for w, h in (paper, paper[::-1])
    )


def drawing_of(page_text: str) -> str:
    """Which drawing a page shows, by its title."""
    found = re.search(r"(planform|station [\d.]+ mm)", page_text)
    assert found, f"a page that does not say what it shows: {page_text!r}"
    return found[1]


def test_as_many_pages_as_the_drawings_need(pack, pdf):
    shown = [drawing_of(text) for text in pdf_reading.page_texts(pdf)]
    for path in pack.paths("svg"):
        # The single page of a drawing is larger by these; a small drawing has a page of 110 mm of its own, and one tile.
        size = ElementTree.parse(path).getroot().get("viewBox").split()[2:]
        extent = np.array(size, dtype=float) - [34, 43]
        if pack.design.roll:
            # Both ways round; the end of a roll is where the drawing ends.
            room = pack.design.roll - 2 * pack.design.paper_margin - STRIP
            needed = 1 if (extent <= [room, room - TITLE]).any() else 2
        else:
            needed = tiles_needed(extent, pack.design.paper, pack.design.paper_margin, pack.design.overlap)
        name = re.search(r"(planform|station)-?([\d.]+)?\.svg$", path.name)
        if not name:
            # Wood has a file of pages of its own.
            assert re.search(r"-(core|main|flap)\.svg$", path.name)
            continue
        title = "planform" if name[1] == "planform" else f"station {name[2]} mm"
        assert shown.count(title) == needed, f"{title}: {shown.count(title)} pages, {needed} needed"
    assert set(shown) == {"planform"} | {f"station {at:g} mm" for at in pack.design.templates}


def test_tiles_are_numbered_without_a_gap(pdf):
    places = {}
    for text in pdf_reading.page_texts(pdf):
        tile = re.search(r"row (\d+) of (\d+), column (\d+) of (\d+)", text)
        row, rows, column, columns = map(int, tile.groups()) if tile else (1, 1, 1, 1)
        places.setdefault((drawing_of(text), rows, columns), []).append((row, column))
    for (name, rows, columns), found in places.items():
        assert found == [(r, c) for r in range(1, rows + 1) for c in range(1, columns + 1)], name


def test_every_page_says_what_to_measure(pdf):
    for number, text in enumerate(pdf_reading.page_texts(pdf), 1):
        assert text.count("measure this: 100 mm") == 2, f"page {number}"


def test_check_lines_are_drawn_100_mm_long(pack, pdf):
    for number, strokes in enumerate(pdf_reading.strokes(pdf), 1):
        lines = [s.points for s in strokes if len(s.points) == 2 and not s.clipped]
        for axis in (0, 1):
            # Level lines below the window of the drawing, upright ones left of it; ticks are short.
            strip = [line for line in lines if line[:, 1 - axis].max() < pack.design.paper_margin + STRIP]
            length = [np.ptp(line[:, axis]) for line in strip if np.ptp(line[:, axis]) > 10]
            assert length == pytest.approx([CHECK_LENGTH], abs=0.001), f"page {number}: {length}"


def printed_check_line(page: np.ndarray, dots: int, side: int) -> float:
    """Length of the level check line between the middles of its two end ticks, mm; side 1: measured below it, -1: above."""
    per_mm = dots / 25.4
    dark = page > 0.5
    # The line is the row with most ink in the strip along the lower edge (the picture holds no other long level line there).
    rows = dark[-int(24 * per_mm) :, : int(140 * per_mm)]
    row = page.shape[0] - rows.shape[0] + int(np.argmax(rows.sum(axis=1)))
    # Ticks stand 2 mm out on both sides; words stand on one of them.
    first, last = sorted(row + side * int(out * per_mm) for out in (0.7, 1.6))
    beside = page[first:last, : int(140 * per_mm)].mean(axis=0)
    inked = np.flatnonzero(beside > 0.02)
    ticks = np.split(inked, np.flatnonzero(np.diff(inked) > per_mm) + 1)
    assert len(ticks) == 2, f"{len(ticks)} ticks"
    middles = [np.average(tick, weights=beside[tick]) for tick in ticks]
    return (middles[1] - middles[0]) / per_mm


def test_printed_check_lines_at_600_dots(pdf, measured):
    page = pdf_reading.picture(pdf, 1, 600)
    # Mirrored about its diagonal, the page has its left edge below and its corner in place. The words of that line are on
    # the side of the edge, those of the level line on the side of the drawing.
    mirrored = page[::-1].T[::-1]
    for name, view, side in (("level", page, 1), ("upright", mirrored, -1)):
        length = printed_check_line(view, 600, side)
        measured(f"printed check line, {name}, 600 dots an inch, mm", length)
        assert length == pytest.approx(CHECK_LENGTH, abs=0.02), name


def test_tiles_put_together_match_the_contour(pack, pdf, measured):
    """The planform's pages printed, laid cross on cross from left to right, against the corners of the router file: ink must
    lie where the contour does."""
    tiles = [(number, strokes) for number, (text, strokes) in
             enumerate(zip(pdf_reading.page_texts(pdf), pdf_reading.strokes(pdf), strict=True), 1)
             if drawing_of(text) == "planform" and "row 1 of 1" in text]
    if len(tiles) < 2:
        pytest.skip("the planform is on one tile, or on several rows of them")
    [contour] = ezdxf.readfile(pack.planform("dxf")).modelspace().query("*[layer=='CUT_OUTSIDE']")
    reach = curves.along_polyline(contour).min(axis=0)
    corners = np.array(contour.get_points("xyb"))
    contour, straight = corners[:, :2], corners[:, 2] == 0
    seams, shift, checked = None, np.zeros(2), 0
    for number, strokes in tiles:
        crosses = np.array(sorted({tuple(np.round(s.points.mean(axis=0), 3)) for s in strokes if is_mark(s)}))
        middle = crosses[:, 0].mean() if seams is not None and number != tiles[-1][0] else None
        left = crosses if number == tiles[-1][0] else crosses[crosses[:, 0] < middle] if middle else crosses[:0]
        right = crosses if seams is None else crosses[crosses[:, 0] > middle] if middle else crosses[:0]
        if seams is None:
            # The first tile is laid by its outline; all others by the crosses alone.
            outline = largest_outline(strokes)
            shift = outline.points.min(axis=0) - reach
        else:
            shift = shift + (left - seams).mean(axis=0)
        seams = right
        page = pdf_reading.picture(pdf, number, 600)
        per_mm = 600 / 25.4
        for start, end, is_line in zip(contour, np.roll(contour, -1, axis=0), straight):
            # Beside a piece that is shorter than the strip read here, its neighbours' ink would be read too.
            if not is_line or np.hypot(*(end - start)) < 2:
                continue
            along = (end - start) / np.hypot(*(end - start))
            across = np.array([-along[1], along[0]])
            for share in np.linspace(0.03, 0.97, 40):
                place = start + share * (end - start) + shift
                # Well inside of the window of this tile.
                width, height = page.shape[1] / per_mm, page.shape[0] / per_mm
                if not (30 < place[0] < width - 15 and 30 < place[1] < height - 25):
                    continue
                steps = np.arange(-0.6, 0.6, 0.02)
                dots = place + steps[:, None] * across
                ink = page[(page.shape[0] - dots[:, 1] * per_mm).astype(int), (dots[:, 0] * per_mm).astype(int)]
                if abs(ink.sum() * 0.02 - OUTLINE_PEN) > 0.06:
                    # A station line crosses here.
                    assert ink.sum() > 0, f"page {number}: no ink on the contour"
                    continue
                off = np.average(steps, weights=ink)
                measured("printed and joined contour from the router file, mm", off)
                assert abs(off) < 0.1, f"page {number}: {off:.3f} mm"
                checked += 1
    assert checked > 40


def test_printed_outlines_follow_the_equations(pack, pdf, measured):
    pages = list(zip(pdf_reading.page_texts(pdf), pdf_reading.strokes(pdf), strict=True))
    for shape in pack.design.shapes:
        mine = [strokes for text, strokes in pages if drawing_of(text) == f"station {shape.at:g} mm"]
        assert mine, f"no page shows station {shape.at:g} mm"
        for strokes in mine:
            [outline] = [s for s in strokes if abs(s.width - OUTLINE_PEN) < 0.01]
            level = [s.points for s in strokes if np.ptp(s.points[:, 1]) < 1e-3]
            chord_line = next(line for line in level if np.ptp(line[:, 0]) > shape.chord)
            # The chord line overruns nose and trailing edge by the same length.
            nose = np.array([chord_line[:, 0].mean() - shape.chord / 2, chord_line[0, 1]])
            apart = curves.apart(pdf_reading.filled(outline.points) - nose, curves.closed(shape.ring))
            measured("PDF outline from the equations, mm", apart)
            assert apart <= pack.design.tolerance + ROUNDING, f"station {shape.at:g} mm: {apart:.4f} mm"


def test_match_marks_lie_at_the_same_place_of_both_tiles(pack, pdf):
    """A cross in a seam is drawn on the two tiles that share it, so each must be found twice in the drawing's own frame."""
    by_drawing = {}
    for text, strokes in zip(pdf_reading.page_texts(pdf), pdf_reading.strokes(pdf), strict=True):
        outline = largest_outline(strokes)
        corner = outline.points.min(axis=0)
        middles = [s.points.mean(axis=0) - corner for s in strokes if is_mark(s)]
        by_drawing.setdefault(drawing_of(text), []).append(np.array(middles))
    for name, tiles in by_drawing.items():
        if len(tiles) == 1:
            assert len(tiles[0]) == 0, f"{name}: a match mark without a neighbour"
            continue
        marks = np.vstack(tiles)
        apart = np.hypot(*(marks[:, None] - marks).T)
        # Two arms of the cross on each of two tiles.
        assert ((apart < 0.01).sum(axis=1) == 4).all(), name


def largest_outline(strokes):
    """The contour of the piece; slots and pockets in it are drawn as heavy."""
    heavy = [s for s in strokes if abs(s.width - OUTLINE_PEN) < 0.01]
    return max(heavy, key=lambda s: np.ptp(s.points, axis=0).sum())


def is_mark(stroke) -> bool:
    """An arm of a match mark: a straight line of 8 mm."""
    length = np.hypot(*(stroke.points[-1] - stroke.points[0]))
    return len(stroke.points) == 2 and not stroke.clipped and abs(length - 8) < 0.01
