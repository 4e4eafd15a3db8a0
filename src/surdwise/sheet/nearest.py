"""The nearest right word to a wrong one."""

from __future__ import annotations

from collections.abc import Iterable

LONGEST = 40  # longer words are nobody's slip of the pen


def nearest(word: str, words: Iterable[str], cutoff: float = 0.6) -> str:
    """The most similar of the words, or "" if none is similar enough (1 is equal, 0 is nothing alike)."""
    if not word or len(word) > LONGEST:
        return ""
    from difflib import (
        get_close_matches,  # costs a few milliseconds, and only mistakes need it
    )

    found = get_close_matches(word, sorted(set(words) - {word}), 1, cutoff)
    return found[0] if found else ""
