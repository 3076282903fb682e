"""Works that the closures rest on: overflow, leakage, buoyancy, handling and the count of logs."""

from __future__ import annotations

from typing import Final

from loads.reference import Reference, textbook

_QUOTED = "as quoted in R. D. Blevins, Applied Fluid Dynamics Handbook, and computed by an open library"

OVERFLOW: Final = (
    Reference(
        key="Rehbock1929",
        citation="Th. Rehbock, in the discussion of Precise Weir Measurements, Transactions of the American "
        f"Society of Civil Engineers 93, pp. 1111–1178; {_QUOTED}",
        edition="1929",
    ),
    Reference(
        key="Ackers1978",
        citation="P. Ackers, W. R. White, J. A. Perkins and A. J. M. Harrison, Weirs and Flumes for Flow "
        f"Measurement, Wiley; {_QUOTED}",
        edition="1978",
    ),
    Reference(
        key="KindsvaterCarter1957",
        citation="C. E. Kindsvater and R. W. Carter, Discharge characteristics of rectangular thin-plate "
        f"weirs, Journal of the Hydraulics Division, ASCE, 83(6), pp. 1–36; {_QUOTED}",
        edition="1957",
    ),
    Reference(
        key="Blevins1984",
        citation="R. D. Blevins, Applied Fluid Dynamics Handbook, Van Nostrand Reinhold; weir formulas, with "
        "their limits of use, as given in the documentation of an open library",
        edition="1984",
    ),
    Reference(
        key="Francis1855",
        citation="J. B. Francis, Lowell Hydraulic Experiments: 3.33 ft^½/s for a sharp crest",
        edition="1855",
    ),
    Reference(
        key="Belanger1828",
        citation="J. B. Bélanger, Essai sur la solution numérique de quelques problèmes relatifs au "
        "mouvement permanent des eaux courantes: greatest flow over a broad crest at two thirds of the head",
        edition="1828",
    ),
    Reference(
        key="Villemonte1947",
        citation="J. R. Villemonte, Submerged-weir discharge studies, Engineering News-Record 139, "
        "pp. 866–869",
        edition="1947",
        status="from memory, to be confirmed",
    ),
)

MEMBERS: Final = (
    Reference(
        key="ElementaryBeamTheory",
        citation="Elementary theory of bending: plane sections, small deflections, one modulus; simple beam "
        "under an even load, cantilever, prop, bolts of a stiff plate in proportion to their distance",
        edition="none",
        status="common practice, no source",
    ),
    textbook("Gere", "J. M. Gere, Mechanics of Materials"),
)

LEAKAGE: Final = (
    Reference(
        key="Torricelli",
        citation="Torricelli's law: speed √(2gΔh) through an opening, Δh the difference of the levels where "
        "the opening is covered on both sides; strips of one height added up",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="OrificeCoefficient",
        citation="Discharge coefficient 0.61 of a small opening with sharp edges",
        edition="none",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="SealRate",
        citation="Leakage through a seal as a rate per metre at a stated head, growing with a power of the "
        "head; rate and power are entered",
        edition="none",
        status="common practice, no source",
    ),
)

HANDLING: Final = (
    Reference(
        key="Archimedes",
        citation="Archimedes' principle: upward force equal to the weight of the water displaced",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="SlotFriction",
        citation="Pull on a log in its guides: weight less buoyancy, and friction coefficient times end "
        "reactions",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="LogCount",
        citation="Logs needed: target level with allowance and freeboard, less the sill, over the effective "
        "stacked height, rounded up; and an example of a closure worked by hand from it",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="NIOSH94110",
        citation="T. R. Waters, V. Putz-Anderson and A. Garg, Applications manual for the revised NIOSH "
        "lifting equation, DHHS (NIOSH) Publication 94-110; constants and the multipliers HM, VM and DM as "
        "printed in a civil engineering reference handbook, section 46.2.1",
        edition="1994",
    ),
    Reference(
        key="INDG143",
        citation="Health and Safety Executive, Manual handling at work: a brief guide, INDG143: "
        "reductions for twisting and for frequent lifting",
        edition="not known",
    ),
    Reference(
        key="HSEL23",
        citation="Health and Safety Executive, Manual handling, guidance on regulations, L23: what two and "
        "three people lift together",
        edition="not known",
        status="from memory, to be confirmed",
    ),
    textbook("Punmia", "B. C. Punmia and P. B. B. Lal, Irrigation and Water Power Engineering"),
)
