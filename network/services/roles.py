"""The four roles and what each may do, in one table."""

from typing import Any

from django.apps import apps
from django.contrib.auth.models import Group, Permission

FIELD = "field"
RECORD_KEEPER = "record keeper"
MANAGER = "manager"
PUBLISHER = "publisher"

# role -> {model: actions}; every role may view everything of the two apps except people.
TABLE: dict[str, dict[str, str]] = {
    FIELD: {
        "visit": "add change",
        "levelcheck": "add change",
        "gauging": "add change",
        "document": "add change",
        "sitesurvey": "add change",
        "inspection": "add",
        "postponement": "add",
    },
    RECORD_KEEPER: {
        "visit": "add change",
        "levelcheck": "add change",
        "gauging": "add change",
        "document": "add change",
        "series": "add change",
        "mappingprofile": "add change",
        "loggerimport": "add change",
        "sensorsetting": "add change",
        "correction": "add change",
        "note": "add change",
        "infill": "add change",
        "typedflow": "add change",
        "dismissal": "add change",
        "recordreview": "add change",
        "curve": "add change",
        "ratingperiod": "add change",
        "shifttable": "add change",
        "stationzero": "add change",
        "platezero": "add change",
        "othergaugezero": "add change",
        "benchmarkelevation": "add change",
        "deployment": "add change",
        "postponement": "add",
    },
    MANAGER: {
        "agency": "change",
        "workingrules": "change",
        "kindinterval": "add change",
        "office": "add change",
        "person": "view add change",
        "station": "add change",
        "operationperiod": "add change",
        "staffplate": "add change",
        "othergauge": "add change",
        "benchmark": "add change",
        "instrument": "add change",
        "meterpair": "add change",
        "metergroup": "add change",
        "calibration": "add change",
        "deployment": "add change",
        "safetyitem": "add change",
        "inspection": "add change",
        "document": "add change",
        "sitesurvey": "add change",
        "round": "add change",
        "stop": "add change",
        "postponement": "add change",
        "feedlink": "add change",
        "mappingprofile": "add change",
        "series": "add change",
    },
    PUBLISHER: {"edition": "add change", "volume": "add change", "postponement": "add"},
}
PRIVATE = {"person", "feedlink", "historicalperson"}


def ensure_roles(**_signal: Any) -> None:
    """Make the four groups carry exactly the permissions of the table.

    Runs after every migrate: in a migration the permissions do not exist yet.
    """
    ours = Permission.objects.filter(content_type__app_label__in=["network", "reports"])
    by_codename = {permission.codename: permission for permission in ours}
    views = {
        permission
        for codename, permission in by_codename.items()
        if codename.startswith("view_") and codename.removeprefix("view_") not in PRIVATE
    }
    for role, rows in TABLE.items():
        wanted = views | {
            by_codename[f"{action}_{model}"]
            for model, actions in rows.items()
            for action in actions.split()
            if f"{action}_{model}" in by_codename
        }
        group, _made = Group.objects.get_or_create(name=role)
        group.permissions.set(wanted)


def every_named_model_exists() -> list[str]:
    """Return the models the table names that no app has (none, by test)."""
    known = {
        model._meta.model_name
        for label in ("network", "reports")
        for model in apps.get_app_config(label).get_models()
    }
    return sorted({model for rows in TABLE.values() for model in rows} - known)
