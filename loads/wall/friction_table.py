"""Friction of mass concrete on ground, by material."""

from __future__ import annotations

BASE_FRICTION: dict[str, tuple[float, float]] = {
    "clean sound rock": (0.70, 0.70),
    "clean gravel, gravel-sand mixtures, coarse sand": (0.55, 0.60),
    "clean fine to medium sand, silty medium to coarse sand, silty or clayey gravel": (0.45, 0.55),
    "clean fine sand, silty or clayey fine to medium sand": (0.35, 0.45),
    "fine sandy silt, nonplastic silt": (0.30, 0.35),
    "very stiff and hard residual or preconsolidated clay": (0.40, 0.50),
    "medium stiff and stiff clay and silty clay": (0.30, 0.35),
}
"""Low and high friction coefficient tan δ of mass concrete on a material [NAVFACDM7]. [–]"""

BASE_FRICTION_ANGLES_DEGREES: dict[str, tuple[float, float]] = {
    "clean sound rock": (35, 35),
    "clean gravel, gravel-sand mixtures, coarse sand": (29, 31),
    "clean fine to medium sand, silty medium to coarse sand, silty or clayey gravel": (24, 29),
    "clean fine sand, silty or clayey fine to medium sand": (19, 24),
    "fine sandy silt, nonplastic silt": (17, 19),
}
"""Angles printed beside the coefficients of the first five materials [NAVFACDM7]. [deg]"""
