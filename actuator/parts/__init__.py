"""Frozen parts, checked when they are built: what a document describes, in SI."""

from actuator.parts.actuator import Actuator, Require
from actuator.parts.holding import Holding
from actuator.parts.load import Friction, Load, ProcessForce
from actuator.parts.project import Compressor, Machine, Money, Plant, Project, Site
from actuator.parts.spread import Spread
from actuator.parts.spring import Spring
from actuator.parts.valve import Throttle, Valve

__all__ = [
    "Actuator",
    "Compressor",
    "Friction",
    "Holding",
    "Load",
    "Machine",
    "Money",
    "Plant",
    "ProcessForce",
    "Project",
    "Require",
    "Site",
    "Spread",
    "Spring",
    "Throttle",
    "Valve",
]
