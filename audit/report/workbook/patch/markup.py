"""XML read with care and written back: no document type, no entities, no network."""

from __future__ import annotations

import codecs
import re
from collections.abc import Iterable, Iterator
from typing import NoReturn
from xml.parsers import expat

from lxml import etree

from audit.report.workbook.patch.refusal import CannotPatch

_DECLARED_ENCODING = re.compile(rb"""^<\?xml[^>]*?encoding\s*=\s*["']([A-Za-z0-9._-]+)["']""")


def parse(data: bytes, part: str) -> etree._Element:
    """Root of a part; refuses a document type and XML that is not well formed."""
    _refuse_document_type(data, part)
    try:
        return etree.fromstring(data, _parser())
    except etree.XMLSyntaxError as error:
        raise CannotPatch(f"the part {part} is not well-formed XML ({error})") from error


def parse_leniently(data: bytes) -> etree._Element | None:
    """Root of a part that need not be well formed, good for looking things up; None where nothing is left."""
    try:
        return etree.fromstring(data, _parser(recover=True))
    except etree.XMLSyntaxError:
        return None


def serialise(root: etree._Element) -> bytes:
    """Bytes of a whole part in UTF-8, with what stands before and after its root."""
    return etree.tostring(root.getroottree(), xml_declaration=True, encoding="UTF-8", standalone=True)


def new_root(namespace: str, local: str, **prefixes: str) -> etree._Element:
    """Root of a new part, whose namespace needs no prefix.

    >>> etree.tostring(new_root("urn:a", "list", b="urn:b"))
    b'<list xmlns="urn:a" xmlns:b="urn:b"/>'
    """
    declared = "".join(f' xmlns:{prefix}="{other}"' for prefix, other in prefixes.items())
    return etree.fromstring(f'<{local} xmlns="{namespace}"{declared}/>')


def is_plain_utf8(data: bytes) -> bool:
    """Whether the bytes are UTF-8 by mark, declaration or default, so that they may be searched as they are.

    >>> is_plain_utf8(b'<?xml version="1.0" encoding="ISO-8859-1"?><a/>')
    False
    """
    data = data[:200].removeprefix(codecs.BOM_UTF8)
    if not data.startswith(b"<") or data[1:2] == b"\0":
        return False
    declared = _DECLARED_ENCODING.match(data)
    return declared is None or declared[1].lower() in {b"utf-8", b"us-ascii", b"ascii"}


def children(parent: etree._Element) -> Iterator[etree._Element]:
    """Child elements, without comments and processing instructions."""
    return (child for child in parent if isinstance(child.tag, str))


def insert_in_order(parent: etree._Element, new: etree._Element, later: Iterable[str]) -> None:
    """Put a child where its schema wants it: before the first child whose name is among `later`."""
    names = set(later)
    for position, child in enumerate(parent):
        if child.tag in names:
            parent.insert(position, new)
            return
    parent.append(new)


def _parser(recover: bool = False) -> etree.XMLParser:
    return etree.XMLParser(
        resolve_entities=False,
        no_network=True,
        load_dtd=False,
        huge_tree=True,
        strip_cdata=False,
        recover=recover,
    )


def _refuse_document_type(data: bytes, part: str) -> None:
    def refuse(*_: object) -> NoReturn:
        raise CannotPatch(f"the part {part} declares a document type, which a workbook must not do")

    scanner = expat.ParserCreate()
    scanner.StartDoctypeDeclHandler = refuse
    try:
        scanner.Parse(data, True)
    except (expat.ExpatError, ValueError, LookupError) as error:
        raise CannotPatch(f"the part {part} is not well-formed XML ({error})") from error
