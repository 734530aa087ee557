"""Each role reaches what the table of roles gives it and nothing else, through every address."""

import pytest
from django.contrib import admin
from django.test import RequestFactory
from django.urls import reverse

from network.models import Person
from network.services.roles import FIELD, MANAGER, PRIVATE, PUBLISHER, RECORD_KEEPER, TABLE
from tests.people import make_person
from tests.rows import a_row

ROLES = [FIELD, RECORD_KEEPER, MANAGER, PUBLISHER]
OURS = sorted(
    (m for m in admin.site._registry if m._meta.app_label in {"network", "reports"}),
    key=lambda m: m.__name__,
)
pytestmark = pytest.mark.django_db


def test_the_site_holds_only_our_own_models():
    assert list(admin.site._registry) == [m for m in admin.site._registry if m in OURS]


def told(model, role):
    """Return the actions the table of roles gives a role on a model."""
    name = model._meta.model_name
    return set(TABLE[role].get(name, "").split()) | ({"view"} - ({"view"} & private(name)))


def private(name):
    return {"view"} if name in PRIVATE else set()


def address(model, view, *args):
    return reverse(f"admin:{model._meta.app_label}_{model._meta.model_name}_{view}", args=args)


def page_exists(model, action, row=None):
    """Tell whether the page is there at all: for one who has every permission."""
    request = RequestFactory().get("/")
    request.user = Person(is_superuser=True, is_active=True)
    model_admin = admin.site._registry[model]
    if action == "add":
        return model_admin.has_add_permission(request)
    return model_admin.has_change_permission(request, row)


def allowed(response):
    """Tell whether a page was given: seen, or led on to a row of its own."""
    return response.status_code == 200 or (
        response.status_code == 302 and not response.url.startswith(reverse("admin:login"))
    )


@pytest.fixture
def row(request, agency, office, station, field_person):
    return a_row(request.param)


@pytest.mark.parametrize("row", OURS, indirect=True, ids=lambda m: m.__name__)
def test_every_page_opens_for_those_the_table_names_and_for_nobody_else(client, row, office):
    model = type(row)
    for role in ROLES:
        person = Person.objects.filter(groups__name=role).first() or make_person(role)
        client.force_login(person)
        may = told(model, role)
        seen = {
            "changelist": allowed(client.get(address(model, "changelist"))),
            "change": allowed(client.get(address(model, "change", row.pk))),
            "history": allowed(client.get(address(model, "history", row.pk))),
            "add": allowed(client.get(address(model, "add"))),
            "save": client.post(address(model, "change", row.pk), {}).status_code != 403,
            "delete": allowed(client.get(address(model, "delete", row.pk))),
        }
        looks = "view" in may or "change" in may
        assert seen == {
            "changelist": looks,
            "change": looks,
            "history": looks,
            "add": "add" in may and page_exists(model, "add"),
            "save": "change" in may and page_exists(model, "change", row),
            "delete": False,
        }, role


VERBS = [(m, verb) for m in OURS for verb in getattr(admin.site._registry[m], "verbs", ())]


@pytest.mark.parametrize(
    ("row", "verb"), VERBS, indirect=["row"], ids=[f"{m.__name__}-{v.name}" for m, v in VERBS]
)
def test_every_act_page_asks_for_its_permission(client, row, verb):
    for role in ROLES:
        person = Person.objects.filter(groups__name=role).first() or make_person(role)
        client.force_login(person)
        response = client.get(address(type(row), verb.name, row.pk))
        assert allowed(response) == person.has_perm(verb.permission), role


@pytest.mark.parametrize("row", OURS, indirect=True, ids=lambda m: m.__name__)
def test_nobody_enters_without_logging_in(client, row):
    pages = [("changelist",), ("add",), ("change", row.pk), ("history", row.pk)]
    for view, *args in pages:
        response = client.get(address(type(row), view, *args))
        assert response.status_code == 302
        assert response.url.startswith(reverse("admin:login"))


def test_a_person_without_a_role_sees_no_books(client, office, agency):
    client.force_login(make_person("guest", office=office))
    assert client.get(reverse("admin:index")).status_code == 200
    assert client.get(reverse("admin:network_station_changelist")).status_code == 403


def test_a_deactivated_person_is_out(client, field_person):
    client.force_login(field_person)
    Person.objects.filter(pk=field_person.pk).update(is_active=False)
    assert client.get(reverse("admin:index")).status_code == 302
