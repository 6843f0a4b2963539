"""Whole files or none: write beside the target, then put it in place."""

from __future__ import annotations

import os
import tempfile
from collections.abc import Callable, Iterator
from contextlib import AbstractContextManager, contextmanager
from pathlib import Path
from typing import IO


@contextmanager
def whole_file(
    target: Path, opened: Callable[[Path], AbstractContextManager[IO[str]]] | None = None
) -> Iterator[IO[str]]:
    """Open a text file that takes its place only when everything was written."""
    target.parent.mkdir(parents=True, exist_ok=True)
    handle, name = tempfile.mkstemp(prefix=".writing-", dir=target.parent)
    os.close(handle)
    temporary = Path(name)
    try:
        with opened(temporary) if opened else temporary.open("w", encoding="utf-8", newline="") as stream:
            yield stream
        temporary.chmod(0o644)
        temporary.replace(target)
    finally:
        temporary.unlink(missing_ok=True)
