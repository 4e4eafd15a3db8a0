"""Benchmarking formulations: what each way of putting a distance statement to an engine costs, and
where its answer is not the literal truth."""

from .command import compare
from .measure import Options
from .run import Benchmark, benchmark

__all__ = ["Benchmark", "Options", "benchmark", "compare"]
