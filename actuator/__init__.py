"""The model of air cylinders and plant air, and the doors into it."""
