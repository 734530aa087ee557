"""Addresses of the network's own pages."""

from django.urls import URLPattern

app_name = "network"
urlpatterns: list[URLPattern] = []
