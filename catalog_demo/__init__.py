"""Invented demo plant: data only; nothing in it stands for a real site, machine or product."""
