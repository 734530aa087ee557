"""Turn a database's refusal into the sentence of the constraint that refused."""

import re
from collections.abc import Iterator

from django.apps import apps
from django.db import IntegrityError, models
from django.utils.translation import gettext as _


def sentence_for(error: IntegrityError) -> str:
    """Return the constraint's own sentence for an integrity error of either database.

    PostgreSQL names the constraint. SQLite names it for CHECK and only the columns for UNIQUE.
    """
    text = str(error)
    for model in apps.get_models():
        for constraint in _constraints(model):
            if re.search(rf"\b{re.escape(constraint.name)}\b", text):
                return str(constraint.violation_error_message)
    for model in apps.get_models():
        for constraint in _constraints(model):
            if _columns_match(text, model, constraint):
                return str(constraint.violation_error_message)
    if "foreign key" in text.lower():
        return _("A row that is referred to does not exist or is still needed by another.")
    if "not null" in text.lower() or "null value" in text.lower():
        return _("A value that must be given is missing (%(detail)s).") % {"detail": text}
    return _("The database refused this: %(detail)s") % {"detail": text}


def _constraints(model: type[models.Model]) -> Iterator[models.BaseConstraint]:
    return iter(model._meta.constraints)


def _columns_match(text: str, model: type[models.Model], constraint: models.BaseConstraint) -> bool:
    """Tell whether SQLite's list of columns is this unique constraint's."""
    found = re.search(r"UNIQUE constraint failed: (.+)$", text)
    if found is None or not isinstance(constraint, models.UniqueConstraint):
        return False
    table = model._meta.db_table
    columns = [f"{table}.{model._meta.get_field(name).column}" for name in constraint.fields]
    return found.group(1).split(", ") == columns
