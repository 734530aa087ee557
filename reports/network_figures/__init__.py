"""Figures of the whole network for a period: on the screen, as CSV, and as two pages of PDF."""
