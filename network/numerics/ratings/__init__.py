"""Ratings: stage to flow and back, curves fitted and tested, weirs."""
