"""Every standard and book that a figure, a constant or a check rests on, once."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

How = Literal["seen", "excerpt", "from memory", "common practice"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Source:
    """A published source.

    Attributes
    ----------
    key : str
        Short name used in the code.
    title : str
        Author or body, title, number.
    edition : str
        Year or edition.
    place : str
        Clause, table, equation or page.
    how : str
        ``"seen"``: the passage itself was read; ``"excerpt"``: an openly published excerpt or companion was
        read; ``"from memory"``; ``"common practice"``: no source.
    """

    key: str
    title: str
    edition: str = ""
    place: str = ""
    how: How = "from memory"

    def __str__(self) -> str:
        """Title, edition, place and how it is known."""
        parts = [self.title, self.edition, self.place]
        return ", ".join(part for part in parts if part) + f" ({self.how})"


PRACTICE = Source(key="practice", title="Common practice, no source", how="common practice")
OWN = Source(key="own", title="Balance of mass, energy or force, derived in this project", how="from memory")

# Standards
ISO_6358 = Source(
    key="iso6358",
    title="ISO 6358-1, Pneumatic fluid power: flow-rate characteristics of components",
    edition="2013",
    place="flow equation with C, b, m; density 1.185 kg/m³ of the reference atmosphere",
)
ISO_6358_3 = Source(
    key="iso6358-3",
    title="ISO 6358-3, Pneumatic fluid power: steady-state flow-rate characteristics of systems",
    edition="2014",
    place="scope only: chains are solved numerically",
    how="excerpt",
)
ISO_8778 = Source(
    key="iso8778",
    title="ISO 8778, Pneumatic fluid power: standard reference atmosphere",
    edition="2003",
    place="20 degC, 100 kPa, 65 % relative humidity",
)
DIN_1343 = Source(
    key="din1343",
    title="DIN 1343, Reference conditions, normal conditions, normal volume",
    edition="1990",
    place="0 degC, 101 325 Pa",
    how="excerpt",
)
ISO_1217 = Source(
    key="iso1217",
    title="ISO 1217, Displacement compressors: acceptance tests",
    edition="2009",
    place="standard inlet 20 degC, 100 kPa, dry; free air delivered at the inlet's own state",
)
SCFM = Source(
    key="scfm",
    title="Encyclopaedia articles on the standard cubic foot per minute and its reference states",
    place="14.5 psia 68 degF dry; 14.696 psia 60 degF dry; 14.7 psia 68 degF 36 %",
    how="excerpt",
)
ISO_80000 = Source(
    key="iso80000", title="ISO 80000-3, Quantities and units: space and time", edition="2019", place="g_n"
)
ISO_2533 = Source(
    key="iso2533",
    title="ISO 2533, Standard atmosphere",
    edition="1975",
    place="101 325 Pa; R = 287.053 J/(kg K), exponent 1.4",
)
IEC_60534 = Source(
    key="iec60534",
    title="IEC 60534-2-1, Industrial-process control valves: sizing equations",
    edition="2011",
    place="constant N6; Kv and Cv",
)
AISC_360 = Source(
    key="aisc360",
    title="AISC 360, Specification for structural steel buildings",
    edition="2016",
    place="commentary, table C-A-7.1, recommended effective length factors",
)
IAPWS_IF97 = Source(
    key="iapws_if97",
    title="IAPWS R7-97, Industrial formulation 1997 for water and steam",
    edition="2012",
    place="region 4, eq. 30 and 31; check values of table 35",
)
IAPWS_ICE = Source(
    key="iapws_ice",
    title="IAPWS R14-08, Pressure along the melting and sublimation curves of ordinary water",
    edition="2011",
    place="eq. 6 and its check value at 230 K",
)
ISO_4414 = Source(
    key="iso4414",
    title="ISO 4414, Pneumatic fluid power: general rules and safety requirements",
    edition="2010",
    how="excerpt",
)
PCC_2 = Source(key="pcc2", title="ASME PCC-2, Repair of pressure equipment and piping", place="stored energy")
OSHA_1910 = Source(
    key="osha1910.242",
    title="29 CFR 1910.242(b), United States: compressed air used for cleaning",
    place="below 30 psi",
    how="seen",
)

# Books; page numbers are those that the open companion notebooks give, whose editions are not always named
MORAN = Source(
    key="moran",
    title="Moran, Shapiro, Fundamentals of Engineering Thermodynamics",
    place="example 2.1, p. 39; properties of air",
    how="excerpt",
)
BORGNAKKE = Source(
    key="borgnakke",
    title="Borgnakke, Sonntag, Fundamentals of Thermodynamics",
    place="example 4.1, p. 96",
    how="excerpt",
)
CENGEL_BOLES = Source(
    key="cengel",
    title="Cengel, Boles, Thermodynamics: An Engineering Approach",
    place="examples 4-3, 4-4, 7-13, 7-15, 7-22 and 8-7",
    how="excerpt",
)
CENGEL_CIMBALA = Source(
    key="cengel_cimbala", title="Cengel, Cimbala, Fluid Mechanics", place="example 12-5", how="excerpt"
)
JOEL = Source(
    key="joel",
    title="Joel, Basic Engineering Thermodynamics",
    edition="5th ed.",
    place="chapters 1, 5, 14 and 19",
    how="excerpt",
)
NAG = Source(
    key="nag",
    title="Nag, Engineering Thermodynamics",
    place="examples 3.10, 3.11 and 18.2 to 18.6, p. 63 and 724 to 728",
    how="excerpt",
)
SINGH = Source(
    key="singh",
    title="Singh, Applied Thermodynamics",
    place="example 16.2, p. 742; Engineering Thermodynamics, example 3.22, p. 91",
    how="excerpt",
)
EASTOP = Source(
    key="eastop",
    title="Eastop, McConkey, Applied Thermodynamics for Engineering Technologists",
    edition="5th ed.",
    place="polytropic processes; air motors",
)
FOX = Source(
    key="fox",
    title="Fox, McDonald, Introduction to Fluid Mechanics",
    place="example 12.2, p. 634; filling of a tank, chapter 4",
    how="excerpt",
)
ISERMANN = Source(
    key="isermann",
    title="Isermann, Combustion Engine Diagnosis",
    edition="2017",
    place="p. 252: outflow function, elliptic form",
    how="seen",
)
MURUGAPERUMAL = Source(
    key="murugaperumal",
    title="Murugaperumal, Gas Dynamics and Jet Propulsion",
    edition="1st ed., 2005",
    place="example 1.39, p. 68: discharge of a vessel",
    how="excerpt",
)
ESPOSITO = Source(
    key="esposito",
    title="Esposito, Fluid Power with Applications",
    place="chapters 13 and 14",
    how="excerpt",
)
SULLIVAN = Source(
    key="sullivan",
    title="Sullivan, Fluid Power: Theory and Applications",
    edition="4th ed.",
    place="examples 15.5 and 16.5",
    how="excerpt",
)
GERE = Source(key="gere", title="Gere, Mechanics of Materials", place="example 11.1, p. 763", how="excerpt")
BANSAL = Source(
    key="bansal",
    title="Bansal, A Textbook of Strength of Materials",
    place="problems 13.1 and 13.3: cantilever with a load at its end, and with a load all along",
    how="excerpt",
)
SHIGLEY = Source(
    key="shigley",
    title="Shigley, Mischke, Budynas, Mechanical Engineering Design",
    edition="7th ed., 2004",
    place="columns: Euler and Johnson",
)
ASHRAE = Source(
    key="ashrae",
    title="ASHRAE Handbook, Fundamentals",
    edition="2017",
    place="chapter 1, humidity ratio from vapour pressure",
)
ARMSTRONG = Source(
    key="armstrong",
    title="Armstrong-Hélouvry, Control of Machines with Friction",
    edition="1991",
    place="form of the friction curve",
)

# Tables, papers and public guidance
ORIFICE_TABLE = Source(
    key="orifice_table",
    title="Handbook table: discharge of air through an orifice, cubic feet of free air a minute",
    place="coefficient 1; 15 to 125 psi gauge, 1/64 to 1 inch",
    how="seen",
)
BEAM_TABLE = Source(
    key="beam_table",
    title="Published tables of beam formulas: beam over two supports, load on its overhanging end",
    place="reactions",
    how="seen",
)
NOMOGRAM = Source(
    key="nomogram",
    title="Handbook nomogram: air consumption of cylinders, metric",
    place="table 2, p. 62, example",
    how="seen",
)
JCGM_101 = Source(
    key="jcgm101",
    title="JCGM 101, Evaluation of measurement data, Supplement 1 to the GUM: propagation of distributions",
    edition="2008",
    place="6.4.2, rectangular distribution where only limits are known",
)
AIR_POWER = Source(key="air_power", title="Cai, Kagawa et al., papers on the air power of pneumatic systems")
NAVAL_DECAY = Source(
    key="naval_decay",
    title="NAVFAC MO-209, Maintenance of steam, hot water, and compressed air distribution systems",
    place="tables 5-3 and 5-4, leak test by pressure decay",
    how="seen",
)

_ALL = (
    PRACTICE,
    OWN,
    ISO_6358,
    ISO_6358_3,
    ISO_8778,
    DIN_1343,
    ISO_1217,
    SCFM,
    ISO_80000,
    ISO_2533,
    IEC_60534,
    AISC_360,
    IAPWS_IF97,
    IAPWS_ICE,
    ISO_4414,
    PCC_2,
    OSHA_1910,
    MORAN,
    BORGNAKKE,
    CENGEL_BOLES,
    CENGEL_CIMBALA,
    JOEL,
    NAG,
    SINGH,
    EASTOP,
    FOX,
    ISERMANN,
    MURUGAPERUMAL,
    ESPOSITO,
    SULLIVAN,
    GERE,
    BANSAL,
    SHIGLEY,
    ASHRAE,
    ARMSTRONG,
    ORIFICE_TABLE,
    BEAM_TABLE,
    NOMOGRAM,
    JCGM_101,
    AIR_POWER,
    NAVAL_DECAY,
)
SOURCES: dict[str, Source] = {item.key: item for item in _ALL}
"""All sources by key; the report prints those that it used."""
