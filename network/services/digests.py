"""Mail people what is due: what is new since the last mail, and what is late."""

from datetime import datetime

from django.conf import settings
from django.core.mail import EmailMultiAlternatives, get_connection
from django.template.loader import render_to_string
from django.utils.translation import gettext as _

from network.queries import clock
from network.queries.digest import Digest, digests


def send(*, at: datetime, days: int) -> int:
    """Mail every digest over one connection; return how many people were written to."""
    messages = [message(digest) for digest in digests(at, days=days)]
    if messages:
        get_connection().send_messages(messages)
    return len(messages)


def message(digest: Digest) -> EmailMultiAlternatives:
    """Return the mail of a digest, in plain text with the same in HTML."""
    context = {"digest": digest, "agency": clock.agency(), "site": settings.SITE_URL}
    said = {
        "new": len(digest.new),
        "late": len(digest.late) + digest.left_off,
        "day": digest.today.isoformat(),
    }
    mail = EmailMultiAlternatives(
        subject=_("Work due on %(day)s: %(new)d new, %(late)d late") % said,
        body=render_to_string("network/digest.txt", context),
        to=[digest.person.email],
    )
    mail.attach_alternative(render_to_string("network/digest.html", context), "text/html")
    return mail
