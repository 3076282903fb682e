"""Formulas of closures, as data: logs, posts, anchors, and the water over, through and under the logs."""

from __future__ import annotations

from typing import Final

from loads.method_data import Method, MethodGroup

_BEAM: Final = ("ElementaryBeamTheory",)

CLOSURES: Final = MethodGroup(
    title="Logs, posts and anchors of a closure",
    methods=(
        Method(
            name="Load of a log",
            formula="w = V(bottom) − V(top)",
            words="Exact for any pressure within the height of the log; the span L is the clear width "
            "and one "
            "bearing length, from middle to middle of the bearings.",
            limits="logs in place only; a stack lower than the water is overtopped, not stronger",
        ),
        Method(
            name="Log as a simple beam",
            formula="M = w·L²/8, R = w·L/2, δ = 5·w·L⁴/(384·E·I), p_b = R/(b·h)",
            words="Bending moment, end reaction, deflection and bearing pressure; stresses M/S and R/A_v "
            "where "
            "a section was entered.",
            sources=_BEAM,
            limits="ends free to turn, small deflections",
        ),
        Method(
            name="Section of a log or post",
            formula="I = (b·d³ − b₁·d₁³)/12, S = 2I/d, A_v = I·t_w/Q",
            words="Outer size b by d, hollow b₁ by d₁, walls and ribs along the flow t_w thick together; "
            "a full "
            "rectangle has no hollow.",
            sources=_BEAM,
            limits="corners square",
        ),
        Method(
            name="Width of water on a post",
            formula="t = (L_left + L_right)/2 + strip",
            words="The strip of the post between the bearings takes the water directly; stacks of unequal "
            "height load the post each up to its own top.",
        ),
        Method(
            name="Post",
            formula="EI·v(x) = EI·θ₀·x + x·N(0) − Q(0) + Q(x) − H·K(x)",
            words="Cantilever from its base plate, or with a brace whose force H makes v = 0 where it meets "
            "the post, base fixed or pinned; V, M, N and Q the integrals of the load above x.",
            sources=("Macaulay1919", "ElementaryBeamTheory"),
            limits="stiff brace and base, brace able to push and pull",
        ),
        Method(
            name="Anchors",
            formula="T = |M₀|/a + U₊, T_i = |M₀|·d_i/Σd² + U₊/n, p_c = (|M₀|/a + W₊)/(contact area)",
            words="Lever arm a, or bolts of a stiff plate in proportion to their distance d from its "
            "edge; U₊ "
            "what a brace lifts beyond the weight, W₊ the weight it leaves.",
            sources=_BEAM,
            limits="concrete, pull-out and edge distances are for the engineer",
        ),
        Method(
            name="Factors of the design basis",
            formula="ratio = γ·demand/(f·limit)",
            words="Working stress: γ = 1 and f the factor of the case's category. Strength: γ the load "
            "factor "
            "and f the resistance factor. For parts only; deflections, levels and the whole closure have "
            "none.",
            limits="factors as entered, none is assumed",
        ),
        Method(
            name="One brace or one post lost",
            formula="brace: M₀ = ∫q·x dx; post: L = L_left + strip + L_right",
            words="Computed apart and never part of a verdict. Without a post the logs fall unless they "
            "reach "
            "across both bays.",
            limits="the rest as it stands",
        ),
    ),
)

CLOSURE_WATER: Final = MethodGroup(
    title="Water over, through and under the logs",
    methods=(
        Method(
            name="Flow over the logs",
            formula="Q between the least and the greatest of the weir formulas that apply",
            words="Published formulas for the same crest differ by several percent; both ends are given.",
            sources=(
                "Rehbock1929",
                "Ackers1978",
                "KindsvaterCarter1957",
                "Francis1855",
                "Belanger1828",
                "Villemonte1947",
            ),
            limits="still water in front of a level crest, air under the falling water",
        ),
        Method(
            name="Leakage of seals",
            formula="q = rate·(Δh/stated head)^m per length",
            words="Summed over the joints and integrated up the ends, each under its own head; rate, "
            "head and "
            "power m as entered.",
            sources=("SealRate",),
        ),
        Method(
            name="Flow through open gaps",
            formula="Q = C_d·b·√(2g)·∫√Δh dz",
            words="An orifice in every layer of the gap, C_d 0.61 for sharp edges.",
            sources=("Torricelli", "OrificeCoefficient"),
        ),
        Method(
            name="Buoyancy of the logs",
            formula="uplift less weight of each upper part of the stack, against the hold-downs",
            words="Water stands all round the logs; a log rises only together with those above it.",
            sources=("Archimedes",),
            limits="friction in the guides left out",
        ),
        Method(
            name="Force to lift a log",
            formula="F = W − B + μ·|R|",
            words="W weight, B buoyancy, R what both ends press on the guides.",
            sources=("SlotFriction",),
            limits="suction, ice, silt and a jam not counted",
        ),
        Method(
            name="Weight by hand",
            formula="RWL = LC·HM·VM·DM·AM·FM·CM",
            words="Weight of a log over the people who lift it, against an entered limit and, where its "
            "conditions were entered, the revised NIOSH lifting equation.",
            sources=("NIOSH94110",),
            limits="one person on sound dry footing",
        ),
        Method(
            name="Logs needed",
            formula="n = ⌈(level + allowance + freeboard − sill)/height⌉",
            words="Whole logs for each bay, their top, and whether they are on hand.",
            sources=("LogCount",),
        ),
    ),
)
