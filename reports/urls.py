"""Addresses of the public library."""

from django.urls import path

from reports import views
from reports.field_sheets.views import field_sheets
from reports.network_figures.views import network_figures
from reports.rating_table import rating_table_file

app_name = "reports"
urlpatterns = [
    path("rounds/<int:pk>/field-sheets.pdf", field_sheets, name="field_sheets"),
    path("network-figures/", network_figures, name="network_figures"),
    path("network-figures.<str:ending>", network_figures, name="network_figures_file"),
    path("ratings/<int:pk>/table.pdf", rating_table_file, name="rating_table"),
    path("", views.library, name="library"),
    path("yearbooks/<int:pk>.pdf", views.yearbook_file, {"ending": "pdf"}, name="pdf"),
    path("yearbooks/<int:pk>.csv", views.yearbook_file, {"ending": "csv"}, name="csv"),
    path("volumes/<int:pk>.pdf", views.volume_file, name="volume"),
]
