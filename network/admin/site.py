"""The agency's own staff site."""

from django.contrib.admin import AdminSite
from django.utils.translation import gettext_lazy as _


class StaffSite(AdminSite):
    """The Django admin under the agency's name."""

    site_header = "Gaugewright"
    site_title = "Gaugewright"
    index_title = _("Work due")
    enable_nav_sidebar = False
