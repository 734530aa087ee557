"""Children on the page of a gauging: stage readings, and what each other method notes."""

from typing import Any

from django.contrib import admin
from django.http import HttpRequest

from network.admin.children import ChildCards, ChildRows
from network.models import (
    BoatTrack,
    FloatReach,
    Gauging,
    StageReading,
    TracerInjection,
    Transect,
    VesselFill,
    WeirHead,
)


class StageReadings(ChildRows):
    """Stage read during the gauging."""

    model = StageReading
    prefix = "stages"
    fields = ("read_at", "reading_m", "plate")
    can_delete = True

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer start and end on a new sheet."""
        return 0 if obj is not None and obj.pk else 2


class Transects(ChildRows):
    """Crossings of a moving boat."""

    model = Transect
    fields = ("starting_bank", "discharge_m3s", "seconds", "is_used")
    extra = 4
    can_delete = True


class Track(ChildCards):
    """How the boat knew its path."""

    model = BoatTrack
    max_num = extra = 1


class Reach(ChildCards):
    """The reach of the floats."""

    model = FloatReach
    max_num = extra = 1


class Fills(ChildRows):
    """Fills of a vessel."""

    model = VesselFill
    fields = ("volume_m3", "seconds")
    extra = 3
    can_delete = True


class Injection(ChildCards):
    """The tracer put in."""

    model = TracerInjection
    max_num = extra = 1


class Head(ChildCards):
    """The head on a weir."""

    model = WeirHead
    max_num = extra = 1


OF_METHOD: dict[str, tuple[type[admin.options.InlineModelAdmin], ...]] = {
    Gauging.Method.MOVING_BOAT: (Transects, Track),
    Gauging.Method.FLOAT: (Reach,),
    Gauging.Method.VOLUMETRIC: (Fills,),
    Gauging.Method.DILUTION: (Injection,),
    Gauging.Method.WEIR: (Head,),
}
