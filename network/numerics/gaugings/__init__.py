"""Gaugings: points and verticals to a discharge, its uncertainty and its findings."""
