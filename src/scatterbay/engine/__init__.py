"""From a checked scenario to contributions: what arrives at each place, by beam, path and order."""
