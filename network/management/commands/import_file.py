"""Import a logger file into a series: `manage.py import_file STATION SERIES PROFILE FILE`."""

from argparse import ArgumentParser
from pathlib import Path
from typing import Any

from django.core.management.base import BaseCommand, CommandError
from django.utils import timezone
from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.queries import people, series
from network.services import imports
from network.services.acts import Refusal

BAR = 30


class Command(BaseCommand):
    """Exit code 0: imported, or in the series already; 1: refused, in one sentence."""

    help = "Import a logger file into a series of a station."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """Name what goes where, and who does it."""
        parser.add_argument("station", help="code of the station")
        parser.add_argument("series", help="label of the series")
        parser.add_argument("profile", help="name of the mapping profile")
        parser.add_argument("path", type=Path, help="the logger's file")
        parser.add_argument("--by", required=True, metavar="LOGIN", help="who imports")
        parser.add_argument("--dry-run", action="store_true", help="read, list, write nothing")
        parser.add_argument(
            "--skip-faulty-rows", action="store_true", help="take the file without its faulty rows"
        )

    def handle(self, *args: Any, **options: Any) -> None:
        """Read the file, with a bar on a terminal, and say what came of it."""
        try:
            person = people.person_named(options["by"])
            into = {
                "series": series.series_named(options["station"], options["series"]),
                "profile": series.profile_named(options["profile"]),
                "at": timezone.now(),
                "progress": self._bar if self.stderr.isatty() else None,
            }
            with options["path"].open("rb") as file:
                if options["dry_run"]:
                    self._say(imports.dry_run(file=file, **into))
                    return
                row = imports.import_file(
                    file=file,
                    original_name=options["path"].name,
                    skip_faulty=options["skip_faulty_rows"],
                    by=person,
                    **into,
                )
        except imports.AlreadyImported as known:
            self.stdout.write(known.sentence)
        except (series.Unknown, Refusal, OSError) as error:
            raise CommandError(str(error)) from error
        else:
            self.stdout.write(
                _("Import %(number)d: %(kept)d readings kept, %(faulty)d rows skipped.")
                % {"number": row.pk, "kept": row.rows_kept, "faulty": row.rows_faulty}
            )

    def _bar(self, done: int, total: int | None) -> None:
        part = done / total if total else 0
        bar = ("#" * round(BAR * part)).ljust(BAR, ".")
        end = "\n" if done == total else ""
        self.stderr.write(f"\r{bar} {part:4.0%} {done / 1e6:.1f} MB", ending=end)

    def _say(self, preview: imports.Preview) -> None:
        for fault in preview.faults:
            self.stdout.write(
                _("line %(line)d: %(reason)s") % {"line": fault.line, "reason": fault.reason}
            )
        self.stdout.write(
            _(
                "%(read)d rows from %(first)s to %(last)s UTC: %(new)d readings new, "
                "%(changed)d changed, %(equal)d equal."
            )
            % {
                "read": preview.rows_read,
                "first": f"{preview.first_at:%Y-%m-%d %H:%M}",
                "last": f"{preview.last_at:%Y-%m-%d %H:%M}",
                "new": preview.rows_new,
                "changed": preview.rows_changed,
                "equal": preview.rows_equal,
            }
        )
        count = len(preview.months)
        self.stdout.write(
            ngettext("%(count)d month is touched.", "%(count)d months are touched.", count)
            % {"count": count}
        )
        if preview.already:
            self.stdout.write(_("This file is already in the series."))
