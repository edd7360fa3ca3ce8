"""From contributions to an assessment: time bases, use and occupancy factors, design goals, verdicts."""
