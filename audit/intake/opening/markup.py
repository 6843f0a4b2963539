"""Parse the small parts of a package, without entities, network or unbounded trees."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

from lxml import etree

from audit.intake.opening.kinds import damaged


class Stream:
    """Pieces of a part as something that a parser can read from."""

    def __init__(self, chunks: Iterator[bytes]) -> None:
        self._chunks = chunks

    def read(self, _size: int = -1) -> bytes:
        """Give the next piece; b'' at the end."""
        return next(self._chunks, b"")


def parse_part(path: Path, name: str, content: bytes) -> etree._Element:
    """Root element of a part."""
    parser = etree.XMLParser(resolve_entities=False, no_network=True, load_dtd=False, huge_tree=False)
    try:
        return etree.fromstring(content, parser)
    except etree.XMLSyntaxError as error:
        raise damaged(path, f"part {name}: {error.msg}") from error


def local_name(element: etree._Element) -> str:
    """Name of an element without its namespace; '' for comments and instructions."""
    tag = element.tag
    return tag.rpartition("}")[2] if isinstance(tag, str) else ""


def attribute(element: etree._Element, name: str) -> str | None:
    """Attribute by its local name, whatever its namespace."""
    for key, value in element.attrib.items():
        text = key if isinstance(key, str) else key.decode()
        if text.rpartition("}")[2] == name:
            return value if isinstance(value, str) else value.decode()
    return None


def is_true(value: str | None) -> bool:
    """Tell whether an XML boolean is true."""
    return value in ("1", "true", "on")
