"""Lift of a sharp-edged section by straight panels of linear vorticity: another method than that under test.

Source: A. M. Kuethe and C.-Y. Chow, Foundations of Aerodynamics, 3rd edition, 1976, section 5.10 (velocity normal to the
panels at their middles, unknown strengths at their ends, Kutta condition as a nil sum at the edge). From memory.
The error falls with the number of panels; two numbers of panels are extrapolated to none (L. F. Richardson, 1911).
"""

import numpy as np


def lift(section, degrees, panels=(100, 200)) -> np.ndarray:
    """Lift coefficients at the incidences, extrapolated from the two numbers of panels."""
    coarse, fine = (np.array(with_panels(section, degrees, count)) for count in panels)
    order = 2
    return fine + (fine - coarse) / ((panels[1] / panels[0]) ** order - 1)


def with_panels(section, degrees, count):
    # Clockwise from the trailing edge: along the lower side, round the nose, back along the upper side.
    ends = section.outline(np.sin(np.linspace(np.pi / 2, -np.pi / 2, count + 1)))
    ends[-1] = ends[0]
    start, along = ends[:-1], np.diff(ends, axis=0)
    length = np.hypot(*along.T)
    tangent = along / length[:, None]
    normal = np.stack([-tangent[:, 1], tangent[:, 0]], axis=-1)
    middle = start + along / 2

    # Middle i in the axes of panel j.
    offset = middle[:, None] - start[None]
    x, y = (offset * tangent).sum(axis=-1), (offset * normal).sum(axis=-1)
    np.fill_diagonal(y, 0.0)
    log = 0.5 * np.log(((x - length) ** 2 + y**2) / (x**2 + y**2))
    angle = np.arctan2(y * length, x**2 + y**2 - x * length)
    np.fill_diagonal(angle, np.pi)
    # A strength that rises from nil at the panel's start to one at its end: velocity along and across the panel.
    rise = np.stack([(y * log + x * angle), (x * log + length - y * angle)]) / length / (2 * np.pi)
    even = np.stack([angle, log]) / (2 * np.pi)
    fall = even - rise

    def across(part):
        velocity = part[0][..., None] * tangent[None] + part[1][..., None] * normal[None]
        return (velocity * normal[:, None]).sum(axis=-1)

    matrix = np.zeros((count + 1, count + 1))
    matrix[:count, :count] += across(fall)
    matrix[:count, 1:] += across(rise)
    matrix[count, 0] = matrix[count, count] = 1
    lifts = []
    for alpha in np.radians(degrees):
        onset = np.array([np.cos(alpha), np.sin(alpha)])
        strength = np.linalg.solve(matrix, np.append(-normal @ onset, 0))
        # Positive strength turns clockwise, which lifts; for unit chord and onset the coefficient is twice the circulation.
        lifts.append(2 * ((strength[:-1] + strength[1:]) / 2 * length).sum())
    return lifts
