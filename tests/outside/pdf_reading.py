"""What poppler and pypdf see in a PDF: pages, words, lines in mm, pictures."""

import re
import subprocess
from dataclasses import dataclass
from io import BytesIO

import numpy as np
import shapely
from PIL import Image
from pypdf import PdfReader

# A roll is a large picture.
Image.MAX_IMAGE_PIXELS = None
# A point of PDF is 1/72 inch: ISO 32000-1:2008, 8.3.2.3.
MM = 25.4 / 72


@dataclass
class Stroke:
    """A stroked path: points along it and the width of its pen, mm from the lower left corner of the page."""

    points: np.ndarray
    width: float
    clipped: bool  # Shows only inside a window, as the drawing does; what belongs to the page itself does not.


def poppler(*command) -> str:
    return subprocess.run([*map(str, command)], capture_output=True, text=True, check=True).stdout


def page_sizes(path) -> list[tuple[float, float]]:
    """Width and height of each page, mm."""
    text = poppler("pdfinfo", "-f", 1, "-l", 9999, path)
    return [(float(w) * MM, float(h) * MM) for w, h in re.findall(r"^Page\s+\d+ size:\s+([\d.]+) x ([\d.]+)", text, re.M)]


def page_texts(path) -> list[str]:
    return poppler("pdftotext", "-layout", path, "-").split("\f")[:-1]


def picture(path, page: int, dots: int) -> np.ndarray:
    """Darkness of the page, 0 to 1, rows from the top; `dots` an inch. Drawn by cairo, which shades the dots at the edge of a
    line and does not move thin lines onto whole ones."""
    command = ["pdftocairo", "-png", "-gray", "-singlefile", "-r", str(dots), "-f", str(page), "-l", str(page), str(path), "-"]
    image = Image.open(BytesIO(subprocess.run(command, capture_output=True, check=True).stdout)).convert("L")
    return 1 - np.asarray(image, dtype=np.float32) / 255


def strokes(path) -> list[list[Stroke]]:
    """All stroked paths of each page, from its content stream (operators of ISO 32000-1:2008, table 59 and 60)."""
    return [page_strokes(page) for page in PdfReader(path).pages]


def page_strokes(page) -> list[Stroke]:
    found, current, width, clips = [], [], [1.0], [False]

    def before(operator, operands, matrix, _):
        a, b, c, d, e, f = matrix

        def place(x, y):
            return (float(a * x + c * y + e) * MM, float(b * x + d * y + f) * MM)

        match operator:
            case b"q":
                clips.append(clips[-1])
            case b"Q":
                clips.pop()
            case b"W" | b"W*":
                clips[-1] = True
            case b"w":
                width[0] = float(operands[0]) * MM
            case b"m":
                current.append([place(*operands)])
            case b"l":
                current[-1].append(place(*operands))
            case b"c":
                current[-1] += bezier(current[-1][-1], *(place(*operands[i : i + 2]) for i in (0, 2, 4)))
            case b"h":
                current[-1].append(current[-1][0])
            case b"S" | b"s":
                found.extend(Stroke(np.array(points), width[0], clips[-1]) for points in current)
                current.clear()
            case b"n" | b"f" | b"f*" | b"B":
                current.clear()

    page.extract_text(visitor_operand_before=before)
    return found


def bezier(*corners):
    a, b, c, d = np.array(corners)
    count = int(np.ceil(np.hypot(*(d - a)) / 0.02)) + 1
    t = np.linspace(0, 1, count + 1)[1:, None]
    return [tuple(p) for p in (1 - t) ** 3 * a + 3 * t * (1 - t) ** 2 * b + 3 * t**2 * (1 - t) * c + t**3 * d]


def filled(points) -> np.ndarray:
    """Closely spaced points along straight pieces too."""
    return shapely.get_coordinates(shapely.segmentize(shapely.LineString(points), 0.02))
