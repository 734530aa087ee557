"""Bind ready station PDFs into one: title, contents with links, map, summary, bookmarks, data.

The pages are taken over as they are. Their tags are not: merged trees of 200 stations would take
more than a gigabyte. So the volume does not claim to be tagged; each station's own PDF is.
"""

import gc
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from io import BytesIO
from typing import Any

import pikepdf
from django.template.loader import render_to_string
from django.utils import translation
from django.utils.translation import gettext as _
from pikepdf import Array, Dictionary, Name, OutlineItem

from network.models import Agency
from reports import rendering
from reports.figures import network_map, page_digits
from reports.figures.inputs import Place
from reports.models import Edition

LINK = "station:"  # the contents link to station:3; once its pages are bound, to its first page
ROWS_A_PAGE = 44
MM = 72 / 25.4
NUMBER_FROM_LEFT, NUMBER_FROM_FOOT = 105 * MM, 6.5 * MM


@dataclass(frozen=True)
class Part:
    """One station's ready PDF and its line in contents and summary."""

    number: int
    edition: Edition
    pdf: str  # path of the file
    pages: int
    first_page: int
    unit: str

    @property
    def heading(self) -> str:
        """Return code, river and name, as the contents and the bookmarks write them."""
        station = self.edition.station
        return f"{station.code}  {station.river} – {station.name}"


def contents_of(editions: Sequence[Edition]) -> list[Part]:
    """Return the parts of a volume with their page numbers; the title page is page 1."""
    page = 1 + _front_pages(len(editions))
    parts = []
    for number, edition in enumerate(editions, start=1):
        with pikepdf.open(edition.pdf.path) as document:
            pages = len(document.pages)
        unit = "m³/s" if edition.station.is_rated else "m"
        parts.append(Part(number, edition, edition.pdf.path, pages, page, unit))
        page += pages
    return parts


def write(parts: Sequence[Part], out: Any, *, title: str, agency: Agency, bound_on: date) -> None:
    """Write the volume into an open file; the same parts, title and day give the same bytes."""
    front = _front(parts, title=title, agency=agency, bound_on=bound_on)
    gc.collect()  # the boxes of the front pages form circles; the stations' pages need the room
    with pikepdf.open(BytesIO(front)) as volume:
        _claim_no_tags(volume)
        if len(volume.pages) != _front_pages(len(parts)):
            raise RuntimeError("The front matter has not the pages its contents count on.")
        bookmarks = [_bind(volume, part) for part in parts]
        _link_contents(volume, parts)
        _number_pages(volume)
        with volume.open_outline() as outline:
            outline.root.extend(bookmarks)
        volume.save(
            out, deterministic_id=True, object_stream_mode=pikepdf.ObjectStreamMode.generate
        )


def _front_pages(stations: int) -> int:
    """Return how many pages stand before the first station: title, contents, map, summary."""
    return 2 + 2 * -(-stations // ROWS_A_PAGE)


def _front(parts: Sequence[Part], *, title: str, agency: Agency, bound_on: date) -> bytes:
    """Return title page, contents, map and summary as PDF, in the agency's language."""
    with translation.override(agency.language):
        context = {
            "title": title,
            "agency": agency,
            "year": parts[0].edition.year_label,
            "first": parts[0].edition.first_day,
            "last": parts[0].edition.last_day,
            "bound_on": bound_on,
            "language": agency.language,
            "parts": parts,
            "leaves": [parts[at : at + ROWS_A_PAGE] for at in range(0, len(parts), ROWS_A_PAGE)],
            "link": LINK,
        }
        places = [_place(part) for part in parts]
        map_svg = network_map.draw(places, _("N"))
        page = rendering.Page(render_to_string("reports/volume.html", context), {"map": map_svg})
    return rendering.write_pdf(page, identity=f"{title} {bound_on} {[p.pdf for p in parts]}")


def _place(part: Part) -> Place:
    station = part.edition.station
    return Place(name=station.name, latitude=station.latitude_deg, longitude=station.longitude_deg)


def _claim_no_tags(volume: pikepdf.Pdf) -> None:
    for key in (Name.StructTreeRoot, Name.MarkInfo):
        del volume.Root[key]
    with volume.open_metadata(set_pikepdf_as_editor=False, update_docinfo=False) as metadata:
        del metadata["pdfuaid:part"]


def _bind(volume: pikepdf.Pdf, part: Part) -> OutlineItem:
    """Append a station's pages and attachments; return its bookmark with its own below."""
    with pikepdf.open(part.pdf) as station:
        start = len(volume.pages)
        volume.pages.extend(station.pages)
        new = volume.pages[start:]
        bound = {old.objgen: page.obj for old, page in zip(station.pages, new, strict=True)}
        bookmark = OutlineItem(part.heading, start)
        bookmark.is_closed = True
        with station.open_outline() as outline:
            bookmark.children.extend(_bookmarks(outline.root, bound))
        for name, kept in station.attachments.items():
            own = kept.obj.EF.F
            volume.attachments[name] = pikepdf.AttachedFileSpec(
                volume,
                own.read_bytes(),
                description=kept.description,
                filename=kept.filename,
                mime_type="text/csv",
                creation_date=str(own.Params.CreationDate),
                mod_date=str(own.Params.ModDate),
                relationship=Name.Data,
            )
    return bookmark


def _bookmarks(items: Sequence[OutlineItem], bound: dict[Any, Any]) -> list[OutlineItem]:
    """Copy bookmarks, their pages exchanged for the bound ones."""
    copies = []
    for item in items:
        destination: Any = item.destination
        page, *place = destination
        target = Array([bound[page.objgen], *place])
        copy = OutlineItem(item.title, target)
        copy.is_closed = True
        copy.children.extend(_bookmarks(item.children, bound))
        copies.append(copy)
    return copies


def _link_contents(volume: pikepdf.Pdf, parts: Sequence[Part]) -> None:
    """Let the links of the contents lead to the stations' first pages."""
    first = {f"{LINK}{part.number}": part.first_page - 1 for part in parts}
    for page in volume.pages[: _front_pages(len(parts))]:
        for link in page.obj.get(Name.Annots, []):
            action = link.get(Name.A, Dictionary())
            target = first.get(str(action.get(Name.URI, "")))
            if target is not None:
                del link[Name.A]
                link.Dest = Array([volume.pages[target].obj, Name.Fit])


def _number_pages(volume: pikepdf.Pdf) -> None:
    """Put the volume's page number at the foot of every page but the first, as an artifact."""
    digits = {digit: _form(volume, path) for digit, path in page_digits.outlines().items()}
    for number, page in enumerate(volume.pages, start=1):
        if Name.StructParents in page.obj:
            del page.obj[Name.StructParents]
        if number == 1:
            continue
        resources = page.obj.Resources
        if Name.XObject not in resources:
            resources.XObject = Dictionary()
        for digit, form in digits.items():
            resources.XObject[f"/Digit{digit}"] = form
        page.contents_add(b"q", prepend=True)
        page.contents_add(_stamp(str(number)))


def _form(volume: pikepdf.Pdf, path: str) -> pikepdf.Stream:
    """Return one digit as a form that every page can draw."""
    box = Array([-1, -3, page_digits.SIZE, page_digits.SIZE])
    return pikepdf.Stream(volume, path.encode(), Type=Name.XObject, Subtype=Name.Form, BBox=box)


def _stamp(text: str) -> bytes:
    """Write the operators that draw a number centred at the foot."""
    left = NUMBER_FROM_LEFT - len(text) * page_digits.ADVANCE / 2
    steps = [f"1 0 0 1 {left:.2f} {NUMBER_FROM_FOOT:.2f} cm"]
    for digit in text:
        steps += [f"/Digit{digit} Do", f"1 0 0 1 {page_digits.ADVANCE:.2f} 0 cm"]
    return f"Q q /Artifact BMC {' '.join(steps)} EMC Q".encode()
