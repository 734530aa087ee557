"""The usual cautions of work in and over water; local rules and the safety officer decide."""

from django.utils.translation import gettext_lazy as _

AT_THE_RIVER = (
    _(
        "Wade only where depth (m) × velocity (m/s) is below about 0.9 m²/s, and never alone. "
        "Wear a life jacket at, in and over water. Leave before the flood does."
    ),
    _(
        "Inspect a cableway before use; mind the traffic on bridges; stilling wells are confined "
        "spaces. Local rules and the agency's safety officer decide."
    ),
)
