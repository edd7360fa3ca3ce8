"""Questions put to the engine: where a wall is weakest, how much more it needs, what a drawing shows."""
