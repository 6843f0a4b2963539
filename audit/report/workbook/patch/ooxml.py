"""Names fixed by ISO/IEC 29500 (Transitional) and ISO/IEC 29500-2: namespaces, relationship and content types."""

from __future__ import annotations

MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
MAIN_STRICT = "http://purl.oclc.org/ooxml/spreadsheetml/main"
RELATIONSHIP_IDS = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
PACKAGE_RELATIONSHIPS = "http://schemas.openxmlformats.org/package/2006/relationships"
CONTENT_TYPES = "http://schemas.openxmlformats.org/package/2006/content-types"
EXTENDED_PROPERTIES = "http://schemas.openxmlformats.org/officeDocument/2006/extended-properties"
CUSTOM_PROPERTIES = "http://schemas.openxmlformats.org/officeDocument/2006/custom-properties"
CUSTOM_XML = "http://schemas.openxmlformats.org/officeDocument/2006/customXml"
VALUE_TYPES = "http://schemas.openxmlformats.org/officeDocument/2006/docPropsVTypes"
CHART = "http://schemas.openxmlformats.org/drawingml/2006/chart"
XML = "http://www.w3.org/XML/1998/namespace"
VML = "urn:schemas-microsoft-com:vml"
VML_OFFICE = "urn:schemas-microsoft-com:office:office"
VML_EXCEL = "urn:schemas-microsoft-com:office:excel"

REL_OFFICE_DOCUMENT = f"{RELATIONSHIP_IDS}/officeDocument"
REL_OFFICE_DOCUMENT_STRICT = "http://purl.oclc.org/ooxml/officeDocument/relationships/officeDocument"
REL_WORKSHEET = f"{RELATIONSHIP_IDS}/worksheet"
REL_STYLES = f"{RELATIONSHIP_IDS}/styles"
REL_SHARED_STRINGS = f"{RELATIONSHIP_IDS}/sharedStrings"
REL_CALCULATION_CHAIN = f"{RELATIONSHIP_IDS}/calcChain"
REL_COMMENTS = f"{RELATIONSHIP_IDS}/comments"
REL_THREADED_COMMENTS = "http://schemas.microsoft.com/office/2017/10/relationships/threadedComment"
REL_VML_DRAWING = f"{RELATIONSHIP_IDS}/vmlDrawing"
REL_DRAWING = f"{RELATIONSHIP_IDS}/drawing"
REL_TABLE = f"{RELATIONSHIP_IDS}/table"
REL_HYPERLINK = f"{RELATIONSHIP_IDS}/hyperlink"
REL_EXTENDED_PROPERTIES = f"{RELATIONSHIP_IDS}/extended-properties"
REL_CUSTOM_PROPERTIES = f"{RELATIONSHIP_IDS}/custom-properties"
REL_CUSTOM_XML = f"{RELATIONSHIP_IDS}/customXml"
REL_CUSTOM_XML_PROPERTIES = f"{RELATIONSHIP_IDS}/customXmlProps"
REL_REVISION_HEADERS = f"{RELATIONSHIP_IDS}/revisionHeaders"
REL_SIGNATURE_ORIGIN = "http://schemas.openxmlformats.org/package/2006/relationships/digital-signature/origin"

_SPREADSHEET = "application/vnd.openxmlformats-officedocument.spreadsheetml"
TYPE_WORKBOOK = f"{_SPREADSHEET}.sheet.main+xml"
TYPE_MACRO_WORKBOOK = "application/vnd.ms-excel.sheet.macroEnabled.main+xml"
TYPE_WORKSHEET = f"{_SPREADSHEET}.worksheet+xml"
TYPE_STYLES = f"{_SPREADSHEET}.styles+xml"
TYPE_COMMENTS = f"{_SPREADSHEET}.comments+xml"
TYPE_RELATIONSHIPS = "application/vnd.openxmlformats-package.relationships+xml"
TYPE_VML_DRAWING = "application/vnd.openxmlformats-officedocument.vmlDrawing"
TYPE_CUSTOM_PROPERTIES = "application/vnd.openxmlformats-officedocument.custom-properties+xml"
TYPE_CUSTOM_XML_PROPERTIES = "application/vnd.openxmlformats-officedocument.customXmlProperties+xml"

LARGEST_ROW = 1_048_576
LARGEST_COLUMN = 16_384


def main(local: str) -> str:
    """Name of a SpreadsheetML element as lxml writes it."""
    return f"{{{MAIN}}}{local}"


def mains(locals_: str) -> list[str]:
    """Names of several SpreadsheetML elements, written with spaces between them."""
    return [main(local) for local in locals_.split()]
