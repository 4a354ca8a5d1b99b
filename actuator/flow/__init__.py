"""Flow: ISO 6358 elements, and elements in series."""
