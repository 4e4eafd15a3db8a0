"""How the interface's objects show themselves in a notebook, and the way to SymPy and back."""

from .display import html, latex
from .interop import InteropError, from_sympy, to_sympy

__all__ = ["InteropError", "from_sympy", "html", "latex", "to_sympy"]
