"""Send a strict Content-Security-Policy with every page."""

from collections.abc import Callable

from django.conf import settings
from django.http import HttpRequest, HttpResponse

HEADER = "Content-Security-Policy"


class ContentSecurityPolicyMiddleware:
    """Set the policy of SECURE_CSP; a view may widen one directive in `response.csp_extra`."""

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponse]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponse:
        response = self.get_response(request)
        extra = getattr(response, "csp_extra", {})
        policy = {
            name: [*values, *extra.get(name, [])] for name, values in settings.SECURE_CSP.items()
        }
        response.headers.setdefault(
            HEADER, "; ".join(f"{name} {' '.join(values)}" for name, values in policy.items())
        )
        return response
