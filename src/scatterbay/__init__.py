"""Screens stray radiation around X-ray rooms and industrial radiography bays."""

__version__ = "0.1.0"
