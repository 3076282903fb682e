"""Formulas of walls, as data: forces, uplift, stability, seepage and I-walls."""

from __future__ import annotations

from typing import Final

from loads.method_data import Method, MethodGroup

WALLS: Final = MethodGroup(
    title="Floodwalls",
    methods=(
        Method(
            name="Weight of a part",
            formula="A = ½·Σ(x_i·z_j − x_j·z_i), W = γ·A at the centroid",
            words="Per unit length of wall, moments about the toe.",
        ),
        Method(
            name="Water on a wetted face",
            formula="(H, V) = (−Δz, Δx)·∫γ·⟨L − z⟩ dt, 0 ≤ t ≤ 1 along each edge",
            words="On every edge of the outline, level and sloping; over the top only what stands there "
            "from both "
            "sides.",
        ),
        Method(
            name="Soil over the base",
            formula="effective weight between the face and the upright plane through heel or toe",
            words="Lateral pressure of soil acts on those planes; the part of passive resistance that "
            "is relied "
            "on is entered, none by default.",
        ),
        Method(
            name="Uplift",
            formula="p = γ·(h − z), h = h_f − (h_f − h_p)·R/ΣR",
            words="R the resistance passed: horizontal distance by the linear rule; on a line of creep "
            "upright "
            "lengths, horizontal ones times their share, buried faces and both faces of cutoffs. Where "
            "a side "
            "is dry, h is the elevation at which water leaves.",
            sources=("Bligh1910",),
        ),
        Method(
            name="Uplift at a drain",
            formula="h_d = h_p + (1 − E)·(h − h_p), or h_p + k·(h_f − h_p)",
            words="E effectiveness or k remaining share as entered; straight lines to both ends.",
            sources=("EM2200",),
        ),
        Method(
            name="Base pressure and crack",
            formula="x = −M/N, e = B/2 − x; q = N/B·(1 ± 6e/B), beyond e = B/6: b = 3·min(x, B − x), q "
            "= 2N/b",
            words="No tension. The base opens over B − b with the full head of its side in the crack, which "
            "changes uplift, until the length settles at the least that is in balance, or runs through.",
        ),
        Method(
            name="Sliding factor",
            formula="F = (N·tan δ + c·b + P)/|T|",
            words="N with uplift taken off, c adhesion over the compressed length b, P the passive "
            "resistance "
            "relied on, T all other horizontal force. With a key on the level plane at its bottom, the "
            "ground "
            "above it moving with the wall.",
            sources=("EM2100",),
        ),
        Method(
            name="Flotation factor",
            formula="F = W/(U − W_G)",
            words="W wall and effective soil, U uplift, W_G water that bears down on the wall.",
            sources=("EM2100",),
        ),
        Method(
            name="Bearing resistance of a strip",
            formula="q = c′·N_c·i_c + q₀·N_q·i_c + ½·γ′·B′·N_γ·i_γ, i_c = (1 − α/90°)², i_γ = (1 − α/φ′)²",
            words="N_q = e^(π·tan φ′)·tan²(45° + φ′/2), N_c = (N_q − 1)·cot φ′, N_γ = (N_q − 1)·tan 1.4φ′; "
            "B′ = B − 2|e|; no depth factors.",
            sources=("Meyerhof1963",),
        ),
        Method(
            name="Friction of concrete on ground",
            formula="tan δ by material, low to high",
            words="A table to hold an entered coefficient against; it is never filled in.",
            sources=("NAVFACDM7",),
        ),
        Method(
            name="Weighted creep ratio",
            formula="C = (ΣL_v + ΣL_h/3)/ΔH",
            words="Against the least ratio of the material.",
            sources=("Lane1935",),
        ),
        Method(
            name="Exit gradient",
            formula="i = ΔH/(π·d·√λ), λ = (1 + √(1 + (b/d)²))/2",
            words="d depth of wall or cutoff below the ground where water leaves, b floor upstream of "
            "it; against "
            "the critical gradient γ′/γ_w over a factor.",
            sources=("Khosla1936", "Terzaghi1943"),
            limits="deep uniform ground; a lone sheet in a layer: π·ΔH/(4·K·T·m)",
        ),
        Method(
            name="Embedment of an I-wall",
            formula="least depth at which net moments about the tip do not turn the top to the "
            "protected side",
            words="Water loses head in a straight line along the sheet from ground or gap; passive "
            "pressure over "
            "its factor; the depth is then increased for fixity.",
            sources=("SheetPractice", "Harr1962"),
            limits="one uniform soil on each side",
        ),
        Method(
            name="Criteria",
            formula="least factors and compressed share of the base by load category",
            words="Sets with document, edition and table; those built in are from memory, to be confirmed.",
            sources=("EM2100", "EM2200", "EM2502"),
        ),
    ),
)
"""What the figures of walls rest on."""
