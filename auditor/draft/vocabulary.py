"""Words that shops put into comments, in English, German, French, Italian and Spanish, without accents.

Words of five letters and more also match with endings (GROOVING, SCHRUPPEN), and those marked with a leading ``~``
inside compounds as well (INNENGEWINDE). Common practice; add a word where one is missing.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import cache
from typing import TypeVar

from auditor.declared.model import ToolKind

Name = TypeVar("Name", bound=str)

TOOL_KINDS: dict[ToolKind, tuple[str, ...]] = {
    "drilling": (
        "DRILL", "SPOT", "CENTER DRILL", "CENTRE DRILL", "TAP", "TAPPING", "REAM", "REAMER", "REAMING", "COUNTERBORE",
        "COUNTERSINK",
        "~BOHRER", "BOHREN", "ZENTRIER", "ANBOHR", "SENKER", "REIBAHLE", "REIBEN", "GEWINDEBOHR",
        "FORET", "PERCAGE", "PERCER", "CENTRAGE", "POINTAGE", "ALESOIR", "TARAUD",
        "PUNTA", "FORATURA", "FORARE", "CENTRINO", "MASCHIO", "MASCHIATURA", "ALESATORE",
        "BROCA", "TALADR", "PUNTEAR", "ESCARIADOR", "MACHO", "MACHUELO",
    ),
    "threading": (
        "THREAD", "THRD", "~GEWINDE", "FILETAGE", "FILETER", "FILETTATURA", "FILETTARE", "ROSCADO", "ROSCA", "ROSCAR",
    ),
    "parting": (
        "PART OFF", "PARTING", "PARTOFF", "CUT OFF", "CUTOFF", "CUT-OFF", "PART-OFF", "ABSTECH", "ABSTICH",
        "TRONCONN", "TRONCAT", "TRONCARE", "TRONZA",
    ),
    "face grooving": (
        "FACE GROOV", "AXIAL GROOV", "AXIALSTECH", "AXIALEINST", "PLANEINST", "STIRNEINST", "GORGE FRONTALE",
        "GOLA FRONTALE", "RANURA FRONTAL",
    ),
    "grooving": (
        "GROOV", "GRV", "RECESS", "EINSTECH", "EINSTICH", "STECH", "NUTEN", "NUT", "FREISTICH", "GORGE", "RAINURE",
        "GOLA", "SCANALATURA", "RANURA",
    ),
    "stop": (
        "BAR STOP", "BAR PULL", "STOCK STOP", "~ANSCHLAG", "BUTEE", "ARRESTO", "FERMO BARRA", "BATTUTA", "TOPE",
    ),
    "boring": (
        "BORE", "BORING", "BORING BAR", "BARRE D'ALESAGE", "BARRE A ALESER", "~AUSDREH", "INNEN",
        "BOHRSTANGE", "AUSBOHR", "ALESAGE", "ALESER", "INTERIEUR", "BARENO",
        "BARENATURA", "INTERNO", "INTERNA", "MANDRINA", "INTERIOR", "ID", "I.D.",
    ),
    "turning": (
        "TURN", "TURNING", "ROUGH", "FINISH", "FACE", "FACING", "OD", "O.D.", "CHAMFER", "PROFILE", "COPY", "COPYING",
        "BACKTURN",
        "~DREHEN", "DREHSTAHL", "SCHRUPP", "SCHLICHT", "PLANEN", "AUSSEN", "KOPIER", "FASEN",
        "CHARIOT", "DRESSAGE", "DRESSER", "EBAUCHE", "DEGROSSI", "FINITION", "EXTERIEUR", "CHANFREIN", "COPIAGE",
        "TOURNAGE", "TORNITURA", "SGROSSA", "FINITURA", "SFACCIA", "ESTERNO", "ESTERNA", "SMUSSO", "COPIATURA",
        "CILINDRA", "REFRENTA", "DESBASTE", "ACABADO", "EXTERIOR", "CHAFLAN", "COPIADO", "TORNEADO",
    ),
}  # fmt: skip
# A comment that names several kinds means the first of these: a boring bar that grooves is a grooving tool.
KINDS_BY_CLAIM: tuple[ToolKind, ...] = (
    "face grooving", "parting", "drilling", "threading", "grooving", "stop", "boring", "turning",
)  # fmt: skip

MATERIAL_LABELS = (
    "MATERIAL", "MATERIALE", "MATERIAU", "MATIERE", "MATL", "MAT'L", "MAT", "WERKSTOFF", "WKST", "WERKST", "GRADE",
    "NUANCE", "CALIDAD",
)  # fmt: skip
STOCK_LABELS = (
    "STOCK", "BLANK", "RAW", "BAR", "BILLET", "SLUG", "TUBE", "CASTING", "FORGING",
    "ROHTEIL", "ROHMATERIAL", "ROHLING", "ROHMASS", "STANGE", "HALBZEUG", "ROHR", "RUNDMATERIAL", "ABSCHNITT",
    "BRUT", "BARRE", "LOPIN", "DEBIT", "GREZZO", "BARRA", "TONDO", "SPEZZONE", "TUBO",
    "BRUTO", "REDONDO", "TOCHO", "PREFORMA",
)  # fmt: skip
STICK_OUT_LABELS = (
    "STICK OUT", "STICKOUT", "STICKS OUT", "STICKING OUT", "PROTRUDES", "PROTRUSION", "PROJECTION", "HANG OUT",
    "AUSSPANNLAENGE", "AUSSPANNUNG", "AUSKRAGUNG", "SPANNHOEHE AUS", "SORTIE",
    "SPORGENZA", "VOLADIZO", "SALIENTE",
)  # fmt: skip
JAWS_BORED = ("BORED TO", "BORED", "AUSGEDREHT", "ALESES", "TORNITE", "MECANIZADAS")

HOLDING: dict[str, tuple[str, ...]] = {
    "collet": ("COLLET", "SPANNZANGE", "PINCE", "PINZA", "BOQUILLA"),
    "chuck+tailstock": (
        "TAILSTOCK", "CHUCK AND CENT", "LIVE CENTER", "LIVE CENTRE", "REITSTOCK", "KOERNERSPITZE",
        "CONTRE-POINTE", "CONTREPOINTE",
        "POUPEE MOBILE", "CONTROPUNTA", "CONTRAPUNTO",
    ),
    "centres": (
        "BETWEEN CENTERS", "BETWEEN CENTRES", "ZWISCHEN SPITZEN", "ENTRE POINTES", "TRA LE PUNTE", "ENTRE PUNTOS",
    ),
    "chuck": ("CHUCK", "JAWS", "JAW", "FUTTER", "BACKEN", "MANDRIN", "MORS", "MANDRINO", "GRIFFE", "GANASCE", "PLATO",
              "GARRAS", "MORDAZAS"),
}  # fmt: skip
GRIP_INSIDE = ("INSIDE JAWS", "ID JAWS", "ID CHUCKING", "GRIP ID", "INNENSPANN", "SERRAGE INTERIEUR", "PRESA INTERNA")

SKINS: dict[str, tuple[str, ...]] = {
    "cast": ("CASTING", "AS CAST", "GUSSTEIL", "MOULE", "FUSIONE", "FUNDIDO"),
    "forged": ("FORGING", "FORGED", "SCHMIEDETEIL", "GESCHMIEDET", "FORGE", "FORGIATO", "FORJADO"),
    "hot rolled": ("HOT ROLLED", "HRS", "WARMGEWALZT", "LAMINE A CHAUD", "LAMINATO A CALDO", "LAMINADO EN CALIENTE"),
}  # fmt: skip
SECTIONS: dict[str, tuple[str, ...]] = {
    "hexagon": ("HEX", "HEXAGON", "SECHSKANT", "6KT", "6-KT", "SW", "SIX PANS", "ESAGONALE", "ESAGONO"),
    "square": ("SQUARE BAR", "VIERKANT", "4KT", "4-KT", "CARRE", "QUADRO", "CUADRADO"),
}  # fmt: skip

# A word for a whole family of materials, and the catalogue's entry for it.
FAMILIES: dict[str, tuple[str, ...]] = {
    "tool steel annealed": ("TOOL STEEL", "WERKZEUGSTAHL", "ACIER A OUTIL", "ACCIAIO PER UTENSILI"),
    "11SMnPb30": ("FREE CUTTING STEEL", "AUTOMATENSTAHL", "ACIER DE DECOLLETAGE", "ACIER DECOLLETAGE"),
    "austenitic stainless": ("STAINLESS", "INOX", "EDELSTAHL", "ROSTFREI", "INOXIDABLE", "SST", "CRES"),
    "duplex stainless": ("DUPLEX",),
    "grey iron 180 HB": ("CAST IRON", "GREY IRON", "GRAY IRON", "GRAUGUSS", "FONTE", "GHISA", "FUNDICION"),
    "nodular iron ferritic": ("DUCTILE IRON", "NODULAR", "SPHAEROGUSS", "FONTE GS", "GHISA SFEROIDALE"),
    "aluminium wrought aged": ("ALUMINIUM", "ALUMINUM", "ALU", "AL", "ALLUMINIO", "ALUMINIO"),
    "brass": ("BRASS", "MESSING", "LAITON", "OTTONE", "LATON"),
    "CuSn12": ("BRONZE", "BRONZO", "BRONCE"),
    "Cu-ETP": ("COPPER", "KUPFER", "CUIVRE", "RAME", "COBRE"),
    "titanium alpha-beta": ("TITANIUM", "TITAN", "TITANE", "TITANIO", "TI"),
    "POM-C": ("POM", "ACETAL"),
    "PA6": ("NYLON", "POLYAMID"),
    "unalloyed steel": ("STEEL", "STAHL", "ACIER", "ACCIAIO", "ACERO", "MILD STEEL", "CRS", "BAUSTAHL"),
}  # fmt: skip

SUBSTRATES: dict[str, tuple[str, ...]] = {
    "high-speed steel": ("HSS", "HSCO", "ARS"),
    "carbide": ("CARBIDE", "VHM", "HARTMETALL", "CARBURE", "METALLO DURO", "METAL DURO"),
    "cermet": ("CERMET",),
    "ceramic": ("CERAMIC", "KERAMIK", "CERAMIQUE", "CERAMICA"),
    "cbn": ("CBN",),
    "pcd": ("PCD", "PKD"),
}  # fmt: skip
LEFT = ("LH", "LEFT", "LEFT HAND", "LINKS", "GAUCHE", "SINISTRO", "IZQUIERDA")

# Marks in front of the number of a tool, besides a bare T.
TOOL_LABELS = (
    "TOOL", "TOOL NO", "TOOL #", "WERKZEUG", "WKZ", "OUTIL", "UTENSILE", "UT", "HERRAMIENTA", "HTA", "STATION", "POS",
)  # fmt: skip


def named(text: str, words: Mapping[Name, tuple[str, ...]]) -> list[Name]:
    """The names under which the words of an upper-case text stand, in the order of the table.

    Longer words are taken first and used up, so that a tap (GEWINDEBOHRER) is no thread (GEWINDE).

    >>> named("ID THREAD", TOOL_KINDS), named("INNENGEWINDE", TOOL_KINDS), named("ROUGH 80 DEG", TOOL_KINDS)
    (['threading', 'boring'], ['threading', 'boring'], ['turning'])
    """
    found: set[str] = set()
    for pattern, name in _patterns(tuple(words.items())):
        text, count = pattern.subn(" ", text)
        if count:
            found.add(name)
    return [name for name in words if name in found]


def without(text: str, words: Mapping[Name, tuple[str, ...]]) -> str:
    """The text with these words taken out."""
    for pattern, _ in _patterns(tuple(words.items())):
        text = pattern.sub(" ", text)
    return text


def holds(text: str, words: tuple[str, ...]) -> re.Match[str] | None:
    """The longest of the words that an upper-case text holds, where it stands."""
    for pattern, _ in _patterns((("", words),)):
        match = pattern.search(text)
        if match:
            return match
    return None


@cache
def _patterns(words: tuple[tuple[str, tuple[str, ...]], ...]) -> tuple[tuple[re.Pattern[str], str], ...]:
    pairs = sorted(((word, name) for name, entry in words for word in entry), key=lambda pair: -len(pair[0].strip("~")))
    return tuple((re.compile(_pattern(word)), name) for word, name in pairs)


def _pattern(word: str) -> str:
    inside, bare = word.startswith("~"), re.escape(word.lstrip("~"))
    begin = "" if inside else r"(?<![A-Z0-9])"
    ending = "" if len(word) >= 5 else r"(?![A-Z0-9])"
    return begin + bare + ending


