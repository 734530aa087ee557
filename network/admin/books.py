"""All nouns of the staff site, loaded once the site itself stands; a new module is named here."""

from network.admin import (
    acts,
    agency,
    calibrations,
    gauges,
    gaugings,
    instruments,
    mapping_profiles,
    people,
    plans,
    ratings,
    records,
    rounds,
    safety,
    statements,
    stations,
)

__all__ = [
    "acts",
    "agency",
    "calibrations",
    "gauges",
    "gaugings",
    "instruments",
    "mapping_profiles",
    "people",
    "plans",
    "ratings",
    "records",
    "rounds",
    "safety",
    "statements",
    "stations",
]
