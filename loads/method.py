"""Every formula this program uses, as data: for the page of methods and for the calculation package."""

from __future__ import annotations

import math

from loads.density import (
    FRESH_WATER_TEMPERATURE,
    SEA_WATER_SALINITY,
    SEA_WATER_TEMPERATURE,
    SUSPENDED_SEDIMENT,
)
from loads.earth_pressure import FRICTION_ANGLE, OVERCONSOLIDATION_RATIO
from loads.earth_pressure_coulomb import ACTIVE_WALL_FRICTION_SHARE, PASSIVE_WALL_FRICTION_SHARE
from loads.first_limit import RESOLUTION
from loads.limits_of_use import LimitOfUse
from loads.method_clock import CLOCK
from loads.method_closure import CLOSURE_WATER, CLOSURES
from loads.method_data import Method, MethodGroup
from loads.method_reading import READINGS
from loads.method_wall import WALLS
from loads.recheck import FITTED_TOLERANCE, STRAIGHT_TOLERANCE

_ICE_POINT = 273.15


def limit_words(limit: LimitOfUse) -> str:
    """Limit of use as a sentence, angles in degrees and temperatures in °C.

    Examples
    --------
    >>> limit_words(FRICTION_ANGLE)
    'friction angle from 0 to 45°; common practice, no source: soils are rarely found above 45°'
    """
    low, high, unit = limit.low, limit.high, f" {limit.unit}"
    if limit.unit == "rad":
        low, high, unit = math.degrees(low), math.degrees(high), "°"
    elif limit.unit == "K":
        low, high, unit = low - _ICE_POINT, high - _ICE_POINT, " °C"
    elif limit.unit == "–":
        unit = ""
    name = limit.quantity.replace("_", " ")
    ends = f"{low:.3g} to {high:.3g}".replace("-", "−")
    return f"{name} from {ends}{unit}; {limit.note}"


_WATER = MethodGroup(
    title="Water",
    methods=(
        Method(
            name="Pressure of still water",
            formula="p = γ·⟨L − z⟩",
            words="L level of the side, γ unit weight of its water; flood side positive, protected side "
            "negative. "
            "Water over the top presses on the face up to its top only.",
            limits="still water; flow, waves and falling water are not in it",
        ),
        Method(
            name="Unit weight of water by convention",
            formula="fresh 62.4 lb/ft³, sea 64.0 lb/ft³",
            words="Used where neither a temperature nor a unit weight is entered.",
            sources=("FreshUnitWeight", "FEMAP55"),
        ),
        Method(
            name="Unit weight from density",
            formula="γ = ρ·g, g = 9.80665 m/s²",
            words="Standard acceleration of gravity everywhere.",
            sources=("CGPM1901",),
        ),
        Method(
            name="Density of fresh water",
            formula="ρ = (999.83952 + 16.945176 t − 7.9870401·10⁻³ t² − 46.170461·10⁻⁶ t³ + 105.56302·10⁻⁹ "
            "t⁴ "
            "− 280.54253·10⁻¹² t⁵)/(1 + 16.879850·10⁻³ t)",
            words="t in °C of the 1968 scale, t₆₈ = 1.00024 t₉₀.",
            sources=("Kell1975", "Saunders1990"),
            limits=limit_words(FRESH_WATER_TEMPERATURE),
        ),
        Method(
            name="Density of sea and brackish water",
            formula="ρ = ρ₀(t) + A(t)·S + B(t)·S^(3/2) + C·S²",
            words="One-atmosphere equation of state of 1980, S practical salinity.",
            sources=("MilleroPoisson1981", "UNESCO44", "Saunders1990"),
            limits=f"{limit_words(SEA_WATER_TEMPERATURE)}; {limit_words(SEA_WATER_SALINITY)}",
        ),
        Method(
            name="Density of water with suspended sediment",
            formula="ρ = ρ_w + C·(1 − ρ_w/ρ_s)",
            words="C dry mass in unit volume of mixture, ρ_s = 2650 kg/m³ of the grains.",
            sources=("SuspensionBalance",),
            limits=limit_words(SUSPENDED_SEDIMENT),
        ),
    ),
)

_SEDIMENT = MethodGroup(
    title="Sediment",
    methods=(
        Method(
            name="Vertical effective stress",
            formula="σ′v = q + Σ γ·Δz above water + Σ (γ_sat − γ_w)·Δz below",
            words="From the top of the uppermost layer down; q surcharge on the ground. The water's own "
            "pressure is "
            "counted apart, once.",
            limits="level ground, pore water at the level of its side, no seepage",
        ),
        Method(
            name="Pressure of soil on the face",
            formula="p = K·σ′v, not below zero",
            words="K at rest, active, passive or as entered. A surcharge presses with K·q. Friction along "
            "the face "
            "is not counted.",
        ),
        Method(
            name="At rest",
            formula="K₀ = 1 − sin φ′",
            words="φ′ effective angle of internal friction.",
            sources=("Jaky1944",),
            limits=limit_words(FRICTION_ANGLE),
        ),
        Method(
            name="At rest, once loaded more than now",
            formula="K₀ = (1 − sin φ′)·OCR^(sin φ′)",
            words="OCR overconsolidation ratio, greatest past over present vertical effective stress.",
            sources=("MayneKulhawy1982",),
            limits=limit_words(OVERCONSOLIDATION_RATIO),
        ),
        Method(
            name="At rest on a tilted face",
            formula="K = K₀·sin²θ + cos²θ",
            words="Pressure normal to the face from principal stresses σ′v and K₀·σ′v; θ from the "
            "horizontal.",
            limits="statics of a stress state at a point; the ground taken as undisturbed by the face",
        ),
        Method(
            name="Active and passive, smooth vertical face",
            formula="K_a = (1 − sin φ′)/(1 + sin φ′), K_p = (1 + sin φ′)/(1 − sin φ′)",
            words="Level ground.",
            sources=("Rankine1857",),
            limits=limit_words(FRICTION_ANGLE),
        ),
        Method(
            name="Active, plane wedge",
            formula="K_a = cos²(φ′ − η)/{cos²η·cos(η + δ)·[1 + √(sin(φ′ + δ)·sin φ′/(cos(η + δ)·cos η))]²}",
            words="η batter of the face from the vertical, δ wall friction, level ground; "
            "pressure normal to the face K_a·cos δ·sin θ.",
            sources=("Coulomb1776", "MullerBreslau1906"),
            limits=limit_words(ACTIVE_WALL_FRICTION_SHARE),
        ),
        Method(
            name="Passive, plane wedge",
            formula="K_p = cos²(φ′ + η)/{cos²η·cos(η − δ)·[1 − √(sin(φ′ + δ)·sin φ′/(cos(η − δ)·cos η))]²}",
            words="As above; movement is needed to build it up, and scour takes it away.",
            sources=("Coulomb1776", "MullerBreslau1906", "PlaneWedgePractice"),
            limits=limit_words(PASSIVE_WALL_FRICTION_SHARE),
        ),
        Method(
            name="Cohesion",
            formula="active p = K·σ′v − 2c′√K, passive p = K·σ′v + 2c′√K",
            words="c′ effective cohesion; where it would pull, down to z₀ = 2c′/(γ√K) on level ground, "
            "nothing acts.",
            sources=("Bell1915",),
            limits="vertical face without wall friction",
        ),
        Method(
            name="Fluid mud",
            formula="p = γ_m·t − γ_w·w beyond the water",
            words="A heavier fluid: its unit weight γ_m over the thickness t in place of the water's over "
            "its part w "
            "under water; the excess carries on undiminished below it.",
            limits="mud without strength, above any soil of its side",
        ),
        Method(
            name="Equivalent fluid",
            formula="p = γ_eq·t in place of the water's",
            words="One unit weight for soil and water together, as entered, for example the 85 lb/ft³ of a "
            "dam-builder's rule for silt; water is not added again.",
            sources=("UsbrSiltRule",),
            limits="the range for which whoever set the figure meant it",
        ),
    ),
)

_FORCES = MethodGroup(
    title="Force and moment",
    methods=(
        Method(
            name="Pressure diagram",
            formula="p = Σ s⟨k − z⟩⁰ + g⟨k − z⟩¹; V = Σ s⟨k − z⟩¹ + g⟨k − z⟩²/2; "
            "M = Σ s⟨k − z⟩²/2 + g⟨k − z⟩³/6; N = Σ s⟨k − z⟩³/6 + g⟨k − z⟩⁴/24",
            words="Steps s and ramps g that set in at knots k; ⟨x⟩ is x where positive, else nil. "
            "V shear, M moment, N its integral, each of everything above z, per width.",
            sources=("Macaulay1919",),
            limits="exact for pressures made of straight pieces",
        ),
        Method(
            name="Plane face with a straight outline",
            formula="N = ∫p·b dz/sin θ, M = ∫p·b·(z − z₀) dz/sin²θ, H = N·sin θ, V = −N·cos θ",
            words="b width, straight between corners; θ tilt; by hand in slices with ends 1, 2 and middle m: "
            "ΔN = Δs/6·(p₁b₁ + 4pₘbₘ + p₂b₂).",
            limits="exact for a straight outline; holes as entered",
        ),
        Method(
            name="Circular face",
            formula="ΔN = s·A + g·sin θ·(h·A − Q), ΔM = s·Q + g·sin θ·(h·Q − I)",
            words="A, Q, I area and moments about the lowest point of the disc below h: A = r²β − uw, "
            "Q = rA − ⅔w³, I = [r⁴β + uw(r² − 2u²)]/4 − (4/3)rw³ + r²A, u = r − h, w = √[h(2r − h)], "
            "β = arccos(u/r).",
            limits="exact",
        ),
        Method(
            name="Circular arc",
            formula="H on the vertical projection, V = −b∫p dx, M = H·ζ_c − V·x_c",
            words="V is the weight of the real or imaginary fluid above the arc; every pressure points "
            "through the "
            "centre (x_c, ζ_c), so the resultant does too.",
            limits="constant width; the arc does not turn back on itself",
        ),
        Method(
            name="Line of action",
            formula="z_F = z₀ + M/H (vertical face)",
            words="Elevation at which the horizontal force acts; none where the force is nil.",
        ),
    ),
)

_CHECKS = MethodGroup(
    title="Second computation, checks and levels",
    methods=(
        Method(
            name="Second computation",
            formula="Gauss–Legendre quadrature of p on every smooth piece",
            words="Every load again from its own definition, without steps, ramps or closed forms; where "
            "force or "
            "moment disagree, the results of the barrier are withheld.",
            limits=f"relative difference at most {STRAIGHT_TOLERANCE:.0e}, for circles and arcs "
            f"{FITTED_TOLERANCE:.0e}".replace("e-0", "·10⁻")
            .replace("⁻9", "⁻⁹")
            .replace("⁻6", "⁻⁶"),
        ),
        Method(
            name="Ratio to a limit",
            formula="ratio = |demand|/limit",
            words="Pressure of greatest magnitude, total force, moment about the bottom edge against limits "
            "that "
            "somebody entered. A limit nobody entered is not checked; none is ever assumed.",
            limits="near limit from the ratio that the scenario states, above limit beyond 1",
        ),
        Method(
            name="Ratio of heads",
            formula="ratio = (L − z₀)/(L_limit − z₀)",
            words="For a rated level and for a freeboard, whose limit level is the top less the freeboard.",
            limits="compares levels; says nothing of strength",
        ),
        Method(
            name="First-limit level",
            formula="lowest L with demand(L) = limit",
            words="The flood side rises, everything else as it stands, until a load limit is first reached; "
            "found by "
            "sweeps of many levels. A screening figure: no leave to let the water rise to it.",
            limits=f"to {RESOLUTION * 1000:.0f} mm; loads toward the protected side; up to 3 m above the "
            f"top or "
            "the water",
        ),
    ),
)

METHODS: tuple[MethodGroup, ...] = (
    _WATER,
    _SEDIMENT,
    _FORCES,
    _CHECKS,
    CLOSURES,
    CLOSURE_WATER,
    WALLS,
    CLOCK,
    READINGS,
)
"""Every formula, by group."""
