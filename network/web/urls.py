"""Addresses of the network's own pages."""

from django.urls import path

from network.web.files import stored_file

app_name = "network"
urlpatterns = [
    path("media/<path:name>", stored_file, name="file"),
]
