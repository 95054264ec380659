"""Names of months and weekdays in English, French, German and Spanish, and words that head a day column."""

from __future__ import annotations

import unicodedata

_MONTHS: tuple[str, ...] = (
    "january jan janvier janv januar janner jan enero ene",
    "february feb fevrier fevr fev februar feber febrero",
    "march mar mars marz maerz mrz marzo",
    "april apr avril avr abril abr",
    "may mai mayo",
    "june jun juin juni junio",
    "july jul juillet juil juli julio",
    "august aug aout agosto ago",
    "september sep sept septembre septiembre setiembre set",
    "october oct octobre oktober okt octubre",
    "november nov novembre noviembre",
    "december dec decembre dezember dez diciembre dic",
)
MONTH_NUMBERS: dict[str, int] = {
    name: number for number, names in enumerate(_MONTHS, start=1) for name in names.split()
}
"""Month by its name or short name: lower case, no accents, no full stop."""


def _words(text: str) -> frozenset[str]:
    return frozenset(text.split())


WEEKDAYS = _words(
    """
    monday mon tuesday tue tues wednesday wed thursday thu thur thurs friday fri saturday sat sunday sun
    lundi lun mardi mar mercredi mer jeudi jeu vendredi ven samedi sam dimanche dim
    montag mo dienstag di mittwoch mi donnerstag do freitag fr samstag sonnabend sa sonntag so
    lunes martes miercoles mie jueves jue viernes vie sabado sab domingo dom
    """
)

FILLERS = _words("of the de del le den der am el")

DAY_HEADERS = _words("date day dates year month dated datum tag jahr monat jour annee mois fecha dia ano mes")

TIME_HEADERS = frozenset(
    ("time", "time of day", "clock", "clock time", "local time", "uhrzeit", "zeit", "heure", "hora")
)

INDEX_HEADERS = frozenset(
    ("", "#", "index", "id", "no", "nr", "n", "row", "line", "number", "nummer", "numero", "unnamed 0")
)

NAME_HEADERS = _words(
    """
    measure measures measurement metric variable parameter quantity
    messgrosse messwert kennzahl grandeur mesure indicateur parametre magnitud medida parametro
    """
)
"""Headers of a column that names the measure of each row: there is a row a reading."""

UNIT_HEADERS = _words("unit units einheit einheiten unite unites unidad unidades uom")

SLOT_HEADERS = _words("slot slots")

STATUS_HEADERS = _words("status")

_PARTS_OF_DAY: dict[str, tuple[str, ...]] = {
    "morning": ("morning", "am", "morgen", "morgens", "fruh", "vormittag", "matin", "manana"),
    "midday": ("midday", "noon", "mittag", "mittags", "midi", "mediodia"),
    "afternoon": ("afternoon", "nachmittag", "nachmittags", "apres-midi", "tarde"),
    "evening": ("evening", "pm", "abend", "abends", "soir"),
    "night": ("night", "nacht", "nachts", "nuit", "noche"),
}
PARTS_OF_DAY: dict[str, str] = {word: part for part, words in _PARTS_OF_DAY.items() for word in words}
"""The slot that a word for a part of the day means."""

TOTAL_WORDS = _words(
    """
    total totals subtotal sum sums average avg mean median summe gesamt mittel mittelwert durchschnitt
    somme moyenne suma promedio media minimum maximum min max count
    """
)


def simple(text: str) -> str:
    """The text in lower case without accents, full stops and colons, for looking a word up."""
    if not text.isascii():
        decomposed = unicodedata.normalize("NFKD", text)
        text = "".join(char for char in decomposed if not unicodedata.combining(char))
    return text.casefold().replace(".", "").replace(":", "").strip()


def is_total(text: str) -> bool:
    """Whether a cell is the label of a closing row, such as ``Total`` or ``Average per day``."""
    words = simple(text).split()
    return bool(words) and words[0] in TOTAL_WORDS
