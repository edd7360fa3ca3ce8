"""Reads the shipped tables on first use: each with its source, range and interpolation rule."""
