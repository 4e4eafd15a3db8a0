"""A worker process of its own for a cluster's worker: `python -m surdwise.review.child FD`.

It answers one request after another over the socket with the given number: a pickled tuple
(seconds, work, args) gives a pickled answer, or a Stopped.  It ends with the process
that started it, when the socket closes, or when a request takes too long.
"""

from __future__ import annotations

import os
import pickle
import signal
import sys
from multiprocessing.connection import Connection
from typing import Any

from .work import Stopped, prepare

LATE = 1.0  # seconds after a request's limit at which the kernel ends this process


def main(fd: int, parent: int) -> None:
    """Answer requests until the other side is gone."""
    prepare(parent)
    signal.signal(signal.SIGALRM, signal.SIG_DFL)
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    with Connection(fd) as line:
        line.send_bytes(b"ready")
        while True:
            try:
                request = line.recv_bytes()
            except EOFError:
                return
            line.send_bytes(pickle.dumps(_answer(request)))


def _answer(request: bytes) -> Any:
    try:
        seconds, work, args = pickle.loads(request)  # from the process that started us
        # the default action of the signal needs no turn of the interpreter
        signal.setitimer(signal.ITIMER_REAL, seconds + LATE)
        return work(*args)
    except Exception as error:
        return Stopped(f"an error inside the program: {type(error).__name__}: {error}")
    finally:
        signal.setitimer(signal.ITIMER_REAL, 0)


if __name__ == "__main__":
    main(int(sys.argv[1]), os.getppid())
