"""Constructions of the sheet language, one small file a family."""

from . import centres, curves, made, meets, on_curves, polygons, shapes
from .table import CONSTRUCTIONS

__all__ = ["CONSTRUCTIONS", "centres", "curves", "made", "meets", "on_curves", "polygons", "shapes"]
