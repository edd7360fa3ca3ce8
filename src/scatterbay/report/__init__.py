"""Renders results: terminal, JSON, CSV, tables. Computes nothing."""
