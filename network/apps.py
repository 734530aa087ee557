"""The network app and the staff site."""

from django.apps import AppConfig, apps
from django.contrib.admin.apps import AdminConfig
from django.db.models.signals import post_migrate
from django.utils.translation import gettext_lazy as _


class NetworkConfig(AppConfig):
    """The books of a network of river-gauging stations."""

    name = "network"
    verbose_name = _("Network")

    def ready(self) -> None:
        """Register the system checks and the one signal: role groups follow their table."""
        from network import checks  # noqa: F401  (registers itself; needs loaded apps)
        from network.services.roles import ensure_roles

        # Auth comes after our two apps, so that their permissions exist by then.
        post_migrate.connect(ensure_roles, sender=apps.get_app_config("auth"))


class StaffSiteConfig(AdminConfig):
    """The Django admin, with the agency's own site as its default."""

    default_site = "network.admin.site.StaffSite"

    def ready(self) -> None:
        """Let the site come first, then the books, which register with it."""
        super().ready()
        from network.admin import books  # noqa: F401  (needs the finished site)
