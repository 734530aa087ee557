"""Structures people trust their lives to."""

from django.contrib import admin

from network.admin.acting import RegistryAdmin
from network.models import SafetyItem


@admin.register(SafetyItem)
class SafetyItemAdmin(RegistryAdmin):
    """Safety items of stations."""

    list_display = ("label", "station", "kind", "interval_months", "removed_on")
    list_filter = ("kind", "station")
    list_select_related = ("station",)
