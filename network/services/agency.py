"""Change the agency and its working rules."""

from collections.abc import Mapping
from datetime import datetime
from typing import Any
from zoneinfo import available_timezones

from django.db import models
from django.utils.translation import gettext as _

from network.models import Agency, Block, Person, WorkingRules
from network.services import acts

# Fields behind published figures: changing one makes every cached year stale.
AGENCY_FIGURES = {
    "record_utc_offset_minutes",
    "day_starts_at_hour",
    "water_year_start_month",
    "water_year_named_by_end",
    "significant_figures",
    "max_decimals",
    "day_coverage_percent",
    "months_need_every_day",
    "result_method",
}
RULES_FIGURES = {"surface_factor", "systematic_percent", "stage_uncertainty_mm"}


def change_agency(
    *, values: Mapping[str, Any], version: int, by: Person, at: datetime, reason: str = ""
) -> Agency:
    """Change fields of the agency.

    The record clock stands still once readings exist: raises Refusal at its field. Raises Overtaken
    when someone else saved the agency since the form of `version` was opened.
    """
    with acts.open_act(_("change the agency"), by=by, at=at, reason=reason):
        agency = Agency.objects.select_for_update().get(pk=1)
        acts.claim_version(agency, version=version)
        changed = _fill(agency, values)
        if "record_utc_offset_minutes" in changed and Block.objects.exists():
            raise acts.Refusal(
                _("Readings are stored already: the record clock stays as it is."),
                field="record_utc_offset_minutes",
            )
        if agency.civil_zone not in available_timezones():
            raise acts.Refusal(
                _("“%(zone)s” is not the name of a time zone.") % {"zone": agency.civil_zone},
                field="civil_zone",
            )
        agency.save()
        if changed & AGENCY_FIGURES:
            acts.raise_every_record_version()
    return agency


def change_rules(
    *, values: Mapping[str, Any], by: Person, at: datetime, reason: str = ""
) -> WorkingRules:
    """Change the working rules; makes them when set-up has not."""
    with acts.open_act(_("change the working rules"), by=by, at=at, reason=reason):
        rules = WorkingRules.objects.select_for_update().filter(pk=1).first() or WorkingRules(pk=1)
        changed = _fill(rules, values)
        rules.save()
        if changed & RULES_FIGURES:
            acts.raise_every_record_version()
    return rules


def _fill(row: models.Model, values: Mapping[str, Any]) -> set[str]:
    """Set the given fields and return the names of those that changed."""
    changed = {name for name, value in values.items() if getattr(row, name) != value}
    for name in changed:
        setattr(row, name, values[name])
    return changed
