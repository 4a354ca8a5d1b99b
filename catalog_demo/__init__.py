"""Invented demo plant: data only."""
