"""Sources of walls: criteria of stability, bearing, friction of bases and seepage."""

from __future__ import annotations

from typing import Final

from loads.reference import Reference, textbook

WALLS: Final = (
    Reference(
        key="EM2100",
        citation="U.S. Army Corps of Engineers, EM 1110-2-2100, Stability Analysis of Concrete Structures; "
        "paragraphs 3-7 and 3-8 seen in a mirror, the figures of its tables recalled",
        edition="1 December 2005",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="EM2502",
        citation="U.S. Army Corps of Engineers, EM 1110-2-2502, Retaining and Flood Walls; sliding factors "
        "as quoted by an engineer on an open forum, the other figures recalled",
        edition="29 September 1989",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="EM2200",
        citation="U.S. Army Corps of Engineers, EM 1110-2-2200, Gravity Dam Design, table 4-1 and "
        "paragraph 3-3",
        edition="30 June 1995",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="NAVFACDM7",
        citation="Naval Facilities Engineering Command, DM-7.02, Foundations and Earth Structures, "
        "chapter 3, table 1; as seen in two mirrors",
        edition="September 1986",
    ),
    Reference(
        key="Meyerhof1963",
        citation="G. G. Meyerhof, Some recent research on the bearing capacity of foundations, Canadian "
        "Geotechnical Journal 1(1), pp. 16–26",
        edition="1963",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="Bligh1910",
        citation="W. G. Bligh, Dams, barrages and weirs on porous foundations, Engineering News 64, "
        "pp. 708–710",
        edition="1910",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="Lane1935",
        citation="E. W. Lane, Security from under-seepage: masonry dams on earth foundations, Transactions "
        "of the American Society of Civil Engineers 100, pp. 1235–1272",
        edition="1935",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="Khosla1936",
        citation="A. N. Khosla, N. K. Bose and E. M. Taylor, Design of weirs on permeable foundations, "
        "Central Board of Irrigation, India, publication 12; the closed forms held against numerical "
        "solutions of the flow",
        edition="1936",
    ),
    Reference(
        key="Harr1962",
        citation="M. E. Harr, Groundwater and Seepage; the closed form held against numerical solutions of "
        "the flow",
        edition="1962",
    ),
    Reference(
        key="Terzaghi1943",
        citation="K. Terzaghi, Theoretical Soil Mechanics: effective stress, critical gradient and heave "
        "beside sheet piles",
        edition="1943",
    ),
    Reference(
        key="SheetPractice",
        citation="Cantilevered sheet: depth at which moments about the tip balance with passive pressure "
        "over a factor, then increased by a fifth for the fixity below it",
        edition="none",
        status="common practice, no source",
    ),
    textbook("PunmiaIrrigation", "B. C. Punmia and B. B. Lal, Irrigation and Water Power Engineering"),
    textbook("SarkarStrength", "B. K. Sarkar, Strength of Materials"),
    textbook("Lal", "J. Lal, Hydraulics"),
)
