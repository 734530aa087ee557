"""Structures people trust their lives to."""

from django.contrib import admin

from network.admin.acting import RegistryAdmin
from network.admin.intervals import IntervalPages, interval_verb
from network.models import SafetyItem


@admin.register(SafetyItem)
class SafetyItemAdmin(IntervalPages, RegistryAdmin):
    """Safety items of stations."""

    verbs = (interval_verb(SafetyItem),)
    list_display = ("label", "station", "kind", "interval_months", "removed_on")
    list_filter = ("kind", "station")
    list_select_related = ("station",)
