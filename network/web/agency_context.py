"""What every page knows: the agency and its clock."""

from typing import Any

from django.http import HttpRequest

from network.queries import clock


def agency(request: HttpRequest) -> dict[str, Any]:
    """Return the agency and the name of its record clock."""
    own = getattr(request, "agency", None) or clock.agency()
    return {"agency": own, "record_clock": clock.record_clock(own)}
