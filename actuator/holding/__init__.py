"""Holding: what a load does when air, signal or both are lost, from either end."""
