"""Stroke dynamics: equations, integrator, the periodic cycle, its ledger."""
