"""Units people write beside a number or in a header, each with one spelling we keep."""

from __future__ import annotations

import re

_SPELLINGS: dict[str, tuple[str, ...]] = {
    "min": ("min", "mins", "minute", "minutes", "minuten", "minuto", "minutos", "mn"),
    "h": ("h", "hr", "hrs", "hour", "hours", "std", "stunde", "stunden", "heure", "heures", "hora", "horas"),
    "s": ("s", "sec", "secs", "second", "seconds", "sek", "sekunden", "secondes", "segundos"),
    "steps": ("steps", "step", "schritte", "pas", "pasos"),
    "kg": ("kg", "kgs", "kilo", "kilos", "kilogram", "kilograms", "kilogramm"),
    "g": ("g", "gram", "grams", "gramm"),
    "lb": ("lb", "lbs", "pound", "pounds"),
    "st": ("st", "stone"),
    "km": ("km", "kms", "kilometer", "kilometers", "kilometre", "kilometres"),
    "m": ("m", "meter", "meters", "metre", "metres"),
    "cm": ("cm",),
    "mi": ("mi", "mile", "miles"),
    "mmHg": ("mmhg", "mm hg", "mm[hg]"),
    "bpm": ("bpm", "/min", "beats/min", "1/min"),
    "%": ("%", "percent", "prozent"),
    "°C": ("°c", "℃", "celsius"),
    "°F": ("°f", "℉", "fahrenheit"),
    "mg/dL": ("mg/dl",),
    "mmol/L": ("mmol/l",),
    "mg": ("mg",),
    "mL": ("ml",),
    "L": ("l", "liter", "liters", "litre", "litres"),
    "kcal": ("kcal", "calories"),
    "kJ": ("kj",),
    "points": ("points", "point", "pts", "punkte", "puntos"),
    "/10": ("/10", "/ 10", "out of 10"),
}
_KNOWN: dict[str, str] = {form: unit for unit, forms in _SPELLINGS.items() for form in forms}
_IN_MINUTES: dict[str, float] = {"min": 1.0, "h": 60.0}
_SIZES: tuple[dict[str, float], ...] = (
    {"s": 1 / 60, "min": 1.0, "h": 60.0},
    {"g": 0.001, "kg": 1.0, "lb": 0.45359237, "st": 14 * 0.45359237},
    {"cm": 0.01, "m": 1.0, "km": 1000.0, "mi": 1609.344},
    {"mL": 0.001, "L": 1.0},
    {"kcal": 4.184, "kJ": 1.0},
)
"""Units of one kind, in one of them."""
_NEVER_NEGATIVE = frozenset({"min", "h", "s", "steps", "km", "mi", "bpm", "mmHg", "kg", "lb", "st", "/10"})
_MOST_IN_A_DAY: dict[str, float] = {"min": 1440.0, "h": 24.0, "s": 86400.0}
_HEADER = re.compile(r"(.*\S)\s*[(\[]\s*([^()\[\]]+?(?:\[hg\])?)\s*[)\]]", re.IGNORECASE)


def known_unit(text: str) -> str:
    """The one spelling kept for a unit, or ``""`` for a word that is no unit known here."""
    return _KNOWN.get(text.strip().rstrip(".").casefold(), "")


def split_header(header: str) -> tuple[str, str]:
    """A header's name and unit: ``Weight [kg]`` is Weight in kg; the unit is ``""`` where none is known."""
    match = _HEADER.fullmatch(header)
    unit = known_unit(match.group(2)) if match else ""
    return (match.group(1), unit) if match and unit else (header, "")


def unit_in_name(name: str) -> str:
    """The unit of time a column's name says in passing, as in ``Minutes walked``; ``""`` if none."""
    said = {known_unit(word) for word in re.findall(r"[^\W\d_]{3,}", name)} & set(_IN_MINUTES)
    return said.pop() if len(said) == 1 else ""


def convert_time(value: float, unit: str, wanted: str) -> float | None:
    """A number of minutes or hours in the other of the two; None where either unit is something else."""
    if unit not in _IN_MINUTES or wanted not in _IN_MINUTES:
        return None
    return value * _IN_MINUTES[unit] / _IN_MINUTES[wanted]


def conversion(unit: str, wanted: str) -> tuple[float, float] | None:
    """Factor and offset that turn numbers in one unit into the other: ``wanted = factor * value + offset``.

    Args:
        unit: as people write it.
        wanted: the same.

    Returns:
        None where no conversion is known, or the two are one unit.

    Source: exact by definition: the pound is 0.45359237 kg, the mile 1.609344 km, the stone 14 pounds.
    """
    have, want = known_unit(unit), known_unit(wanted)
    if have == want:
        return None
    for sizes in _SIZES:
        if have in sizes and want in sizes:
            return sizes[have] / sizes[want], 0.0
    if (have, want) == ("°C", "°F"):
        return 1.8, 32.0
    if (have, want) == ("°F", "°C"):
        return 1 / 1.8, -32 / 1.8
    return None


def impossible(value: float, unit: str, *, one_day: bool) -> str:
    """Why a value cannot be, or ``""``: below zero where nothing can be, or longer than a day in one day."""
    if value < 0 and unit in _NEVER_NEGATIVE:
        return "negative"
    if one_day and value > _MOST_IN_A_DAY.get(unit, float("inf")):
        return "more than a day"
    return ""
