"""Many sheets at once: every claim file below a folder, in workers that can be stopped."""

from .run import review

__all__ = ["review"]
