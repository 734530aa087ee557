"""From a line of the work list to the page that does it, for those who may."""

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Any
from urllib.parse import urlencode

from django.urls import NoReverseMatch, reverse
from django.utils.translation import gettext_lazy as _

from network.models import Person
from network.queries.work_due.items import Kind
from network.queries.work_due.work_list import Line, Unfinished


@dataclass(frozen=True)
class Way:
    """A page that does the work: its label, address and permission, and what it is told.

    told: parameters of the address, from names of a line; with `of_row` the key is in the path.
    """

    label: Any
    page: str
    permission: str
    told: tuple[tuple[str, str], ...] = (("station", "station"),)
    of_row: bool = False


WAYS = {
    Kind.SAFETY: Way(
        _("Record inspection"), "network_inspection_add", "network.add_inspection",
        told=(("item", "key"),),
    ),
    Kind.SILENCE: Way(
        _("Import data"), "network_loggerimport_add", "network.add_loggerimport",
        told=(("series", "key"),),
    ),
    Kind.VISIT: Way(_("Start visit"), "network_visit_add", "network.add_visit"),
    Kind.GAUGING: Way(_("Start gauging"), "network_gauging_add", "network.add_gauging"),
    Kind.LEVELS: Way(_("Start level check"), "network_levelcheck_add", "network.add_levelcheck"),
    Kind.CALIBRATION: Way(
        _("Enter calibration"), "network_calibration_add", "network.add_calibration",
        told=(("pair", "key"),),
    ),
    Kind.INSTRUMENT: Way(
        _("Enter calibration"), "network_calibration_add", "network.add_calibration",
        told=(("instrument", "key"),),
    ),
    Kind.DOUBT: Way(_("Draft a rating"), "network_curve_add", "network.add_curve"),
    Kind.REVIEW: Way(_("Review record"), "network_recordreview_add", "network.add_recordreview"),
    Kind.VISIT_OPEN: Way(
        _("Check visit"), "network_visit_change", "network.change_visit", of_row=True
    ),
    Kind.GAUGING_OPEN: Way(
        _("Check gauging"), "network_gauging_change", "network.change_gauging", of_row=True
    ),
    Kind.LEVELS_OPEN: Way(
        _("Check levels"), "network_levelcheck_change", "network.change_levelcheck", of_row=True
    ),
    Kind.LEFT: Way(_("Mark as done"), "work_left_done", "network.change_visit", of_row=True),
}  # fmt: skip


@dataclass(frozen=True)
class ShownLine:
    """A line with the addresses this person may follow, empty where they may not."""

    line: Line
    act_label: Any
    act_url: str
    place_url: str
    postpone_url: str
    bring_back_url: str


def shown(lines: Iterable[Line], *, person: Person) -> list[ShownLine]:
    """Return lines with their links for a person."""
    return [_shown(line, person=person) for line in lines]


def draft_address(row: Unfinished) -> str:
    """Return the page of a draft."""
    return _address(WAYS[row.kind].page, row.key)


def _shown(line: Line, *, person: Person) -> ShownLine:
    way = WAYS[line.kind]
    put_off, postpone, bring_back = line.postponed, "", ""
    if put_off is None and person.has_perm("network.add_postponement"):
        told = {"kind": line.kind.value, "key": line.key, "station": line.station or ""}
        postpone = _address("work_postpone") + "?" + urlencode(told)
    if put_off is not None and person.has_perm("network.change_postponement"):
        bring_back = _address("network_postponement_withdraw", put_off.pk)
    return ShownLine(
        line=line,
        act_label=way.label,
        act_url=_act_address(way, line) if person.has_perm(way.permission) else "",
        place_url=_place_address(line),
        postpone_url=postpone,
        bring_back_url=bring_back,
    )


def _act_address(way: Way, line: Line) -> str:
    if way.of_row:
        return _address(way.page, line.key)
    told = urlencode({name: getattr(line, of) for name, of in way.told})
    address = _address(way.page)
    return f"{address}?{told}" if address else ""


def _place_address(line: Line) -> str:
    if line.station is not None:
        return _address("network_station_change", line.station)
    page = "meterpair" if line.kind == Kind.CALIBRATION else "instrument"
    return _address(f"network_{page}_change", line.key)


def _address(page: str, *keys: object) -> str:
    """Return the address of a staff page, empty where the site does not have it."""
    try:
        return reverse(f"admin:{page}", args=keys)
    except NoReverseMatch:
        return ""
