"""Activate the record clock for every request."""

from collections.abc import Callable

from django.http import HttpRequest, HttpResponse
from django.utils import timezone

from network.queries import clock


class RecordClockMiddleware:
    """Show and read times on the record clock; a fixed offset, which not every name table has.

    The agency stays with the request, so that no page asks for it again.
    """

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponse]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponse:
        request.agency = clock.agency()
        with timezone.override(clock.record_clock(request.agency)):
            return self.get_response(request)
