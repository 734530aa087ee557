"""Levelling and staff plates: booked sights to elevations, readings to stages."""
