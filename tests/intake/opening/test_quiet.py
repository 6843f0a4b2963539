"""The reader's own outcry stays off the standard error stream, and the stream works again afterwards."""

from __future__ import annotations

import os

from audit.intake.opening.calamine_reader import quiet_panics


def test_what_is_written_to_the_stream_meanwhile_is_swallowed(capfd):
    with quiet_panics():
        os.write(2, b"panicked")
    os.write(2, b"afterwards")
    assert capfd.readouterr().err == "afterwards"


def test_an_exception_passes_through_and_the_stream_comes_back(capfd):
    try:
        with quiet_panics():
            raise KeyError("inside")
    except KeyError:
        os.write(2, b"afterwards")
    assert capfd.readouterr().err == "afterwards"
