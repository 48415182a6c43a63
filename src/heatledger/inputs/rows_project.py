"""The sheet of what holds for the whole building."""

from __future__ import annotations

from typing import ClassVar, Literal

from heatledger.inputs.cells import reference
from heatledger.inputs.columns import SheetRow, choice, name_from, number, text

__all__ = ["ProjectRow"]


class ProjectRow(SheetRow):
    """What holds for the whole building; labels in column A, values in column B."""

    sheet: ClassVar[str] = "Project"
    purpose: ClassVar[str] = "What holds for the whole building. Fill in column B."
    unique: ClassVar[bool] = False
    required_sheet: ClassVar[bool] = True
    labelled: ClassVar[bool] = True

    project: str = text("Project", help="Name of the building or job, printed on every result page.", required=True)
    client: str = text("Client", help="Printed on the summary.")
    assessor: str = text("Assessor", help="Printed on the summary.")
    job_number: str = text("Job number", help="Printed on the summary.")
    address: str = text("Address", help="Printed on the summary.")
    weather: str = text(
        "Weather",
        help="A shipped climate of the list (heatledger weather list); or the path of an hourly file as seen from the "
        "folder of this workbook (EPW, TMY3, TMY2, PVGIS, NSRDB); or: monthly table, for sheet Monthly climate.",
        required=True,
    )
    altitude: float | None = number(
        "Altitude",
        unit="m",
        help="Of the building, above sea level. Thinner air carries less heat. Empty: altitude of the weather file; "
        "sea level with a monthly table.",
        default_note="altitude of the weather file",
        ge=-430,
        le=5500,
    )
    latitude: float | None = number(
        "Latitude",
        unit="°",
        help="North positive. Needed with a monthly table, else only to correct the weather file. Empty: as in the "
        "weather file.",
        default_note="latitude of the weather file",
        ge=-66,
        le=72,
    )
    longitude: float | None = number(
        "Longitude",
        unit="°",
        help="East positive. Only to correct what the weather file states. Empty: as in the weather file; with a "
        "monthly table, in the middle of the time zone.",
        default_note="longitude of the weather file",
        ge=-180,
        le=180,
    )
    time_zone: float | None = number(
        "Time zone",
        unit="h",
        help="Standard time ahead of UTC. Only to correct what the weather file states. Empty: as in the weather file; "
        "with a monthly table, by the longitude.",
        default_note="time zone of the weather file",
        ge=-12,
        le=14,
    )
    ground_reflectance: float = number(
        "Ground reflectance",
        unit="-",
        help="Share of the sunlight that the ground before the façades reflects. Grass or paving 0.2, snow 0.7.",
        default=0.2,
        default_note="common practice",
        ge=0,
        le=1,
    )
    site_exposure: Literal["open", "normal", "sheltered"] = choice(
        "Site exposure",
        help="To wind. Open: country or high-rise. Normal: suburb, trees around. Sheltered: city centre, forest.",
        default="normal",
        default_note="moderate shielding, ISO 13789:1999",
    )
    dimensions: Literal["internal", "overall internal", "external"] = choice(
        "Dimensions measured",
        help="How areas were taken. The linear transmittances must belong to the same kind of dimensions (ISO 14683).",
        default="external",
        default_note="common practice",
    )
    air_density: Literal["at site altitude", "sea level"] = choice(
        "Air density",
        help="At site altitude follows the pressure of the place; sea level keeps 1200 J/(m³·K) everywhere.",
        default="at site altitude",
        default_note="physics; some codes prescribe sea level",
    )
    glass_angle: Literal["by standard factor", "by hour"] = choice(
        "Angle of incidence",
        help="Sun through glass at an angle. By standard factor: 0.9 of the g-value. By hour: the angle of every hour "
        "(Karlsson and Roos 2000); needs hourly weather.",
        default="by standard factor",
        default_note="F_w = 0.9, ISO 13790:2008, 11.4.2",
    )
    design_inside: float = number(
        "Design inside temperature",
        unit="°C",
        help="For the temperatures inside the build-ups on sheet Build-up results; changes no need.",
        default=20.0,
        default_note="common practice",
        ge=5,
        le=35,
    )
    design_outside: float | None = number(
        "Design outside temperature",
        unit="°C",
        help="For the temperatures inside the build-ups. Empty: mean of the coldest month.",
        default_note="mean of the coldest month",
        ge=-60,
        le=30,
    )
    compared: str = name_from("Build-ups", "Compare build-up", help="Set side by side on sheet Build-up results.")
    compared_with: str = name_from("Build-ups", "With build-up", help="The second one of the comparison.")
    method: Literal["EN ISO 52016-1:2017", "ISO 13790:2008"] = choice(
        "Method",
        help="Monthly method. The newer edition leaves out the need of months with far too much gain or loss.",
        default="EN ISO 52016-1:2017",
        default_note="current edition",
    )

    def cell(self, field: str = "") -> str:
        """Value cell of a label; labels stand in column A, values in column B."""
        return reference(self._positions.get(field, 1), 2)
