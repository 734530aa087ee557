"""What may never be false is refused by the database itself, with the constraint's own sentence."""

import uuid
from datetime import date, timedelta

import pytest
from django.apps import apps
from django.db import IntegrityError, models, transaction
from django.db.models import F

from network.models import Person
from network.models.violations import sentence_for
from tests.rows import START, a_row, model_named

pytestmark = [pytest.mark.django_db, pytest.mark.usefixtures("agency", "station", "manager")]

HOUR = timedelta(hours=1)
OURS = [model for model in apps.get_models() if model._meta.app_label in ("network", "reports")]
CONSTRAINTS = {each.name: (model, each) for model in OURS for each in model._meta.constraints}
ONCE = sorted(
    n for n, (_, each) in CONSTRAINTS.items() if isinstance(each, models.UniqueConstraint)
)
WITHDRAWALS = sorted(name for name in CONSTRAINTS if name.endswith("_withdrawal_whole"))

# One change of a good row that breaks this constraint and no other of its model.
BROKEN = {
    "network_agency_clock_in_range": {"record_utc_offset_minutes": 841},
    "network_agency_start_month": {"water_year_start_month": 13},
    "network_agency_day_start": {"day_starts_at_hour": 24},
    "network_calibration_one_owner": {"instrument": None},
    "network_calibrationpiece_rises": {"b_m": 0.0},
    "network_towrun_plausible": {"seconds": 0.0},
    "network_staffplate_range": {"highest_m": F("lowest_m")},
    "network_staffplate_step": {"step_m": 0.0},
    "network_staffplate_removed_after_installed": {"removed_at": F("installed_at")},
    "network_gauging_ends_after_start": {"ended_at": START - HOUR},
    "network_gauging_signed_has_result": {"state": "signed"},
    "network_gauging_check_whole": {"checked_at": START},
    "network_meterpair_two_parts": {"rotor": F("body")},
    "network_deployment_removed_after_installed": {"removed_at": F("installed_at")},
    "network_job_running_has_lease": {"state": "running"},
    "network_job_progress": {"steps_done": F("steps_total") + 1},
    "network_sight_names_its_point": {"point": "plate"},
    "network_round_in_order": {"last_day": date(2024, 2, 1)},
    "network_curve_range_of_use": {"highest_use_m": F("lowest_use_m")},
    "network_curve_extrapolation_outside": {"extrapolate_high_m": F("highest_use_m")},
    "network_curve_approval_whole": {"state": "approved"},
    "network_curvesegment_rises": {"c": 0.0},
    "network_curvepoint_not_negative": {"flow_m3s": -0.001},
    "network_curvegauging_reason_when_left_out": {"is_used": False, "left_out_because": ""},
    "network_correction_ends_after_start": {"end_at": F("start_at")},
    "network_correction_acceptance_whole": {"state": "accepted"},
    "network_note_ends_after_start": {"end_at": F("start_at")},
    "network_note_ice_is_not_open_water": {"cause": "ice", "flows": "stand"},
    "network_note_uncertainty_positive": {"uncertainty_percent": 0.0},
    "network_infill_uncertainty_positive": {"uncertainty_percent": 0.0},
    "network_infill_in_order": {"last_day": date(2024, 2, 1)},
    "network_infill_names_its_source": {"method": "neighbour"},
    "network_typedflow_uncertainty_positive": {"uncertainty_percent": -1.0},
    "network_typedflow_not_negative": {"flow_m3s": -0.001},
    "network_vertical_depth_not_negative": {"depth_m": -0.1},
    "network_verticalpoint_in_depth": {"fraction": 1.1},
    "network_verticalpoint_counted_or_given": {"velocity_ms": 1.0, "revolutions": 20.0},
    "network_series_gap_limit": {"gap_limit_minutes": 0},
    "network_mappingprofile_clock_whole": {"clock": "civil", "civil_zone": ""},
    "network_loggerimport_in_order": {"last_at": START - HOUR},
    "network_block_month_starts": {"month": date(2024, 3, 2)},
    "network_station_on_earth": {"latitude_deg": 90.1},
    "network_station_catchment_positive": {"catchment_km2": 0.0},
    "network_operationperiod_closed_after_opened": {"closed_on": date(2024, 2, 1)},
    "network_visit_departed_after_arrived": {"departed_at": START - HOUR},
    "network_visitreading_one_gauge": {"plate": None},
    "network_visitreading_value_when_read": {"reading_m": None},
    "network_visitreading_wave": {"wave_m": -0.01},
    "network_spintest_seconds": {"seconds": -1.0},
    "reports_edition_issue_whole": {"state": "issued"},
}

# What a row needs, beyond being good, to fall under a constraint that has a condition.
UNDER = {
    "network_calibration_start_once_pair": lambda: {
        "pair": a_row(model_named("MeterPair")),
        "instrument": None,
    },
    "network_calibration_start_once_group": lambda: {
        "group": a_row(model_named("MeterGroup")),
        "instrument": None,
    },
    "network_sight_position_once": lambda: {"point": "water"},
    "network_sight_names_its_point": lambda: {"point": "water"},
    "network_tracersample_position_once": lambda: {
        "injection": a_row(model_named("TracerInjection"), mass_kg=1.0)
    },
    "network_series_one_primary": lambda: {"is_primary": True},
    "reports_edition_one_issued": lambda: {
        "state": "issued",
        "issued_at": START,
        "issued_by": Person.objects.first(),
    },
}


def refusal(act):
    """Do what the database must refuse; return the sentence for the user."""
    with pytest.raises(IntegrityError) as caught, transaction.atomic():
        act()
    return sentence_for(caught.value)


def sentence_of(name):
    return str(CONSTRAINTS[name][1].violation_error_message)


def a_copy(row, *, unlike=()):
    """Return an unsaved copy of a row, with other values in those fields and in unique ones."""
    copy = type(row)(**{f.attname: getattr(row, f.attname) for f in row._meta.concrete_fields})
    copy.pk = None
    for field in row._meta.concrete_fields:
        if field.unique and isinstance(field, models.UUIDField):
            setattr(copy, field.attname, uuid.uuid4())
        elif field.name in unlike:
            setattr(copy, field.attname, _another(field, getattr(row, field.attname)))
    return copy


def _another(field, value):
    if value is None:
        return None
    if isinstance(field, models.CharField):
        return uuid.uuid4().hex[: field.max_length]
    return value + (HOUR if isinstance(field, models.DateTimeField) else 1)


@pytest.mark.parametrize("name", sorted(BROKEN))
def test_a_row_that_must_never_be_is_refused_by_the_constraint_s_own_sentence(name):
    model, _constraint = CONSTRAINTS[name]
    row = a_row(model, **UNDER.get(name, dict)())
    only_this = model._base_manager.filter(pk=row.pk)
    assert refusal(lambda: only_this.update(**BROKEN[name])) == sentence_of(name)


@pytest.mark.parametrize("name", WITHDRAWALS)
def test_nothing_is_withdrawn_without_instant_and_author(name):
    model, _constraint = CONSTRAINTS[name]
    row = a_row(model)
    only_this = model._base_manager.filter(pk=row.pk)
    assert refusal(lambda: only_this.update(withdrawn_reason="typed")) == sentence_of(name)


@pytest.mark.parametrize("name", ONCE)
def test_what_stands_once_stands_once_and_the_sentence_is_its_own(name):
    model, constraint = CONSTRAINTS[name]
    row = a_row(model, **UNDER.get(name, dict)())
    others = {
        field
        for each in model._meta.constraints
        if isinstance(each, models.UniqueConstraint)
        for field in each.fields
        if field not in constraint.fields
    }
    assert refusal(a_copy(row, unlike=others).save) == sentence_of(name)
