"""The table of every form of the sheet language, by the alias it has in the grammar."""

from __future__ import annotations

from .form import Form, Kind
from .forms_asked import ASKED_FORMS
from .forms_given import GIVEN_FORMS

FORMS: dict[str, Form] = {form.alias: form for form in GIVEN_FORMS + ASKED_FORMS}


def forms_of(kind: Kind) -> tuple[Form, ...]:
    """The forms of one group, in the order of the table."""
    return tuple(form for form in FORMS.values() if form.kind is kind)
