"""The NACA four- and five-digit sections, written down a second time from the reports.

Sources (constants from memory of them):
  E. N. Jacobs, K. E. Ward, R. M. Pinkerton, NACA Report 460, 1933: thickness form, four-digit mean lines,
    thickness laid off perpendicular to the mean line.
  E. N. Jacobs, R. M. Pinkerton, NACA Report 537, 1935 and E. N. Jacobs, R. M. Pinkerton, H. Greenberg,
    NACA Report 610, 1937: five-digit mean lines, constants m, k1 and k2/k1 for a design lift of 0.3.
  J. Stack, A. E. von Doenhoff, NACA Report 492, 1934: modified thickness form, its conditions and edge slopes.
The closed edge is no part of the reports: common practice changes the last coefficient until the sum is nil;
for the modified form the conditions are solved with no edge thickness.
"""

import numpy as np
from numpy.polynomial import Polynomial

SQUARE_ROOT_TERM = 0.2969 / 0.2
SERIES = {"published": [0.0, -0.1260, -0.3516, 0.2843, -0.1015], "closed": [0.0, -0.1260, -0.3516, 0.2843, -0.1036]}
EDGE_SLOPE = {2: 0.200, 3: 0.234, 4: 0.315, 5: 0.465, 6: 0.700}
PLAIN = {1: (0.0580, 361.4), 2: (0.1260, 51.64), 3: (0.2025, 15.957), 4: (0.2900, 6.643), 5: (0.3910, 3.230)}
REFLEXED = {
    2: (0.1300, 51.99, 0.000764), 3: (0.2170, 15.793, 0.00677), 4: (0.3180, 6.520, 0.0303), 5: (0.4410, 3.191, 0.1355),
}


class Section:
    """A section at unit chord. Its parameter r runs from -1 (upper trailing edge) through the nose to 1."""

    def __init__(self, designation: str, trailing_edge: str = "published"):
        name = designation.upper().removeprefix("NACA").strip()
        digits, _, modifier = name.partition("-")
        self.name = f"NACA {name}"
        self.thickness = int(digits[-2:]) / 100
        plain = Polynomial(np.array(SERIES[trailing_edge]) / 0.2)
        # Where the thickness form changes, the coefficient of the square root, and the polynomials on both sides.
        self.thickest, self.root_term, self.fore, self.aft = (
            modified(int(modifier[0]), int(modifier[1]), trailing_edge) if modifier else (2.0, SQUARE_ROOT_TERM, plain, plain)
        )
        self.joint, self.front, self.rear = four_digit(digits) if len(digits) == 4 else five_digit(digits)

    def mean(self, x):
        return self._piecewise(x, self.front, self.rear)

    def slope(self, x):
        return self._piecewise(x, self.front.deriv(), self.rear.deriv())

    def bend(self, x):
        return self._piecewise(x, self.front.deriv(2), self.rear.deriv(2))

    def _piecewise(self, x, front, rear):
        return np.where(np.asarray(x) < self.joint, front(x), rear(x))

    def half_thickness(self, x):
        x = np.asarray(x)
        return self.thickness * np.where(x < self.thickest, self.root_term * np.sqrt(x) + self.fore(x), self.aft(x))

    def half_thickness_slope(self, x):
        x = np.asarray(x)
        fore = 0.5 * self.root_term / np.sqrt(x) + self.fore.deriv()(x)
        return self.thickness * np.where(x < self.thickest, fore, self.aft.deriv()(x))

    def outline(self, r):
        r = np.asarray(r, dtype=float)
        x = r * r
        offset = -np.sign(r) * self.half_thickness(x)
        angle = np.arctan(self.slope(x))
        return np.stack([x - offset * np.sin(angle), self.mean(x) + offset * np.cos(angle)], axis=-1)


def modified(nose: int, tenths: int, trailing_edge: str):
    """Report 492's conditions, put up as linear equations and solved: half thickness 0.5 and level at the joint from both
    sides, equal curvature there; edge and edge slope given behind it, the nose ahead of it."""
    m = tenths / 10
    root = SQUARE_ROOT_TERM * (3**0.5 if nose == 9 else nose / 6)
    edge = 0.01 if trailing_edge == "published" else 0.0
    slope = -5 * EDGE_SLOPE[tenths]
    cubic = np.array([[1, m, m**2, m**3], [0, 1, 2 * m, 3 * m**2], [1, 1, 1, 1], [0, 1, 2, 3]])
    aft = Polynomial(np.linalg.solve(cubic, [0.5, 0, edge, slope]))
    front = np.array([[m, m**2, m**3], [1, 2 * m, 3 * m**2], [0, 2, 6 * m]])
    wanted = [0.5 - root * m**0.5, -0.5 * root * m**-0.5, aft.deriv(2)(m) + 0.25 * root * m**-1.5]
    return m, root, Polynomial([0, *np.linalg.solve(front, wanted)]), aft


def four_digit(digits: str):
    camber, position = int(digits[0]) / 100, int(digits[1]) / 10
    if camber == 0:
        return 1.0, Polynomial([0.0]), Polynomial([0.0])
    front = camber / position**2 * Polynomial([0, 2 * position, -1])
    rear = camber / (1 - position) ** 2 * Polynomial([1 - 2 * position, 2 * position, -1])
    return position, front, rear


def five_digit(digits: str):
    design_lift, position, reflexed = 0.15 * int(digits[0]), int(digits[1]), digits[2] == "1"
    x = Polynomial([0, 1])
    if reflexed:
        m, k1, ratio = REFLEXED[position]
        tail = ratio * (1 - m) ** 3 * x + m**3 * x - m**3
        front, rear = (x - m) ** 3 - tail, ratio * (x - m) ** 3 - tail
    else:
        m, k1 = PLAIN[position]
        front, rear = x**3 - 3 * m * x**2 + m**2 * (3 - m) * x, m**3 * (1 - x)
    scale = k1 / 6 * design_lift / 0.3
    return m, scale * front, scale * rear
