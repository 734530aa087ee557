"""Import a logger file in two pages: upload it and see what it would change, then confirm.

Between the two the file stays on the disk under its hash, which is in the address; nothing is
kept in the session, and a page opened again shows the same.
"""

from typing import Any
from urllib.parse import urlencode

from django import forms
from django.conf import settings
from django.contrib import messages
from django.core.exceptions import PermissionDenied
from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.template.response import TemplateResponse
from django.urls import URLPattern, path, reverse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.models import MappingProfile, Series
from network.services import imports, originals
from network.services.acts import Refusal

FAULTS_SHOWN = 200


class SeriesChoice(forms.ModelChoiceField):
    """A series, named with its station."""

    def label_from_instance(self, obj: Any) -> str:
        """Write station and label."""
        return f"{obj.station} · {obj.label}"


class WhereForm(forms.Form):
    """Ask which series a file belongs to and how it is read."""

    series = SeriesChoice(label=_("series"), queryset=Series.objects.select_related("station"))
    profile = forms.ModelChoiceField(
        label=_("mapping profile"), queryset=MappingProfile.objects.all()
    )


class UploadForm(WhereForm):
    """Ask for the file as well."""

    file = forms.FileField(label=_("logger file"), allow_empty_file=True)


class ConfirmForm(forms.Form):
    """Ask whether faulty rows may be skipped."""

    skip_faulty = forms.BooleanField(required=False)


class ImportPages:
    """Give the admin of imports its two pages."""

    def has_add_permission(self, request: HttpRequest) -> bool:
        """Let those import whom the table of roles names."""
        return bool(request.user.has_perm("network.add_loggerimport"))

    def get_urls(self) -> list[URLPattern]:
        """Add the page of an uploaded file."""
        view = self.admin_site.admin_view(self.kept_view)  # type: ignore[attr-defined]
        own = [path("kept/<str:sha256>/", view, name="network_loggerimport_kept")]
        return own + super().get_urls()  # type: ignore[misc]

    def add_view(
        self, request: HttpRequest, form_url: str = "", extra_context: Any = None
    ) -> HttpResponse:
        """Take a file, look at it, and lead on to what it would change."""
        self._require(request)
        if request.method != "POST":
            return self._import_page(request, "upload", form=UploadForm(initial=request.GET.dict()))
        form = UploadForm(request.POST, request.FILES)
        if _too_large(request):
            form.errors["file"] = form.error_class([_too_large_sentence()])
        elif form.is_valid():
            where = {name: form.cleaned_data[name] for name in ("series", "profile")}
            file = form.cleaned_data["file"]
            try:
                found = imports.dry_run(**where, file=file, at=timezone.now(), keep=True)
            except Refusal as refusal:
                form.add_error(
                    refusal.field if refusal.field in form.fields else None, str(refusal)
                )
            else:
                return HttpResponseRedirect(_kept_address(found.sha256, name=file.name, **where))
        return self._import_page(request, "upload", form=form)

    def kept_view(self, request: HttpRequest, sha256: str) -> HttpResponse:
        """Show what an uploaded file would change, and import it on POST."""
        self._require(request)
        where = WhereForm(request.GET)
        name = request.GET.get("name", "")
        if not where.is_valid():
            return self._again(request, _t("Choose the series and the file again."))
        confirm = ConfirmForm(request.POST if request.method == "POST" else None)
        try:
            if request.method == "POST" and confirm.is_valid():
                return self._import(
                    request, sha256, name, {**where.cleaned_data, **confirm.cleaned_data}
                )
            with originals.opened(sha256, called=name) as file:
                found = imports.dry_run(**where.cleaned_data, file=file, at=timezone.now())
        except imports.FaultyRows as refusal:
            messages.error(request, str(refusal))
            return HttpResponseRedirect(request.get_full_path())
        except Refusal as refusal:
            return self._again(request, str(refusal))
        return self._import_page(
            request, "preview", found=found, where=where.cleaned_data, name=name,
            faults=found.faults[:FAULTS_SHOWN], more=max(len(found.faults) - FAULTS_SHOWN, 0),
            skipped=found.rows_faulty, odd=len(found.faults) - found.rows_faulty,
        )  # fmt: skip

    def _import(
        self, request: HttpRequest, sha256: str, name: str, filled: dict[str, Any]
    ) -> HttpResponse:
        with originals.opened(sha256, called=name) as file:
            row = imports.import_file(
                **filled,
                file=file,
                original_name=name or sha256,
                by=request.user,
                at=timezone.now(),
            )
        messages.success(
            request,
            _t("Imported %(name)s: %(kept)d readings kept, %(faulty)d rows skipped.")
            % {"name": row.original_name, "kept": row.rows_kept, "faulty": row.rows_faulty},
        )
        return HttpResponseRedirect(reverse("admin:network_loggerimport_change", args=[row.pk]))

    def _require(self, request: HttpRequest) -> None:
        if not self.has_add_permission(request):
            raise PermissionDenied

    def _again(self, request: HttpRequest, sentence: str) -> HttpResponse:
        messages.error(request, sentence)
        return HttpResponseRedirect(reverse("admin:network_loggerimport_add"))

    def _import_page(self, request: HttpRequest, which: str, **context: Any) -> HttpResponse:
        return TemplateResponse(
            request,
            f"admin/network/loggerimport/{which}.html",
            {
                **self.admin_site.each_context(request),  # type: ignore[attr-defined]
                "opts": self.opts,  # type: ignore[attr-defined]
                "title": _("Import a logger file"),
                **context,
            },
        )


def _kept_address(sha256: str, *, name: str, series: Series, profile: MappingProfile) -> str:
    query = urlencode({"series": series.pk, "profile": profile.pk, "name": name})
    return reverse("admin:network_loggerimport_kept", args=[sha256]) + f"?{query}"


def _too_large(request: HttpRequest) -> bool:
    """Tell whether the upload was stopped on its way: then the form lacks the file."""
    return int(request.META.get("CONTENT_LENGTH") or 0) > settings.UPLOAD_LIMIT_BYTES


def _too_large_sentence() -> str:
    most = settings.UPLOAD_LIMIT_BYTES // 2**20
    return _t("The upload is larger than %(most)d MB; import the file in parts.") % {"most": most}
