"""Saving through the staff site: acts, refusals, versions, and nothing typed is lost."""

import uuid

import pytest
from django.contrib import admin
from django.urls import reverse

from network.admin.acting import SAVED_BY_ADMIN, RegistryAdmin, StaffAdmin
from network.models import (
    Act,
    Agency,
    Block,
    MappingProfile,
    OperationPeriod,
    Person,
    SiteSurvey,
    Station,
    WorkingRules,
)
from network.services import acts, registry
from tests.rows import a_row, model_named

pytestmark = pytest.mark.django_db


def form_of(client, address, **changes):
    """Return what a browser would send back from a page, with changes."""
    context = client.get(address).context
    form = context["adminform"].form
    sent = {}
    groups = [form, *_rows(context)]
    for one in groups:
        for bound in one:
            sent |= _as_sent(bound)
    return {**sent, **changes}


def _rows(context):
    for inline in context["inline_admin_formsets"]:
        yield inline.formset.management_form
        yield from inline.formset.forms


def _as_sent(bound):
    widget = bound.field.widget
    value = bound.value()
    if hasattr(widget, "widgets"):
        parts = widget.decompress(value)
        shown = [sub.format_value(part) for sub, part in zip(widget.widgets, parts, strict=True)]
        return {f"{bound.html_name}_{i}": text or "" for i, text in enumerate(shown)}
    if isinstance(value, bool):
        return {bound.html_name: "on"} if value else {}
    return {bound.html_name: "" if value is None else value}


def change_address(row):
    return reverse(f"admin:network_{row._meta.model_name}_change", args=[row.pk])


@pytest.fixture
def as_manager(client, agency, manager):
    client.force_login(manager)
    return client


def test_only_the_named_registry_rows_are_saved_by_the_admin():
    registry = {m for m, a in admin.site._registry.items() if isinstance(a, RegistryAdmin)}
    children = {i.model for a in admin.site._registry.values() for i in a.inlines}
    assert registry <= SAVED_BY_ADMIN
    assert registry | children >= SAVED_BY_ADMIN
    # Reports may not import the network's admin: its two pages save nothing and say so themselves.
    published = {m for m in admin.site._registry if m._meta.app_label == "reports"}
    others = [a for m, a in admin.site._registry.items() if m not in published]
    assert all(isinstance(model_admin, StaffAdmin) for model_admin in others)
    assert {m.__name__ for m in published} == {"Edition", "Volume"}


def test_a_saved_station_leaves_one_act_with_parent_and_children(as_manager, manager, station):
    address = change_address(station)
    sent = form_of(
        as_manager,
        address,
        name="Unterer Mühlsteg",
        **{
            "operation_periods-TOTAL_FORMS": 2,
            "operation_periods-1-station": station.pk,
            "operation_periods-1-opened_on": "2021-05-01",
        },
    )
    assert as_manager.post(address, sent).status_code == 302
    act = Act.objects.get()
    assert (act.done_by, act.station, act.verb) == (manager, station, "change station")
    assert station.history.first().act == act
    period = OperationPeriod.objects.get(opened_on="2021-05-01")
    assert period.history.first().act == act
    page = as_manager.get(reverse("admin:network_station_history", args=[station.pk]))
    entry = page.context["entries"][0]
    changes = {(c.name, f.label, f.old, f.new) for c in entry.rows for f in c.fields}
    assert ("station", "name", "Mühlsteg", "Unterer Mühlsteg") in changes
    assert ("period of operation", "opened", "–", "2021-05-01") in changes


def test_a_new_station_is_the_station_of_its_act(as_manager, office):
    address = reverse("admin:network_station_add")
    sent = form_of(
        as_manager,
        address,
        code="TE-020",
        name="Obersteg",
        river="Tessel",
        latitude_deg="47,51",
        longitude_deg="−13.2",
        office=office.pk,
    )
    assert as_manager.post(address, sent).status_code == 302
    made = Station.objects.get(code="TE-020")
    assert (made.latitude_deg, made.longitude_deg) == (47.51, -13.2)
    assert Act.objects.get().station == made


def test_a_number_that_is_none_is_named_and_kept(as_manager, station):
    address = change_address(station)
    page = as_manager.post(address, form_of(as_manager, address, catchment_km2="3,1,2"))
    assert page.status_code == 200
    error = page.context["adminform"].form.errors["catchment_km2"][0]
    assert error == "Catchment area, km²: “3,1,2” is not a number. Write it like 1.23 or 1,23."
    assert b'value="3,1,2"' in page.content


def test_only_fields_behind_figures_make_figures_stale(as_manager, station):
    address = change_address(station)
    as_manager.post(address, form_of(as_manager, address, access_notes="key in the office"))
    station.refresh_from_db()
    assert station.record_version == 1
    as_manager.post(address, form_of(as_manager, address, catchment_km2="313,5"))
    station.refresh_from_db()
    assert (station.record_version, station.catchment_km2) == (2, 313.5)


def test_the_second_of_two_people_is_told_and_loses_nothing(as_manager, station):
    address = change_address(station)
    mine = form_of(as_manager, address, name="My name")
    theirs = form_of(as_manager, address, river="Their river")
    assert as_manager.post(address, theirs).status_code == 302
    page = as_manager.post(address, mine)
    assert page.status_code == 200
    assert b"Someone else saved this meanwhile" in page.content
    assert b'value="My name"' in page.content
    station.refresh_from_db()
    assert (station.name, station.river) == ("Mühlsteg", "Their river")
    again = {**mine, "version": page.context["adminform"].form["version"].value()}
    assert as_manager.post(address, again).status_code == 302
    station.refresh_from_db()
    assert station.name == "My name"


def test_a_form_without_its_version_is_not_taken_for_the_latest(as_manager, station):
    address = change_address(station)
    page = as_manager.post(address, form_of(as_manager, address, version=""))
    assert b"Someone else saved this meanwhile" in page.content


def test_the_record_clock_stands_still_once_readings_exist(as_manager, agency, station):
    a_row(Block)
    address = change_address(agency)
    sent = form_of(as_manager, address, record_utc_offset_minutes="120", name="Neues Amt", logo="")
    page = as_manager.post(address, sent)
    assert page.status_code == 200
    form = page.context["adminform"].form
    assert form.errors["record_utc_offset_minutes"] == [
        "Readings are stored already: the record clock stays as it is."
    ]
    assert form["name"].value() == "Neues Amt"
    agency.refresh_from_db()
    assert (agency.name, agency.version) == ("Wasseramt Beispielland", 1)
    assert not Act.objects.exists()


def test_a_rule_behind_figures_makes_every_station_stale(as_manager, agency, station):
    address = change_address(agency)
    sent = form_of(as_manager, address, day_starts_at_hour="9", logo="")
    assert as_manager.post(address, sent).status_code == 302
    station.refresh_from_db()
    assert station.record_version == 2
    assert Agency.objects.get().day_starts_at_hour == 9


def test_a_zone_that_does_not_exist_is_refused_at_its_field(as_manager, agency):
    address = change_address(agency)
    page = as_manager.post(address, form_of(as_manager, address, civil_zone="Nowhere", logo=""))
    assert "civil_zone" in page.context["adminform"].form.errors


def test_working_rules_take_a_decimal_comma(as_manager):
    address = reverse("admin:network_workingrules_change", args=[1])
    sent = form_of(as_manager, address, level_closure_mm="1,2")
    assert as_manager.post(address, sent).status_code == 302
    assert WorkingRules.objects.get().level_closure_mm == 1.2


def test_a_taken_code_is_said_in_the_constraints_own_words(as_manager, station):
    address = reverse("admin:network_station_add")
    sent = form_of(
        as_manager,
        address,
        code=station.code,
        name="Again",
        river="Tessel",
        latitude_deg="47",
        longitude_deg="13",
        office=station.office_id,
    )
    page = as_manager.post(address, sent)
    assert b"There is already a station with this code." in page.content
    assert b'value="Again"' in page.content


def test_a_refusal_may_speak_of_one_row_of_the_children(as_manager, station, monkeypatch):
    refusal = acts.Refusal("Not on a Sunday.", field="operation_periods-0-opened_on")
    monkeypatch.setattr(registry, "keep", _refusing(refusal))
    address = change_address(station)
    page = as_manager.post(address, form_of(as_manager, address, name="Typed"))
    formset = page.context["inline_admin_formsets"][0].formset
    assert formset.forms[0].errors == {"opened_on": ["Not on a Sunday."]}
    assert b'value="Typed"' in page.content


def test_a_refusal_without_a_place_stands_on_top(as_manager, station, monkeypatch):
    monkeypatch.setattr(registry, "keep", _refusing(acts.Refusal("Not now.", field="elsewhere")))
    address = change_address(station)
    page = as_manager.post(address, form_of(as_manager, address))
    assert page.context["adminform"].form.non_field_errors() == ["Not now."]


def _refusing(refusal):
    def keep(_row, **_options):
        raise refusal

    return keep


def test_a_site_survey_says_who_made_it(client, agency, field_person, station):
    client.force_login(field_person)
    address = reverse("admin:network_sitesurvey_add")
    sent = form_of(client, address, station=station.pk, surveyed_on="2024-05-02")
    sent["criteria-0-verdict"] = "met"
    assert client.post(address, sent).status_code == 302
    survey = SiteSurvey.objects.get()
    assert survey.recorded_by == field_person
    assert [c.criterion for c in survey.criteria.all()] == ["straight"]
    assert Act.objects.get().station == station


def test_a_used_profile_can_be_looked_at_only(client, agency, record_keeper, station):
    client.force_login(record_keeper)
    used = a_row(model_named("LoggerImport")).profile
    assert client.post(change_address(used), {}).status_code == 403
    free = a_row(MappingProfile)
    sent = form_of(client, change_address(free), header_lines="3")
    assert client.post(change_address(free), sent).status_code == 302
    free.refresh_from_db()
    assert free.header_lines == 3


def test_a_new_person_gets_role_and_password_in_one_act(as_manager, office):
    address = reverse("admin:network_person_add")
    roles = as_manager.get(address).context["adminform"].form.fields["groups"].queryset
    sent = {
        "username": "newcomer",
        "usable_password": "true",
        "password1": "seven herons wading",
        "password2": "seven herons wading",
        "first_name": "Nele",
        "last_name": "Berg",
        "groups": [roles.get(name="field").pk],
        "form_id": uuid.uuid4(),
    }
    assert as_manager.post(address, sent).status_code == 302
    person = Person.objects.get(username="newcomer")
    assert person.is_staff
    assert person.check_password("seven herons wading")
    assert [group.name for group in person.groups.all()] == ["field"]
    assert Act.objects.get().verb == "give Nele Berg the roles field"


def test_nobody_gives_roles_to_themselves(as_manager, manager):
    page = as_manager.get(change_address(manager))
    assert "groups" not in page.context["adminform"].form.fields
    assert "is_superuser" not in page.context["adminform"].form.fields


def test_a_manager_cannot_touch_an_account_that_may_do_everything(as_manager):
    root = Person.objects.create_superuser("root", password="x")
    assert as_manager.post(change_address(root), {}).status_code == 403
    password = reverse("admin:auth_user_password_change", args=[root.pk])
    assert as_manager.get(password).status_code == 403


def test_a_new_password_leaves_an_act(as_manager, manager, field_person):
    sent = {"password1": "grey wagtail", "password2": "grey wagtail", "usable_password": "true"}
    address = reverse("admin:auth_user_password_change", args=[field_person.pk])
    assert as_manager.post(address, {**sent, "set-password": "1"}).status_code == 302
    field_person.refresh_from_db()
    assert field_person.check_password("grey wagtail")
    assert Act.objects.get().done_by == manager
