"""Widgets: sheet fields, plots, bars."""
