"""Addresses of the yearbook desk and the public library."""

from django.urls import URLPattern

app_name = "reports"
urlpatterns: list[URLPattern] = []
