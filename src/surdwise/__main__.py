"""`python -m surdwise`."""

from .cli import app

app(prog_name="surdwise")
