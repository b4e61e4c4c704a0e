"""The peaks of a path file: retention factor and diffusion coefficient of each."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.flowpath import slips
from xcol.flowpath.chain import dead_time, delays, transit
from xcol.flowpath.file_keys import PEAK_KEYS
from xcol.flowpath.findings import Draft, Findings
from xcol.flowpath.kinds.tolerances import say_of_plates
from xcol.flowpath.locate import KeyLines
from xcol.flowpath.model import Instrument, Peak
from xcol.flowpath.part_reader import read_keys, refuse_unknown
from xcol.flowpath.peak_diffusion import WAYS, is_given, peak_diffusion, typical
from xcol.liquids.estimate import Estimate, as_entered
from xcol.units import DIFFUSION, TIME, described, plain, write

if TYPE_CHECKING:
    from xcol.catalogs import Catalogs
    from xcol.flowpath.conditions import Conditions

DEFAULT_K = (1.0, 2.0, 5.0, 10.0)
_POSITIONS = ("k", "retention", "elution_volume")


def read_peaks(raw: object, file: str, lines: KeyLines, findings: Findings, catalogs: Catalogs) -> list[Draft]:
    """Read the entries of ``peaks`` (None: there are none) as drafts; faults go to the findings."""
    if raw is None:
        return []
    if not isinstance(raw, list):
        draft = Draft("peak", "", 1, file, lines.of(), findings)
        draft.fault("peaks", "a list, peaks = [ { k = 2 }, ... ]", "peaks = [ { k = 2 } ]", described(raw))
        return []
    drafts = []
    for index, entry in enumerate(raw):
        draft = Draft("peak", "", index + 1, file, lines.of("peaks", index), findings, catalogs)
        if not isinstance(entry, dict):
            draft.fault("", "a peak in braces, { k = 2 }", "put the peak in { }", described(entry))
            continue
        if isinstance(name := entry.get("name"), str):
            draft.name = plain(name)[:60]
        elif isinstance(solute := entry.get("solute"), str):
            draft.name = plain(solute)[:60]
        read_keys(entry, PEAK_KEYS.values(), draft)
        refuse_unknown(entry, PEAK_KEYS.values(), (), draft)
        drafts.append(draft)
    return drafts


def check_positions(drafts: list[Draft], has_column: bool) -> None:
    """Report peaks without exactly one of k, retention and elution_volume."""
    for draft in drafts:
        given = [key for key in _POSITIONS if key in draft.written]
        if not has_column:
            given += ["plates"] if "plates" in draft.written else []
        if not has_column and given:
            draft.fault(
                given[0],
                "a column in the path, since a peak's place is asked for",
                'add { column = "4.6 x 150 mm, 5 um", plates = 11000 }, or leave the key out '
                "(a union in place of the column)",
            )
        elif has_column and len(given) != 1 and (given or not draft.has_fault):
            read = " and ".join(given) if given else "none of them"
            draft.fault(
                given[-1] if given else "",
                "one of k, retention and elution_volume",
                "k = 2" if not given else "leave the others out",
                read,
            )


def check_diffusion(drafts: list[Draft], has_peaks: bool, top: Draft) -> None:
    """Report peaks of which nothing tells the diffusion coefficient, in a file that gives none for all of them.

    With a mobile phase something is assumed in its place.
    """
    if "diffusion" in top.written or "mobile_phase" in top.written:
        return
    expected = "the solute's diffusion coefficient, here or once at the top of the file"
    suggestion = (
        'diffusion = "1.0e-9 m^2/s" (small molecules in water: 0.5 to 1.5e-9), or mobile_phase = '
        '"acetonitrile/water 60:40" with the peak\'s solute or molar_mass'
    )
    if not has_peaks:
        top.fault("diffusion", expected, suggestion, "neither peaks nor a diffusion coefficient")
    for draft in drafts:
        if not set(WAYS) & set(draft.written):
            draft.fault("diffusion", expected, suggestion)


def estimates_of(drafts: list[Draft], top: Draft, conditions: Conditions) -> list[Estimate | None]:
    """Return the diffusion coefficient of each peak, or of the peaks that are assumed where there are none.

    The file's own ``diffusion`` serves the peaks that give none; without it something typical is assumed
    (``check_diffusion`` has seen to it that there is a mobile phase). None: faults were found.
    """
    value = top.number("diffusion")
    usual = as_entered(value) if value is not None else typical(conditions)
    if not drafts:
        if usual:
            _say(usual, "all peaks", top)
        return [usual]
    found = []
    for draft in drafts:
        estimate = peak_diffusion(draft, conditions) if is_given(draft) else usual
        if estimate:
            _say(estimate, f'peak "{draft.name}"' if draft.name else draft.label, top)
        found.append(estimate)
    return found


def _say(estimate: Estimate, whose: str, top: Draft) -> None:
    """List a coefficient that was not entered among what is assumed."""
    if not estimate.entered:
        shown = write(estimate.value, "m^2/s", DIFFUSION).replace("^2", "²")
        top.findings.assume("D estimated", f"{whose}: D = {shown}, {estimate.stated}", leads=True)


def peaks_of(
    drafts: list[Draft], instrument: Instrument, estimates: list[Estimate | None], findings: Findings
) -> tuple[Peak, ...]:
    """Return the peaks, those given by their recorded place with the transit taken off.

    ``estimates`` are their diffusion coefficients, one for each draft. Without drafts the peaks are
    k = 1, 2, 5, 10, or one unnamed band where there is no column.
    """
    has_column = any(part.kind == "column" for part in instrument.parts)
    if not drafts:
        estimate = estimates[0]
        if estimate is None:
            return ()
        if not has_column:
            return (Peak("band", None, estimate, instrument.place),)
        findings.assume("peaks k 1, 2, 5, 10", "no peaks entered: k = 1, 2, 5 and 10 are shown")
        return tuple(Peak(f"k = {k:g}", k, estimate, instrument.place) for k in DEFAULT_K)
    found = (_peak(draft, instrument, estimate) for draft, estimate in zip(drafts, estimates, strict=True) if estimate)
    return tuple(peak for peak in found if peak is not None)


def _peak(draft: Draft, instrument: Instrument, estimate: Estimate) -> Peak | None:
    if estimate.value < 1e-12:
        draft.warn(f"diffusion {estimate.value:.3g} m²/s is very slow: m^2/s or cm^2/s?")
    plates = draft.number("plates")
    if plates is not None and _too_many(draft, plates, instrument):
        return None
    retention = draft.number("retention")
    volume = draft.number("elution_volume")
    if volume is not None:
        retention = volume / instrument.flow
    k = draft.number("k")
    if retention is not None:
        k = _k_from(retention, draft, instrument, estimate)
        if k is None:
            return None
    if k is not None and k > 100:
        draft.warn(f"k = {k:.4g} is unusual: is the unit of its retention, or the void volume, meant?")
    if plates is not None:
        say_of_plates(draft)
    name = draft.name or (f"k = {k:.3g}" if k is not None else f"peak {draft.position}")
    return Peak(name, k, estimate, draft.place(), plates, retention)


def _k_from(retention: float, draft: Draft, instrument: Instrument, estimate: Estimate) -> float | None:
    """Return k from the recorded retention time: the mean delay outside the columns comes off."""
    first = instrument.detectors[0]
    delay, hold_up = transit(instrument, first, estimate), dead_time(instrument, first)
    key = "retention" if "retention" in draft.values else "elution_volume"
    if not hold_up:
        draft.fault(
            key,
            f"a column before the first detector, {first.label}, where retention is recorded",
            "k = 2, in its place",
        )
        return None
    k = (retention - delay) / hold_up - 1
    if k >= -1e-9:
        return max(k, 0.0)
    least = delay + hold_up
    expected = f"at least {write(least, 's', TIME, 4)} ({write(least, 'min', TIME, 4)})"
    if key == "elution_volume":
        expected = f"at least {least * instrument.flow * 1e6:.4g} mL"
    slowest = max(delays(instrument, first, estimate), key=lambda pair: pair[1])
    draft.fault(
        key,
        f"{expected}: {write(hold_up, 's', TIME)} of hold-up, and {write(delay, 's', TIME)} outside the column, "
        f"most of it in {slowest[0].label} ({write(slowest[1], 's', TIME)})",
        "check retention and flow, the column's void volume, and the size of that part; in size exclusion, enter "
        "void_volume as the peak's own elution volume, with k = 0",
    )
    return None


def _too_many(draft: Draft, plates: float, instrument: Instrument) -> bool:
    beds = instrument.beds
    if not beds or any(bed.particle is None for bed in beds):
        return False
    most = sum(bed.length / bed.particle for bed in beds if bed.particle)
    length = sum(bed.length for bed in beds)
    return slips.plates_fault(draft, "plates", plates, length, length / most)
