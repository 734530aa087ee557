"""Addresses of the network's own pages."""

from django.urls import path

from network.web.feed import calendar_feed
from network.web.files import stored_file

app_name = "network"
urlpatterns = [
    path("calendar/<str:secret>.ics", calendar_feed, name="calendar"),
    path("media/<path:name>", stored_file, name="file"),
]
