"""Wall make-ups turned into transmission, once, and kept in memory and on disk."""
