"""Frozen parts, checked when they are built: what a document describes, in SI."""

from actuator.parts.actuator import Actuator, Friction, Load, ProcessForce, Require, Throttle, Valve
from actuator.parts.project import Compressor, Machine, Money, Plant, Project, Site

__all__ = [
    "Actuator",
    "Compressor",
    "Friction",
    "Load",
    "Machine",
    "Money",
    "Plant",
    "ProcessForce",
    "Project",
    "Require",
    "Site",
    "Throttle",
    "Valve",
]
