"""Acts upon calendar links: made with a secret that is shown once, and withdrawn."""

import secrets
from datetime import datetime

from django.utils.translation import gettext as _

from network.models import FeedLink, Office, Person
from network.queries.feeds import digest_of
from network.services.acts import Refusal, open_act

SECRET_BYTES = 32


def make_link(
    *, by: Person, at: datetime, person: Person | None = None, office: Office | None = None
) -> tuple[FeedLink, str]:
    """Make the calendar link of a person or of an office; return it with its secret.

    Only the hash of the secret is kept: whoever loses it makes a new link.
    """
    if (person is None) == (office is None):
        raise Refusal(_("A calendar link is for one person or for one office."), field="office")
    secret = secrets.token_urlsafe(SECRET_BYTES)
    with open_act(_("made a calendar link"), by=by, at=at):
        link = FeedLink.objects.create(
            person=person, office=office, secret_sha256=digest_of(secret),
            recorded_at=at, recorded_by=by,
        )  # fmt: skip
    return link, secret


def withdraw_link(*, link: FeedLink, by: Person, at: datetime, reason: str = "") -> None:
    """Withdraw a calendar link: its address opens nothing from now on."""
    why = reason.strip() or _("not needed any more")
    with open_act(_("withdrew a calendar link"), by=by, at=at, reason=why):
        row = FeedLink.objects.select_for_update().get(pk=link.pk)
        if not row.stands:
            raise Refusal(_("This link is withdrawn already."))
        row.withdrawn_at, row.withdrawn_by, row.withdrawn_reason = at, by, why
        row.save()
