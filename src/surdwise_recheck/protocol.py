"""What the figure's forms and quantities are written against: arithmetic in which they are run.

Three arithmetics implement it: exact real numbers (one witness figure), elements of a tower over
Q(U) (the figure in general), and the same elements read at one sample.

Beside the first plan stand `Undefined`, which `divide` and `root` raise; `Placing.begin_step`, called
before each given line; and `FrameArithmetic`, for conditions that speak of the frame's parameters.
"""

from __future__ import annotations

from fractions import Fraction
from typing import Protocol


class Undefined(Exception):
    """A quantity or point has no value on this figure; the words say why."""


class Num(Protocol):
    """A number of an arithmetic; also + - * with int and Fraction on either side."""

    def __add__(self, other: Num | int | Fraction) -> Num: ...
    def __sub__(self, other: Num | int | Fraction) -> Num: ...
    def __mul__(self, other: Num | int | Fraction) -> Num: ...
    def __neg__(self) -> Num: ...


class Arithmetic(Protocol):
    """Numbers and the questions that may be asked about them."""

    def number(self, value: int | Fraction) -> Num: ...
    def divide(self, a: Num, b: Num, words: str) -> Num: ...  # raises Undefined(words) where b is zero
    def root(self, q: Num) -> Num: ...  # the non-negative root; Undefined where q < 0
    def absolute(self, e: Num) -> Num: ...
    def sign(self, e: Num) -> int: ...  # read for a strict comparison (kind "open")
    def weak_sign(self, e: Num) -> int: ...  # read for a weak comparison (kind "closed")
    def zero(self, e: Num) -> bool: ...  # read for an equation (kind "thin")
    def same(self, e: Num) -> bool: ...  # identically zero, structure only (no border)


class FrameArithmetic(Arithmetic, Protocol):
    """An arithmetic that knows the frame's parameters."""

    def frame_parameter(self, k: int) -> Num | None: ...  # u_k; None where it has no value


class Placing(Arithmetic, Protocol):
    """What a given line may do besides: place points, choose, demand."""

    def begin_step(self, i: int) -> None: ...  # given line i (from 0) is about to run

    def parameter(self, label: str, domain: str) -> Num: ...  # domain free | positive (> 0) | folded (>= 0)
    def either_root(self, q: Num) -> Num: ...  # any real root: both are admitted
    def choose(self) -> int: ...  # +1 / -1: both are admitted
    def at_missed(self) -> bool: ...  # whether this run takes the missed position of the step
    def require(self, e: Num, op: str, words: str) -> None: ...  # op > >= != : admitted only there
    def vanish(self, e: Num, words: str) -> None: ...  # a hypothesis e = 0
