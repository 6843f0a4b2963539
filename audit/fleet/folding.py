"""Fold names before they are compared: what never tells two tags apart, and what people write now and then."""

from __future__ import annotations

_SIGNS = str.maketrans("", "", " -._\u2010\u2011\u2012\u2013\u2014\u2212\u00a0")


def exact(name: str) -> str:
    """Fold what never tells two tags apart: case and surrounding or doubled spaces.

    >>> exact("  p-101  A ")
    'p-101 a'
    """
    return " ".join(name.casefold().split())


def loose(name: str) -> str:
    """Fold dashes, spaces, dots and underscores too.

    >>> loose("CV 101 A") == loose("cv-101a")
    True
    """
    return exact(name).translate(_SIGNS)
