"""Every lesson is reached by its own examples, and every place by its beginning."""

from __future__ import annotations

import pytest

from surdwise.sheet import SheetError, read_line
from surdwise.sheet.lessons import LESSONS, PLACES, Lesson, Place

TAUGHT = [(lesson, example) for lesson in LESSONS for example in lesson.examples]


@pytest.mark.parametrize(("lesson", "example"), TAUGHT, ids=[f"{le.keyword} {ex}" for le, ex in TAUGHT])
def test_an_example_is_answered_with_its_advice(lesson: Lesson, example: str) -> None:
    with pytest.raises(SheetError) as caught:
        read_line(lesson.keyword, example)
    assert caught.value.hint.split(" (conditions belong")[0] == lesson.advice, str(caught.value)


@pytest.mark.parametrize("place", PLACES, ids=lambda place: f"{place.keyword} {place.beginning}")
def test_a_beginning_is_answered_with_what_is_expected(place: Place) -> None:
    with pytest.raises(SheetError) as caught:
        read_line(place.keyword, place.beginning)
    assert place.expected in caught.value.message
