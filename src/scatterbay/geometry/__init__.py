"""Faces and bodies, and rays against many of them at once. Lengths in m, z up."""
