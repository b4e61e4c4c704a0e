"""What flows, and how warm it is: viscosity at every part, from the mobile phase or as entered."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from xcol.flowpath.file_keys import VISCOSITIES
from xcol.liquids.estimate import Estimate, as_entered
from xcol.liquids.mobile_phase import FAR, MobilePhase
from xcol.liquids.viscosity import ROOM
from xcol.units import TEMPERATURE, VISCOSITY, UnitError, write

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.errors import Place
    from xcol.flowpath.composition import Composition
    from xcol.flowpath.findings import Draft, Findings
    from xcol.flowpath.model import Part

_DENSITY = 1000.0  # kg/m³, where no mobile phase is entered: for Reynolds and Dean numbers


@dataclass(frozen=True)
class Conditions:
    """The liquid and its temperatures [K]: of the file, of what stands outside the oven, of the columns.

    ``entered`` is the viscosity that the file gives [Pa s], taken at every temperature; ``of_columns`` the
    one temperature that the columns themselves give (None: they have that of the file).
    """

    phase: MobilePhase | None
    entered: float | None
    temperature: float | None
    ambient: float | None
    of_columns: float | None = None

    @property
    def known(self) -> float | None:
        """Temperature of the columns, None where nobody entered any."""
        return self.of_columns if self.of_columns is not None else self.temperature

    @property
    def reference(self) -> float:
        """Temperature of the columns, for which diffusion coefficients are stated; 25 °C where nobody says."""
        return self.known if self.known is not None else ROOM

    @property
    def viscosity(self) -> Estimate | None:
        """Viscosity at the columns' temperature."""
        return self.viscosity_at(self.known)

    def viscosity_at(self, temperature: float | None) -> Estimate | None:
        """Viscosity [Pa s] at a temperature [K], None where nothing is known of it."""
        if self.entered is not None:
            return as_entered(self.entered)
        if self.phase is None or temperature is None:
            return None
        return self.phase.viscosity(temperature)

    def with_columns(self, parts: Iterable[Part]) -> Conditions:
        """Return the conditions with the one temperature that all columns give, where they do."""
        own = {part.temperature for part in parts if part.kind == "column"}
        return replace(self, of_columns=own.pop() if len(own) == 1 else None)

    def applied_to(self, part: Part) -> Part:
        """Return the part with its temperature, the viscosity there, and what D changes by."""
        temperature = self._temperature_of(part)
        here, at_columns = self.viscosity_at(temperature), self.viscosity
        mobility = 1.0
        if self.entered is None and here and at_columns and temperature is not None:
            mobility = (temperature / here.value) / (self.reference / at_columns.value)
        return replace(part, temperature=temperature, viscosity=here, mobility=mobility)

    def _temperature_of(self, part: Part) -> float | None:
        """Temperature of a part: its own, or that of the oven or of the room around it."""
        if part.temperature is not None:
            return part.temperature
        return self.temperature if part.kind == "column" or self.ambient is None else self.ambient


def read_conditions(top: Draft, has_column: bool) -> Conditions:
    """Return the conditions that the file's own keys describe; faults and assumptions go to its findings."""
    composition = composition_of(top)
    phase = composition.phase if composition else None
    entered, temperature, ambient = top.number("viscosity"), top.number("temperature"), top.number("ambient")
    if ambient is not None and not has_column:  # nothing is in the oven
        temperature = ambient
    elif temperature is None and ambient is not None:
        temperature = ambient
        top.findings.assume("columns at ambient", "no temperature entered: the columns have the ambient one")
    elif temperature is None and phase is not None:
        temperature = ROOM
        top.findings.assume("temperature 25 degC", "no temperature entered: 25 °C")
    if composition:
        _say_what_was_read(composition, entered, top)
    if ambient is not None and ambient != temperature and entered is None:
        top.findings.assume(
            "outside the oven: ambient",
            f"all parts but the columns have {degrees(ambient)}: the first centimetres behind a column are nearer to "
            "its own temperature",
        )
    conditions = Conditions(phase, entered, temperature, ambient)
    if phase is not None and entered is not None and temperature is not None:
        _compare(phase.viscosity(temperature), entered, top)
    return conditions


def composition_of(draft: Draft) -> Composition | None:
    """Read the key mobile_phase of a file or of a table; a fault goes to the findings."""
    text = draft.text("mobile_phase")
    if text is None:
        return None
    from xcol.flowpath.composition import read_composition  # a fiftieth of the program's time

    try:
        return read_composition(text, draft.catalogs)
    except UnitError as error:
        draft.findings.fault_of(draft.place("mobile_phase"), error)
        return None


def density_of(top: Draft, conditions: Conditions) -> float:
    """Return the density that was entered, that of the mobile phase, or an assumed one [kg/m³]."""
    entered = top.number("density")
    if entered is not None:
        return entered
    if conditions.phase is not None:
        return conditions.phase.density(conditions.reference)
    top.findings.assume("density 1000 kg/m3", "density 1000 kg/m³, for Reynolds and Dean numbers only")
    return _DENSITY


def check_range(phase: MobilePhase, temperature: float, place: Place, findings: Findings) -> bool:
    """Warn of a temperature outside the range of the liquids' data; far outside it is a fault.

    Returns whether the liquid can be computed there.
    """
    distance, solvent = phase.outside(temperature)
    low, high = (degrees(end) for end in solvent.span)
    if distance > FAR:
        findings.fault(
            place,
            f"{degrees(temperature)}, with {phase.name}",
            f"a temperature near {low} to {high}, for which the viscosity of {solvent.name} is known",
            'viscosity = "0.5 mPa s" as measured or looked up, and each peak\'s diffusion',
        )
        return False
    computed = phase.viscosity(temperature).value
    if not VISCOSITIES.low <= computed <= VISCOSITIES.high:
        findings.fault(
            place,
            f"{phase.name}, which the catalogs give {write(computed, 'mPa s', VISCOSITY)} at {degrees(temperature)}",
            "a liquid that flows",
            "check the rows of your own catalog, or enter viscosity",
        )
        return False
    if distance > 0:
        findings.warn(
            f"{degrees(temperature)} is outside {low} to {high}, where the viscosity of {solvent.name} was fitted: "
            "viscosity and diffusion are extrapolated"
        )
    mixture = phase.out_of_reach(temperature)
    if mixture is not None:
        low, high = (degrees(end) for end in mixture.span)
        uncertainty = phase.viscosity(temperature).uncertainty
        findings.assume(
            "viscosity extrapolated",
            f"{degrees(temperature)} is outside {low} to {high}, where the viscosity of {mixture.name} is known: "
            f"extrapolated, ±{100 * uncertainty:.0f} %",
        )
    return True


def say_what_was_left_out(composition: Composition, where: str, findings: Findings) -> None:
    """List what is dissolved and left out as assumed, and warn of what is doubtful about a mobile phase."""
    for remark in composition.left_out:
        findings.assume("additives left out", f"{where}: {remark}")
    for warning in composition.warnings:
        findings.warn(f"{where}: {warning}")


def _say_what_was_read(composition: Composition, entered: float | None, top: Draft) -> None:
    say_what_was_left_out(composition, "mobile phase", top.findings)
    phase = composition.phase
    if entered is None and (rule := phase.rule()):
        top.findings.assume("viscosity by a mixing rule", f"viscosity of {phase.name} by {rule}")
    if entered is None and (unmeasured := phase.unmeasured()):
        names = " and ".join(solvent.name for solvent in unmeasured)
        doubt = phase.mixing_doubt()
        if doubt > 0.1:
            shown = f"±{100 * doubt:.0f} %"
            top.findings.warn(f"no viscosity of {names} with water is known here: {shown}; enter it if you know it")


def _compare(computed: Estimate, entered: float, top: Draft) -> None:
    """Warn where an entered viscosity is not that of the mobile phase."""
    room = 1.3 * (1 + computed.uncertainty)
    if not 1 / room <= entered / computed.value <= room:
        top.findings.warn(
            f"viscosity {write(entered, 'mPa s', VISCOSITY)} was entered, and {computed.origin} should have "
            f"{write(computed.value, 'mPa s', VISCOSITY)}: the entered one is used"
        )


def degrees(temperature: float) -> str:
    """Return a temperature [K] as people read it, '25 °C'."""
    return write(temperature, "degC", TEMPERATURE, 4).replace("degC", "°C")
