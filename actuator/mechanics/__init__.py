"""Mechanics: force, friction, buckling."""
