"""A design file read a second time, and the exact shape that it asks for at a station.

The rule of the loft (common practice in the shop, no source): between two stations the surface is straight from each
point of one outline to the point of the other with the same parameter, as a batten lies. In a tip that is rounded or cut
every outline is drawn together about one place of its chord.
"""

import math
import tomllib
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path

import numpy as np

from naca import Section

UNITS = {"mm": 1.0, "cm": 10.0, "m": 1000.0, "in": 25.4, "ft": 304.8, "deg": math.pi / 180, "rad": 1.0}
# ISO 216:2007 for A4 and A3; ANSI Y14.1 for Letter, 8.5 in by 11 in.
PAPER = {"A4": (210.0, 297.0), "A3": (297.0, 420.0), "Letter": (215.9, 279.4)}
# Parameters of the outline; even in the square root of the station, so that the nose is as finely set as the rest.
PARAMETERS = np.linspace(-1, 1, 20001)


def quantity(text: str) -> float:
    """Millimetres or radians."""
    number, unit = text.split()
    return float(number) * UNITS[unit]


STOCK = {"length": "1200 mm", "width": "600 mm", "margin": "10 mm", "spacing": "12 mm"}


@dataclass(frozen=True)
class Stock:
    length: float
    width: float
    margin: float
    spacing: float


@dataclass(frozen=True)
class Station:
    at: float
    chord: float
    twist: float
    sweep: float
    rise: float
    section: Section

    def placed(self, r) -> np.ndarray:
        """In the foil's axes: x aft of the root's quarter chord, z up; the twist is nose up about the quarter chord."""
        x, z = ((self.section.outline(r) - [0.25, 0.0]) * self.chord).T
        cos, sin = math.cos(self.twist), math.sin(self.twist)
        return np.stack([cos * x + sin * z + self.sweep, cos * z - sin * x + self.rise], axis=-1)


class Shape:
    """The exact outline at a station in the frame of its own chord: nose at the origin, trailing edge along x."""

    def __init__(self, at: float, inner: Station, outer: Station, tip: "Tip | None" = None):
        share = (at - inner.at) / (outer.at - inner.at)

        def by_stations(r):
            return (1 - share) * inner.placed(r) + share * outer.placed(r)

        if tip is None or at <= tip.begins:
            lofted = by_stations
        else:
            nose, tail = by_stations(0.0), by_stations(np.array([-1.0, 1.0])).mean(axis=0)
            kept = nose + tip.about * (tail - nose)
            drawn = tip.share(at, (1 - share) * inner.chord + share * outer.chord)

            def lofted(r):
                return kept + drawn * (by_stations(r) - kept)

        self.at = at
        self.nose = lofted(0.0)
        self.tail = lofted(np.array([-1.0, 1.0])).mean(axis=0)
        along = (self.tail - self.nose) / np.hypot(*(self.tail - self.nose))
        self.chord = float(np.hypot(*(self.tail - self.nose)))
        to_chord = np.array([along, [-along[1], along[0]]])
        self.outline = (lofted(PARAMETERS) - self.nose) @ to_chord.T
        self.base = float(np.hypot(*(self.outline[0] - self.outline[-1])))
        # The trailing edge is cut square, from the lower surface up to the upper one; a sharp one is a single point.
        base = np.linspace(self.outline[-1], self.outline[0], 50)[1:-1]
        self.ring = np.vstack([self.outline, base]) if self.base > 1e-9 else self.outline[:-1]


@dataclass(frozen=True)
class Tip:
    """Rounded: the chord falls as an ellipse's, cut off where so much of the last station's is left. Cut: evenly."""

    form: str
    begins: float
    length: float
    left: float
    about: float
    last_chord: float
    chord_where_it_begins: float

    def share(self, at: float, chord: float) -> float:
        beyond = at - self.begins
        if self.form == "rounded":
            half_axis = self.length / math.sqrt(1 - (self.left / self.last_chord) ** 2)
            return math.sqrt(1 - (beyond / half_axis) ** 2)
        even = self.chord_where_it_begins + (self.left - self.chord_where_it_begins) * beyond / self.length
        return even / chord


class Design:
    def __init__(self, path: Path):
        data = tomllib.loads(path.read_text(encoding="utf-8"))
        self.path, self.name, self.kind = path, data["name"], data["kind"]
        self.mirrored = self.kind in ("main-foil", "elevator")
        self.stations = [
            Station(
                quantity(s["at"]), quantity(s["chord"]), quantity(s.get("twist", "0 deg")), quantity(s.get("sweep", "0 mm")),
                quantity(s.get("rise", "0 mm")),
                Section(s["section"], s.get("trailing-edge", "published")),
            )
            for s in data["station"]
        ]
        self.data = data
        self.tip = self.read_tip(data["planform"])
        places = data.get("templates", {}).get("at")
        self.templates = [quantity(t) for t in places] if places else [s.at for s in self.stations]
        # Defaults as the starter designs print them.
        masks, printer, paper = data.get("masks", {}), data.get("printer", {}), data.get("paper", {})
        self.clearance = quantity(masks.get("clearance", "0.3 mm"))
        self.rail_offset = quantity(masks.get("rail-offset", "0 mm"))
        self.mask_thickness = quantity(masks.get("thickness", "6 mm"))
        self.bed = [quantity(printer.get(f"bed-{axis}", size)) for axis, size in zip("xyz", ("220 mm", "220 mm", "250 mm"))]
        self.bed_margin = quantity(printer.get("margin", "5 mm"))
        size = paper.get("size", "A4")
        self.roll = None if size in PAPER else quantity(size)
        self.paper = PAPER.get(size)
        self.paper_margin = quantity(paper.get("margin", "10 mm"))
        self.overlap = quantity(paper.get("overlap", "10 mm"))
        self.tolerance = quantity(data.get("router", {}).get("tolerance", "0.01 mm"))
        stock = data.get("stock", {})
        sizes = (quantity(stock.get(key, size)) for key, size in STOCK.items())
        self.stock = Stock(*sizes)
        self.design_lift = float(data.get("lift", {}).get("design", 0.4))

    def shape(self, at: float) -> Shape:
        pair = next(p for p in zip(self.stations, self.stations[1:]) if p[0].at <= at <= p[1].at)
        return Shape(at, *pair, self.tip)

    def read_tip(self, planform: dict) -> Tip | None:
        form, end, last = planform.get("tip", "square"), self.stations[-1].at, self.stations[-1].chord
        if form == "square":
            return None
        length, left = quantity(planform["tip-length"]), quantity(planform["tip-chord"])
        chord = float(np.interp(end - length, [s.at for s in self.stations], [s.chord for s in self.stations]))
        about = planform.get("tip-about", 0.5 if form == "rounded" else 1.0)
        return Tip(form, end - length, length, left, about, last, chord)

    @cached_property
    def shapes(self) -> list[Shape]:
        return [self.shape(at) for at in self.templates]

    @cached_property
    def planform_area(self) -> float:
        """Trapezoids between the stations, and many in a shaped tip, seen along z."""
        places = {s.at for s in self.stations}
        if self.tip:
            places |= set(np.linspace(self.tip.begins, self.stations[-1].at, 2001))
        edges = [self.shape(at) for at in sorted(places)]
        chords, places = [e.tail[0] - e.nose[0] for e in edges], [e.at for e in edges]
        return float(np.trapezoid(chords, places)) * (2 if self.mirrored else 1)
