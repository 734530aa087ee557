"""Addresses of the public library."""

from django.urls import path

from reports import views

app_name = "reports"
urlpatterns = [
    path("", views.library, name="library"),
    path("yearbooks/<int:pk>.pdf", views.yearbook_file, {"ending": "pdf"}, name="pdf"),
    path("yearbooks/<int:pk>.csv", views.yearbook_file, {"ending": "csv"}, name="csv"),
    path("volumes/<int:pk>.pdf", views.volume_file, name="volume"),
]
