"""The reports app."""

from django.apps import AppConfig
from django.utils.translation import gettext_lazy as _


class ReportsConfig(AppConfig):
    """Yearbooks: compiled, issued, superseded, bound."""

    name = "reports"
    verbose_name = _("Yearbooks")
