"""How many years of school a sentence asks for, by the formula of Flesch and Kincaid (1975).

Syllables are counted by rule: groups of vowels, without the silent endings. A number is one word of one syllable.
"""

from __future__ import annotations

import re

_WORD = re.compile(r"[A-Za-z]+(?:['’][a-z]+)?|\d[\d.,:-]*")
_ENDS = re.compile(r"[.?!:;](?=\s|$)")
_VOWELS = re.compile(r"[aeiouy]+")


def syllables(word: str) -> int:
    """The syllables of a word; at least one."""
    word = re.sub(r"['’][a-z]+$", "", word.lower())
    if not word.isalpha():
        return 1
    word = re.sub(r"(?<=[^aeiouy])e(?=(?:ly|less|ment)$)", "", word)
    groups = len(_VOWELS.findall(word))
    # A closing e is silent, as in "move", "moved" and "likely", but not in "middle", "rated" or "ages".
    silent = (
        (word.endswith("e") and not re.search(r"[^aeiouyr]le$", word))
        or (word.endswith("ed") and word[-3:-2] not in "td")
        or (word.endswith("es") and not re.search(r"(?:[csxz]|g|ch|sh)es$", word) and not word.endswith("les"))
    )
    spoken_vowel = re.search(r"[aeiouy](?:e|ed|es)$", word) is not None
    return max(1, groups - (silent and not spoken_vowel))


def grade(text: str) -> float:
    """0.39 words a sentence + 11.8 syllables a word − 15.59."""
    words = _WORD.findall(text)
    sentences = max(1, len(_ENDS.findall(text)))
    return 0.39 * len(words) / sentences + 11.8 * sum(map(syllables, words)) / len(words) - 15.59
