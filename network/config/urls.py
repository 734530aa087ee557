"""Addresses of the site: staff pages, the network's own pages, the public library."""

from django.contrib import admin
from django.urls import include, path

urlpatterns = [
    path("staff/", admin.site.urls),
    path("", include("network.web.urls")),
    path("", include("reports.urls")),
]
