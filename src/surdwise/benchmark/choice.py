"""What is compared: the five formulations, and elimination by the engine itself."""

from __future__ import annotations

from ..thesis.parts import Form

ELIMINATION = "elimination"
CHOICES = (*(f.value for f in Form), ELIMINATION)
