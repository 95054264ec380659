"""Every month in four languages, whole and short, written by hand."""

from datetime import date

import pytest

from desktop.exchange.day_tokens import parse_day

NAMES = {
    "English": "January February March April May June July August September October November December",
    "English, short": "Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec",
    "French": "janvier février mars avril mai juin juillet août septembre octobre novembre décembre",
    "French, short": "janv. févr. mars avr. mai juin juil. août sept. oct. nov. déc.",
    "German": "Januar Februar März April Mai Juni Juli August September Oktober November Dezember",
    "Austrian": "Jänner Feber März April Mai Juni Juli August September Oktober November Dezember",
    "German, short": "Jan Feb Mrz Apr Mai Jun Jul Aug Sep Okt Nov Dez",
    "Spanish": "enero febrero marzo abril mayo junio julio agosto septiembre octubre noviembre diciembre",
    "Spanish, short": "ene feb mar abr mayo jun jul ago sept oct nov dic",
}


@pytest.mark.parametrize("language", NAMES)
def test_every_month_of_a_language_is_known(language):
    names = NAMES[language].split()
    days = [parse_day(f"17 {name} 2025") for name in names]
    assert [day.readings() if day else name for day, name in zip(days, names, strict=True)] == [
        {None: date(2025, month, 17)} for month in range(1, 13)
    ]
