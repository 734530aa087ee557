"""Serve stored files to logged-in staff: photographs, documents, certificates, logger files."""

import mimetypes
from pathlib import PurePosixPath

from django.contrib.admin.views.decorators import staff_member_required
from django.core.exceptions import SuspiciousFileOperation
from django.core.files.storage import default_storage
from django.http import FileResponse, Http404, HttpRequest
from django.utils.translation import gettext as _
from django.views.decorators.cache import cache_control
from django.views.decorators.http import require_safe

# Shown in the browser; everything else is handed over as a download, so that a page or a drawing
# with a script in it never runs under the site's own address.
SHOWN = {"image/jpeg", "image/png", "image/webp", "image/gif", "application/pdf"}


@require_safe
@staff_member_required(login_url="admin:login")
@cache_control(private=True, max_age=3600)
def stored_file(request: HttpRequest, name: str) -> FileResponse:
    """Return one stored file. Raises Http404 where there is none, or outside the folder."""
    try:
        file = default_storage.open(name)
    except (FileNotFoundError, IsADirectoryError, SuspiciousFileOperation, ValueError):
        raise Http404(_("There is no such file.")) from None
    kind = mimetypes.guess_type(name)[0] or "application/octet-stream"
    response = FileResponse(
        file,
        content_type=kind,
        as_attachment=kind not in SHOWN,
        filename=PurePosixPath(name).name,
    )
    response.headers["X-Content-Type-Options"] = "nosniff"
    response.headers["Content-Security-Policy"] = "default-src 'none'; frame-ancestors 'none'"
    return response
