"""Turns the file as written into the records of ``parts``, and refuses what cannot be."""
