"""Sun on elements and openings: behind obstructions, under movable shading, through glass at an angle."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from heatledger.building.model import Building, Element, Opening
from heatledger.building.shading import OPEN, Obstruction, ShadingDevice
from heatledger.climate.model import Climate
from heatledger.climate.obstruction import Obstructions
from heatledger.climate.surfaces import Surfaces
from heatledger.results import Months
from heatledger.standards.en13363 import integrated_g_value
from heatledger.standards.iso13790 import ANGLE_FACTOR

__all__ = ["SurfaceSun", "device_reduction", "movable_shading", "sun_on_elements", "sun_on_openings"]

USUAL_PANES = 2
"""Panes of a glazed unit that does not state them, for its transmission at an angle. [-]"""


@dataclass(frozen=True)
class SurfaceSun:
    """Sun on one element or opening."""

    free: Months
    """Irradiation as if nothing stood before it. [kWh/m²]"""
    obstruction: Months
    """Factor of the obstruction; 1 without one. [-]"""
    angle: Months
    """Factor of sun through glass at an angle. [-]"""
    bright: Months
    """Share of the irradiation in hours above the threshold of its movable shading. [-]"""


@dataclass(frozen=True)
class _Surface:
    """What the climate has to know of a surface."""

    tilt: float
    azimuth: float
    size: tuple[float, float]
    obstruction: Obstruction | None
    threshold: float
    panes: int

    @property
    def plain(self) -> bool:
        """Whether the monthly irradiation of its plane says it all."""
        return self.obstruction is None and np.isinf(self.threshold) and not self.panes


def sun_on_elements(building: Building, elements: Sequence[Element], climate: Climate) -> list[SurfaceSun]:
    """Sun on the opaque part of elements that face outdoors; of an obstruction only the skyline counts.

    An element's width and height are not known, and its openings cut it up, so overhang, fins and reveal are left
    out: its own gains are a small part of those of its openings.
    """
    surfaces = [
        _Surface(element.tilt, element.azimuth or 0.0, (1.0, 1.0), _skyline_of(element.obstruction), np.inf, 0)
        for element in elements
    ]
    return _sun(surfaces, building.project.ground_reflectance, climate)


def sun_on_openings(
    building: Building, openings: Sequence[tuple[Element, Opening]], climate: Climate
) -> list[SurfaceSun]:
    """Sun on openings, each with the element it sits in."""
    surfaces = [_opening_surface(*pair, by_hour=building.project.glass_by_hour) for pair in openings]
    return _sun(surfaces, building.project.ground_reflectance, climate)


def _opening_surface(element: Element, opening: Opening, *, by_hour: bool) -> _Surface:
    threshold = opening.shading.threshold if opening.shading else None
    given = opening.glazed_unit.panes
    panes = (given.number if given else USUAL_PANES) if by_hour else 0
    size = (opening.width, opening.height)
    limit = np.inf if threshold is None else threshold
    return _Surface(element.tilt, element.azimuth or 0.0, size, opening.obstruction, limit, panes)


def _skyline_of(obstruction: Obstruction | None) -> Obstruction | None:
    """The far part of an obstruction; None if there is none."""
    if obstruction is None or not any(obstruction.skyline):
        return None
    return replace(OPEN, name=obstruction.name, skyline=obstruction.skyline, reflectance=obstruction.reflectance)


def _sun(surfaces: Sequence[_Surface], ground_reflectance: float, climate: Climate) -> list[SurfaceSun]:
    """Sun on every surface; equal ones are asked for once, plain ones without their hours."""
    distinct = list(dict.fromkeys(surfaces))
    plain = [surface for surface in distinct if surface.plain]
    others = [surface for surface in distinct if not surface.plain]
    found = dict(zip(plain, _plain_sun(plain, ground_reflectance, climate), strict=True))
    found |= zip(others, _followed_sun(others, ground_reflectance, climate), strict=True)
    return [found[surface] for surface in surfaces]


def _plain_sun(surfaces: Sequence[_Surface], ground_reflectance: float, climate: Climate) -> list[SurfaceSun]:
    if not surfaces:
        return []
    tilts, azimuths = np.array([(surface.tilt, surface.azimuth) for surface in surfaces]).T
    table = climate.irradiation(tilts, azimuths, ground_reflectance)
    return [SurfaceSun(free, np.ones(12), np.full(12, ANGLE_FACTOR), np.zeros(12)) for free in table]


def _followed_sun(surfaces: Sequence[_Surface], ground_reflectance: float, climate: Climate) -> list[SurfaceSun]:
    """Sun hour by hour; without sun in a month there is nothing to reduce."""
    if not surfaces:
        return []
    asked = Surfaces(
        np.array([surface.tilt for surface in surfaces]),
        np.array([surface.azimuth for surface in surfaces]),
        _stacked(surfaces),
        np.array([surface.threshold for surface in surfaces]),
        np.array([surface.panes for surface in surfaces]),
    )
    free, received, passed, bright = climate.sunlight(asked, ground_reflectance)
    obstruction, share = _ratio(received, free, 1.0), _ratio(bright, received, 0.0)
    angle = np.where(asked.panes[:, None] > 0, _ratio(passed, received, ANGLE_FACTOR), ANGLE_FACTOR)
    return [SurfaceSun(*months) for months in zip(free, obstruction, angle, share, strict=True)]


def _ratio(part: Months, whole: Months, otherwise: float) -> Months:
    return np.asarray(np.divide(part, whole, out=np.full(whole.shape, otherwise), where=whole > 0))


def _stacked(surfaces: Sequence[_Surface]) -> Obstructions:
    """What stands before the surfaces, field by field."""
    before = [surface.obstruction or OPEN for surface in surfaces]
    width, height = np.array([surface.size for surface in surfaces]).T
    skyline = np.array([obstruction.skyline for obstruction in before])
    others = {
        name: np.array([getattr(obstruction, name) for obstruction in before])
        for name in Obstructions._fields
        if name not in {"width", "height", "skyline"}
    }
    return Obstructions(width=width, height=height, skyline=skyline, **others)


def device_reduction(device: ShadingDevice, g_value: float, u_value: float) -> float:
    """g-value with the device drawn over g-value without.

    Parameters
    ----------
    device : ShadingDevice
        With its own figure, one of the table, or a fabric between the panes.
    g_value, u_value : float
        Of the opening. The U-value of the whole opening stands for that of the glass: for a fabric between the
        panes a difference of 1 W/(m²·K) moves the result by about 0.05. [-], [W/(m²·K)]
    """
    if device.reduction is not None:
        return device.reduction
    if device.fabric is None or g_value == 0:
        return 1.0
    shaded = integrated_g_value(g_value, u_value, device.fabric.transmittance, device.fabric.absorptance)
    return min(float(shaded) / g_value, 1.0)


def movable_shading(device: ShadingDevice | None, reduction: float, bright: Months) -> Months:
    """Factor of movable shading in the months in which it is used.

    Parameters
    ----------
    device : ShadingDevice or None
        When it is drawn.
    reduction : float
        g-value with the device drawn over g-value without. [-]
    bright : ndarray, shape (12,)
        Share of the irradiation in hours above its threshold. [-]

    Returns
    -------
    ndarray, shape (12,)
        [-]

    References
    ----------
    ISO 13790:2008, 11.4.3: [(1 − f)·g + f·g_sh]/g.
    """
    if device is None:
        return np.ones(12)
    drawn = np.ones(12) if device.threshold is None else bright
    used = np.array([month in device.months for month in range(1, 13)])
    return np.asarray(1 - np.where(used, drawn, 0.0) * (1 - reduction))
