"""Every work that a formula or a check value of this program rests on: the one list of sources.

A docstring cites a work as ``[Key]``; a test of literature cites it as
``@pytest.mark.source("Key", where)``. A key that is not here stops the test run.
"""

from __future__ import annotations

from loads.reference import Reference, Status, textbook
from loads.references_closure import HANDLING, LEAKAGE, MEMBERS, OVERFLOW
from loads.references_wall import WALLS

__all__ = ["REFERENCES", "Reference", "Status"]

_METHODS = (
    Reference(
        key="Rankine1857",
        citation="W. J. M. Rankine, On the stability of loose earth, Philosophical Transactions of the "
        "Royal Society of London 147, pp. 9–27",
        edition="1857",
    ),
    Reference(
        key="Coulomb1776",
        citation="C. A. Coulomb, Essai sur une application des règles de maximis et minimis à quelques "
        "problèmes de statique relatifs à l'architecture, Mémoires de mathématique et de "
        "physique présentés à l'Académie royale des sciences 7, pp. 343–382",
        edition="1776",
    ),
    Reference(
        key="MullerBreslau1906",
        citation="H. Müller-Breslau, Erddruck auf Stützmauern, Kröner, Stuttgart: Coulomb's wedge for a "
        "leaning face and sloping ground",
        edition="1906",
    ),
    Reference(
        key="Bell1915",
        citation="A. L. Bell, The lateral pressure and resistance of clay, and the supporting power of "
        "clay foundations, Minutes of Proceedings of the Institution of Civil Engineers 199, "
        "pp. 233–272",
        edition="1915",
    ),
    Reference(
        key="Jaky1944",
        citation="J. Jáky, A nyugalmi nyomás tényezője (The coefficient of earth pressure at rest), "
        "Journal of the Society of Hungarian Architects and Engineers 78, pp. 355–358",
        edition="1944",
    ),
    Reference(
        key="MayneKulhawy1982",
        citation="P. W. Mayne and F. H. Kulhawy, K0–OCR relationships in soil, Journal of the "
        "Geotechnical Engineering Division, ASCE, 108(GT6), pp. 851–872",
        edition="1982",
    ),
    Reference(
        key="PlaneWedgePractice",
        citation="A plane wedge overstates passive resistance once the wall friction passes about a "
        "third of the friction angle, because the real surface of sliding is curved",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="UsbrSiltRule",
        citation="Bureau of Reclamation rule for silt against dams, 85 lb/ft³ as a fluid sideways and "
        "120 lb/ft³ downward, both containing the water; as quoted in Colorado Water "
        "Conservation Board document 69323, p. 3-19",
        edition="as quoted; the rule's own document not seen",
    ),
)

_WATER = (
    Reference(
        key="Kell1975",
        citation="G. S. Kell, Density, thermal expansivity, and compressibility of liquid water from 0 "
        "to 150 °C: correlations and tables for atmospheric pressure and saturation reviewed "
        "and expressed on 1968 temperature scale, Journal of Chemical and Engineering Data "
        "20(1), pp. 97–105",
        edition="1975",
    ),
    Reference(
        key="MilleroPoisson1981",
        citation="F. J. Millero and A. Poisson, International one-atmosphere equation of state of "
        "seawater, Deep-Sea Research 28A(6), pp. 625–629",
        edition="1981",
    ),
    Reference(
        key="UNESCO44",
        citation="N. P. Fofonoff and R. C. Millard, Algorithms for computation of fundamental properties "
        "of seawater, UNESCO Technical Papers in Marine Science 44; check values as quoted by "
        "an open library of the equation",
        edition="1983",
    ),
    Reference(
        key="Saunders1990",
        citation="P. M. Saunders, The International Temperature Scale of 1990, ITS-90, WOCE Newsletter "
        "10, p. 10: t68 = 1.00024 t90",
        edition="1990",
    ),
    Reference(
        key="IAPWS95",
        citation="W. Wagner and A. Pruß, The IAPWS formulation 1995 for the thermodynamic properties of "
        "ordinary water substance for general and scientific use, Journal of Physical and "
        "Chemical Reference Data 31(2), pp. 387–535; reference values computed by open "
        "libraries of the formulation",
        edition="2002",
    ),
    Reference(
        key="TEOS10",
        citation="IOC, SCOR and IAPSO, The international thermodynamic equation of seawater 2010, "
        "Manuals and Guides 56, UNESCO; reference values computed by the open library of the "
        "equation",
        edition="2010",
    ),
    Reference(
        key="VSMOWTable",
        citation="Density of Vienna standard mean ocean water at 101.325 kPa, as copied in open course data",
        edition="compiler and year not stated in the copy",
    ),
    Reference(
        key="MartinMcCutcheon1999",
        citation="J. L. Martin and S. C. McCutcheon, Hydrodynamics and transport for water quality "
        "modeling, table of unit weight of water; as printed in the documentation of an open "
        "hydraulics library",
        edition="1999",
    ),
    Reference(
        key="SuspensionBalance",
        citation="Density of water with suspended solids from the balance of mass and volume",
        edition="none",
        status="from memory, to be confirmed",
    ),
    Reference(
        key="CGPM1901",
        citation="Third General Conference on Weights and Measures, declaration on the unit of mass and "
        "the definition of weight: standard acceleration of gravity 9.80665 m/s²",
        edition="1901",
    ),
    Reference(
        key="FreshUnitWeight",
        citation="62.4 lb/ft³, the trade's unit weight of fresh water",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="FEMAP55",
        citation="FEMA P-55, Coastal Construction Manual, volume II, legend of equation 8.6: 64.0 lb/ft³ "
        "for salt water",
        edition="4th edition, August 2011",
    ),
)

_ATMOSPHERE = (
    Reference(
        key="StandardAtmosphere1976",
        citation="U.S. Standard Atmosphere, NOAA, NASA and USAF, constants and lapse rate below 11 km; "
        "table rows by geometric altitude as quoted in the test data of an open library",
        edition="1976",
    ),
    Reference(
        key="ICAOStandardAtmosphere",
        citation="ICAO Doc 7488, Manual of the ICAO Standard Atmosphere, table rows by geometric altitude as "
        "quoted in the test data of an open library",
        edition="3rd edition, 1993, by the library",
    ),
    Reference(
        key="AtmospherePractice",
        citation="Lapse rate taken constant at 6.5 K/km up to about 10 km, 287 J/(kg K) for air, exponent "
        "5.26, 288.15 K at sea level by the standard and 300 K by the habit of warm sites",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="SignRule",
        citation="Going down in one liquid adds ρgh, going up takes it off: the rule of manometer chains",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="InstrumentPractice",
        citation="Level from an instrument: elevation of its zero or sensor plus the head, which is the "
        "pressure above the air's over the unit weight of the water; a sealed logger needs the air "
        "pressure taken off, a long bubbler line the weight of its gas added",
        edition="none",
        status="common practice, no source",
    ),
)

_MECHANICS = (
    Reference(
        key="Macaulay1919",
        citation="W. H. Macaulay, Note on the deflection of beams, Messenger of Mathematics 48, pp. 129–130",
        edition="1919",
    ),
)

_TEXTBOOKS = (
    textbook("Cengel", "Y. A. Çengel and J. M. Cimbala, Fluid Mechanics: Fundamentals and Applications"),
    textbook("DasFoundation", "B. M. Das, Principles of Foundation Engineering"),
    textbook(
        "DasGeotechnical",
        "B. M. Das, Principles of Geotechnical Engineering",
        "7th, by the companion notebook",
    ),
    textbook("Daugherty", "R. L. Daugherty and J. B. Franzini, Fluid Mechanics"),
    textbook("Dighe", "R. S. Dighe, Hydraulics Made Easy"),
    textbook("Douglas", "J. F. Douglas, Fluid Mechanics"),
    textbook("Fox", "R. W. Fox and A. T. McDonald, Introduction to Fluid Mechanics"),
    textbook("Massey", "B. S. Massey and J. Ward-Smith, Mechanics of Fluids"),
    textbook("Munson", "B. R. Munson, D. F. Young and T. H. Okiishi, Fundamentals of Fluid Mechanics"),
    textbook("Natarajan", "M. K. Natarajan, Principles of Fluid Mechanics"),
    textbook("Paradise", "R. S. Paradise, Problems in Hydraulics"),
    textbook("Sarkar", "B. K. Sarkar, Fluid Mechanics and Hydraulic Machines"),
    textbook("Schaschke", "C. Schaschke, Fluid Mechanics: Worked Examples"),
    textbook(
        "Subramanya",
        "K. Subramanya, 1000 Solved Problems in Fluid Mechanics",
        "2005, by the companion notebook",
    ),
)

_PRACTICE = (
    Reference(
        key="ClockPractice",
        citation="Reading plus gauge zero plus datum shift plus difference to the closure less sill is the "
        "head; call-out, start and closed-by worked back from the water by the times of installing, travel "
        "and mobilisation; a closure's worked example by hand",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="HeadTable",
        citation="Table of pressure γh, force γh²/2 and moment γh³/6 of a head of fresh water, "
        "62.4 lb/ft³, on a "
        "vertical face with the other side dry, and an example of a stop-log bay, "
        "both worked by hand from these "
        "three formulas",
        edition="none",
        status="common practice, no source",
    ),
    Reference(
        key="Quimby",
        citation="T. B. Quimby, A Beginner's Guide to ASCE 7-10, section 6.7, an open teaching guide",
        edition="for ASCE 7-10",
    ),
)

REFERENCES: dict[str, Reference] = {
    reference.key: reference
    for group in (
        _METHODS,
        _WATER,
        _ATMOSPHERE,
        _MECHANICS,
        _TEXTBOOKS,
        _PRACTICE,
        MEMBERS,
        OVERFLOW,
        LEAKAGE,
        HANDLING,
        WALLS,
    )
    for reference in group
}
