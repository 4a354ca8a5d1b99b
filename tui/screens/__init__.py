"""Screens and workspaces of the terminal UI."""
