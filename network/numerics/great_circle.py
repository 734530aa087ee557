"""Distances on the earth taken as a sphere, good to about 0.5 %."""

import numpy as np

from network.numerics.arrays import Floats

EARTH_RADIUS_KM = 6371.0088  # mean radius of the GRS 80 ellipsoid (Moritz, 2000)


def distance_km(
    latitude_deg: Floats | float,
    longitude_deg: Floats | float,
    *,
    to_latitude_deg: Floats | float,
    to_longitude_deg: Floats | float,
) -> Floats:
    """Return great-circle distances in km between places given in degrees; arrays pair up.

    Raises ValueError for a latitude beyond the poles. Source: haversine formula (Sinnott, 1984),
    which stays exact for places close together.
    """
    phi, to_phi = np.radians(latitude_deg), np.radians(to_latitude_deg)
    if np.any(np.abs(phi) > np.pi / 2) or np.any(np.abs(to_phi) > np.pi / 2):
        raise ValueError("A latitude lies within ±90°.")
    turn = np.radians(np.asarray(to_longitude_deg) - np.asarray(longitude_deg))
    # d = 2·R·asin √(sin²(Δφ/2) + cos φ₁·cos φ₂·sin²(Δλ/2))
    half = np.sin((to_phi - phi) / 2) ** 2 + np.cos(phi) * np.cos(to_phi) * np.sin(turn / 2) ** 2
    return np.asarray(2 * EARTH_RADIUS_KM * np.arcsin(np.sqrt(np.minimum(half, 1))), np.float64)
