"""Workbooks written part by part, with what a spreadsheet library would not write or would lose."""

from __future__ import annotations

import zipfile
from pathlib import Path

MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main"
OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships"
PACKAGE = "http://schemas.openxmlformats.org/package/2006"
CONTENT = "application/vnd.openxmlformats-officedocument"
DRAWING = "http://schemas.openxmlformats.org/drawingml/2006"
COMPATIBILITY = "http://schemas.openxmlformats.org/markup-compatibility/2006"
X14 = "http://schemas.microsoft.com/office/spreadsheetml/2009/9/main"
EXCEL_MAIN = "http://schemas.microsoft.com/office/excel/2006/main"
VML = "urn:schemas-microsoft-com:vml"
VML_OFFICE = "urn:schemas-microsoft-com:office:office"
VML_EXCEL = "urn:schemas-microsoft-com:office:excel"
HEAD = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n'

Parts = dict[str, bytes]

ONE_PIXEL_PNG = bytes.fromhex(
    "89504e470d0a1a0a0000000d494844520000000100000001080600000"
    "01f15c4890000000d49444154789c63f8ffff3f0300050001ff8d3f5b8b0000000049454e44ae426082"
)


def write_parts(path: Path, parts: Parts) -> Path:
    """Write a package with the parts in the order given; binary parts are stored, others deflated."""
    with zipfile.ZipFile(path, "w") as archive:
        for name, content in parts.items():
            info = zipfile.ZipInfo(name, (2019, 5, 17, 10, 20, 30))
            info.compress_type = zipfile.ZIP_STORED if name.endswith((".bin", ".png")) else zipfile.ZIP_DEFLATED
            archive.writestr(info, content)
    return path


def read_parts(path: Path) -> Parts:
    """Content of all parts in their order."""
    with zipfile.ZipFile(path) as archive:
        return {name: archive.read(name) for name in archive.namelist()}


def relationships(*rows: tuple[str, str, str]) -> bytes:
    """Relationships part from identifier, type and target; a target with a scheme lies outside."""
    inside = "".join(
        f'<Relationship Id="{identifier}" Type="{kind if ":" in kind else f"{OFFICE}/{kind}"}" Target="{target}"'
        + (' TargetMode="External"/>' if "://" in target else "/>")
        for identifier, kind, target in rows
    )
    return f'{HEAD}<Relationships xmlns="{PACKAGE}/relationships">{inside}</Relationships>'.encode()


def worksheet(rows: str, before: str = "", after: str = "", declared: str = "") -> bytes:
    """Worksheet part around rows."""
    return (
        f'{HEAD}<worksheet xmlns="{MAIN}" xmlns:r="{OFFICE}"{declared}>{before}<sheetData>{rows}</sheetData>{after}'
        "</worksheet>"
    ).encode()


def plain_parts(rows: str = "", before: str = "", after: str = "") -> Parts:
    """The smallest workbook that every reader accepts: one sheet 'Motors', a few formats."""
    styles = (
        f'{HEAD}<styleSheet xmlns="{MAIN}">'
        '<numFmts count="1"><numFmt numFmtId="164" formatCode="0.0&quot; A&quot;"/></numFmts>'
        '<fonts count="2"><font><sz val="11"/><name val="Calibri"/></font>'
        '<font><b/><sz val="11"/><color rgb="FF9C0006"/><name val="Calibri"/></font></fonts>'
        '<fills count="3"><fill><patternFill patternType="none"/></fill><fill><patternFill patternType="gray125"/>'
        '</fill><fill><patternFill patternType="solid"><fgColor rgb="FFDDEBF7"/><bgColor indexed="64"/></patternFill>'
        "</fill></fills>"
        '<borders count="2"><border><left/><right/><top/><bottom/><diagonal/></border>'
        '<border><left style="thin"><color auto="1"/></left><right/><top/><bottom/><diagonal/></border></borders>'
        '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>'
        '<cellXfs count="4"><xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/>'
        '<xf numFmtId="164" fontId="1" fillId="2" borderId="1" xfId="0" applyNumberFormat="1" applyFont="1" '
        'applyFill="1" applyBorder="1" applyAlignment="1"><alignment horizontal="center" wrapText="1"/></xf>'
        '<xf numFmtId="9" fontId="0" fillId="0" borderId="0" xfId="0" applyProtection="1"><protection locked="0"/></xf>'
        '<xf numFmtId="14" fontId="1" fillId="0" borderId="0" xfId="0" applyNumberFormat="1"/></cellXfs>'
        '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles><dxfs count="0"/>'
        "</styleSheet>"
    )
    return {
        "[Content_Types].xml": (
            f'{HEAD}<Types xmlns="{PACKAGE}/content-types">'
            f'<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/>'
            '<Default Extension="xml" ContentType="application/xml"/>'
            f'<Override PartName="/xl/workbook.xml" ContentType="{CONTENT}.spreadsheetml.sheet.main+xml"/>'
            f'<Override PartName="/xl/worksheets/sheet1.xml" ContentType="{CONTENT}.spreadsheetml.worksheet+xml"/>'
            f'<Override PartName="/xl/styles.xml" ContentType="{CONTENT}.spreadsheetml.styles+xml"/></Types>'
        ).encode(),
        "_rels/.rels": relationships(("rId1", "officeDocument", "xl/workbook.xml")),
        "xl/workbook.xml": (
            f'{HEAD}<workbook xmlns="{MAIN}" xmlns:r="{OFFICE}"><sheets><sheet name="Motors" sheetId="1" r:id="rId1"/>'
            "</sheets></workbook>"
        ).encode(),
        "xl/_rels/workbook.xml.rels": relationships(
            ("rId1", "worksheet", "worksheets/sheet1.xml"), ("rId2", "styles", "styles.xml")
        ),
        "xl/worksheets/sheet1.xml": worksheet(rows, before, after),
        "xl/styles.xml": styles.encode(),
    }


def note_shape(number: int, row: int, column: int) -> str:
    """Shape of a note with a box and a colour of its own."""
    return (
        f'<v:shape id="_x0000_s{number}" type="#_x0000_t202" style="position:absolute;width:96pt;height:55.5pt;'
        f'z-index:1;visibility:hidden" fillcolor="#ccffcc" o:insetmode="auto"><v:fill color2="#ccffcc"/>'
        f'<x:ClientData ObjectType="Note"><x:MoveWithCells/><x:Anchor>2, 15, 0, 10, 4, 15, 4, 4</x:Anchor>'
        f"<x:AutoFill>False</x:AutoFill><x:Row>{row - 1}</x:Row><x:Column>{column - 1}</x:Column></x:ClientData>"
        "</v:shape>"
    )


def vml(shapes: str, blocks: str = "1") -> str:
    """VML drawing around shapes."""
    return (
        f'<xml xmlns:v="{VML}" xmlns:o="{VML_OFFICE}" xmlns:x="{VML_EXCEL}"><o:shapelayout v:ext="edit">'
        f'<o:idmap v:ext="edit" data="{blocks}"/></o:shapelayout><v:shapetype id="_x0000_t202" '
        f'coordsize="21600,21600" o:spt="202" path="m,l,21600r21600,l21600,xe"/>{shapes}</xml>'
    )


UNCLOSED_CONTROL = (
    '<v:shape id="_x0000_s1040" type="#_x0000_t201" style="position:absolute"><v:textbox><div><font size="2">Start'
    '<br>now</font></div></v:textbox><x:ClientData ObjectType="Button"><x:Anchor>5, 0, 5, 0, 6, 0, 6, 0</x:Anchor>'
    "</x:ClientData></v:shape>"
)
"""A form control whose text holds a tag that is never closed, as spreadsheet programs write it."""


def with_notes(parts: Parts, drawing: str | None = None) -> Parts:
    """Add a note with two formatted runs and a box of its own in B2 of the first sheet."""
    parts = dict(parts)
    comments = (
        f'{HEAD}<comments xmlns="{MAIN}"><authors><author>R. Engineer</author></authors><commentList>'
        '<comment ref="B2" authorId="0"><text><r><rPr><b/><sz val="9"/><rFont val="Tahoma"/></rPr><t>Checked </t></r>'
        '<r><rPr><i/><color rgb="FF0000FF"/><sz val="12"/><rFont val="Arial"/></rPr><t xml:space="preserve">on site '
        "</t></r></text></comment></commentList></comments>"
    )
    parts["xl/comments1.xml"] = comments.encode()
    parts["xl/drawings/vmlDrawing1.vml"] = (vml(note_shape(1025, 2, 2)) if drawing is None else drawing).encode()
    parts["xl/worksheets/_rels/sheet1.xml.rels"] = relationships(
        ("rId1", "vmlDrawing", "../drawings/vmlDrawing1.vml"), ("rId2", "comments", "../comments1.xml")
    )
    parts["xl/worksheets/sheet1.xml"] = parts["xl/worksheets/sheet1.xml"].replace(
        b"</worksheet>", b'<legacyDrawing r:id="rId1"/></worksheet>'
    )
    declare(parts, "xl/comments1.xml", f"{CONTENT}.spreadsheetml.comments+xml")
    declare(parts, "xl/drawings/vmlDrawing1.vml", f"{CONTENT}.vmlDrawing")
    return parts


def declare(parts: Parts, name: str, content_type: str) -> None:
    """Declare a part's content type."""
    override = f'<Override PartName="/{name}" ContentType="{content_type}"/></Types>'.encode()
    parts["[Content_Types].xml"] = parts["[Content_Types].xml"].replace(b"</Types>", override)


def rich_parts(macros: bool = False) -> Parts:
    """A workbook with drawings, extension lists, printer settings, notes, names, macros if asked, and more."""
    rows = (
        '<row r="1" spans="1:4" ht="30" customHeight="1"><c r="A1" s="1" t="s"><v>0</v></c><c r="B1" s="1" t="s">'
        '<v>1</v></c><c r="C1" s="1"/></row>'
        '<row r="2" spans="1:4"><c r="A2" t="s"><v>2</v></c><c r="B2" s="2"><v>900</v></c><c r="C2"><f>B2*1.7</f>'
        '<v>1530</v></c><c r="D2" t="e"><v>#REF!</v></c></row>'
        '<row r="4" s="3" customFormat="1"><c r="A4" s="3"><v>44000</v></c><c r="C4" t="b"><v>1</v></c></row>'
        '<row r="6"><c r="A6" s="1"><v>1</v></c><c r="B6" s="1"/></row>'
    )
    before = (
        '<sheetPr codeName="Sheet1"><tabColor rgb="FF00B050"/></sheetPr><dimension ref="A1:D6"/>'
        '<sheetViews><sheetView tabSelected="1" workbookViewId="0"><pane ySplit="1" topLeftCell="A2" '
        'activePane="bottomLeft" state="frozen"/></sheetView></sheetViews>'
        '<cols><col min="1" max="1" width="20" customWidth="1"/><col min="5" max="6" width="9" style="2"/></cols>'
    )
    after = (
        '<autoFilter ref="A1:C6"/><mergeCells count="1"><mergeCell ref="A6:B7"/></mergeCells>'
        '<conditionalFormatting sqref="B2:B6"><cfRule type="dataBar" priority="1"><dataBar><cfvo type="min"/>'
        '<cfvo type="max"/><color rgb="FF638EC6"/></dataBar><extLst><ext xmlns:x14="' + X14 + '" '
        'uri="{B025F937-C7B1-47D3-B67F-A62EFF666E3E}"><x14:id>{8A0C5D0E-5D6D-4E07-9A3C-0C8F5D6B7A11}</x14:id></ext>'
        "</extLst></cfRule></conditionalFormatting>"
        '<dataValidations count="1"><dataValidation type="list" allowBlank="1" sqref="D2"><formula1>Lists!$A$1:$A$2'
        "</formula1></dataValidation></dataValidations>"
        '<hyperlinks><hyperlink ref="A2" r:id="rId5"/></hyperlinks><printOptions gridLines="1"/>'
        '<pageMargins left="0.7" right="0.7" top="0.75" bottom="0.75" header="0.3" footer="0.3"/>'
        '<pageSetup orientation="landscape" r:id="rId4"/><headerFooter><oddHeader>&amp;Csite list</oddHeader>'
        '</headerFooter><drawing r:id="rId3"/><legacyDrawing r:id="rId1"/>'
        '<extLst><ext xmlns:x14="' + X14 + '" uri="{CCE6A557-97BC-4b89-ADB6-D9C93CAAB3DF}"><x14:dataValidations '
        'xmlns:xm="' + EXCEL_MAIN + '" count="1"><x14:dataValidation type="list"><x14:formula1><xm:f>Lists!$A$1:$A$2'
        "</xm:f></x14:formula1><xm:sqref>C4</xm:sqref></x14:dataValidation></x14:dataValidations></ext>"
        '<ext xmlns:x14="'
        + X14
        + '" uri="{05C60535-1F16-4fd2-B633-F4F36F0B64E0}"><x14:sparklineGroups xmlns:xm="'
        + EXCEL_MAIN
        + '"><x14:sparklineGroup><x14:sparklines><x14:sparkline><xm:f>Motors!A2:C2</xm:f><xm:sqref>D6'
        "</xm:sqref></x14:sparkline></x14:sparklines></x14:sparklineGroup></x14:sparklineGroups></ext></extLst>"
    )
    parts = with_notes(plain_parts(rows, before))
    parts["xl/worksheets/sheet1.xml"] = worksheet(rows, before, after)
    parts["xl/worksheets/_rels/sheet1.xml.rels"] = relationships(
        ("rId1", "vmlDrawing", "../drawings/vmlDrawing1.vml"),
        ("rId2", "comments", "../comments1.xml"),
        ("rId3", "drawing", "/xl/drawings/drawing1.xml"),
        ("rId4", "printerSettings", "../printerSettings/printerSettings1.bin"),
        ("rId5", "hyperlink", "https://example.org/motor?tag=P-104&amp;x=1"),
    )
    parts["xl/printerSettings/printerSettings1.bin"] = bytes(range(256)) * 4
    parts["xl/drawings/drawing1.xml"] = _drawing()
    parts["xl/drawings/_rels/drawing1.xml.rels"] = relationships(("rId1", "image", "../media/image1.png"))
    parts["xl/media/image1.png"] = ONE_PIXEL_PNG
    parts["xl/worksheets/sheet2.xml"] = worksheet(
        '<row r="1"><c r="A1" t="inlineStr"><is><t>direct</t></is></c></row><row r="2"><c r="A2" t="inlineStr"><is>'
        "<t>soft</t></is></c></row>"
    )
    parts["xl/sharedStrings.xml"] = (
        f'{HEAD}<sst xmlns="{MAIN}" count="3" uniqueCount="3"><si><r><rPr><b/></rPr><t>Tag</t></r><r><t> no.</t></r>'
        "</si><si><t>Pickup</t></si><si><t>P-104</t></si></sst>"
    ).encode()
    parts["xl/calcChain.xml"] = f'{HEAD}<calcChain xmlns="{MAIN}"><c r="C2" i="1"/></calcChain>'.encode()
    parts["xl/workbook.xml"] = (
        f'{HEAD}<workbook xmlns="{MAIN}" xmlns:r="{OFFICE}"><workbookPr codeName="ThisWorkbook"/><bookViews>'
        '<workbookView xWindow="0" yWindow="0" windowWidth="20000" windowHeight="9000" activeTab="0"/></bookViews>'
        '<sheets><sheet name="Motors" sheetId="1" r:id="rId1"/><sheet name="Lists" sheetId="4" state="hidden" '
        'r:id="rId3"/></sheets><definedNames><definedName name="_xlnm.Print_Titles" localSheetId="0">Motors!$1:$1'
        '</definedName><definedName name="Kinds" localSheetId="1">Lists!$A$1:$A$2</definedName>'
        '<definedName name="Pickups">Motors!$B$2:$B$6</definedName></definedNames><calcPr calcId="191029"/>'
        "</workbook>"
    ).encode()
    parts["xl/_rels/workbook.xml.rels"] = relationships(
        ("rId1", "worksheet", "worksheets/sheet1.xml"),
        ("rId2", "styles", "styles.xml"),
        ("rId3", "worksheet", "worksheets/sheet2.xml"),
        ("rId4", "sharedStrings", "sharedStrings.xml"),
        ("rId5", "calcChain", "calcChain.xml"),
        *([("rId6", "http://schemas.microsoft.com/office/2006/relationships/vbaProject", "vbaProject.bin")] * macros),
    )
    parts["docProps/app.xml"] = (
        f'{HEAD}<Properties xmlns="{OFFICE.replace("relationships", "extended-properties")}" '
        'xmlns:vt="http://schemas.openxmlformats.org/officeDocument/2006/docPropsVTypes"><Application>A program'
        '</Application><HeadingPairs><vt:vector size="2" baseType="variant"><vt:variant><vt:lpstr>Worksheets'
        "</vt:lpstr></vt:variant><vt:variant><vt:i4>2</vt:i4></vt:variant></vt:vector></HeadingPairs><TitlesOfParts>"
        '<vt:vector size="2" baseType="lpstr"><vt:lpstr>Motors</vt:lpstr><vt:lpstr>Lists</vt:lpstr></vt:vector>'
        "</TitlesOfParts></Properties>"
    ).encode()
    parts["docProps/custom.xml"] = (
        f'{HEAD}<Properties xmlns="{OFFICE.replace("relationships", "custom-properties")}" '
        'xmlns:vt="http://schemas.openxmlformats.org/officeDocument/2006/docPropsVTypes"><property '
        'fmtid="{D5CDD505-2E9C-101B-9397-08002B2CF9AE}" pid="2" name="Site"><vt:lpwstr>invented</vt:lpwstr></property>'
        "</Properties>"
    ).encode()
    parts["_rels/.rels"] = relationships(
        ("rId1", "officeDocument", "xl/workbook.xml"),
        ("rId2", "extended-properties", "docProps/app.xml"),
        ("rId3", "custom-properties", "docProps/custom.xml"),
    )
    for name, kind in (
        ("xl/worksheets/sheet2.xml", f"{CONTENT}.spreadsheetml.worksheet+xml"),
        ("xl/sharedStrings.xml", f"{CONTENT}.spreadsheetml.sharedStrings+xml"),
        ("xl/calcChain.xml", f"{CONTENT}.spreadsheetml.calcChain+xml"),
        ("xl/drawings/drawing1.xml", f"{CONTENT}.drawing+xml"),
        ("docProps/app.xml", f"{CONTENT}.extended-properties+xml"),
        ("docProps/custom.xml", f"{CONTENT}.custom-properties+xml"),
        ("xl/printerSettings/printerSettings1.bin", f"{CONTENT}.spreadsheetml.printerSettings"),
        ("xl/media/image1.png", "image/png"),
    ):
        declare(parts, name, kind)
    if macros:
        parts["xl/vbaProject.bin"] = b"\xd0\xcf\x11\xe0 not a real project, only bytes to keep" * 20
        declare(parts, "xl/vbaProject.bin", "application/vnd.ms-office.vbaProject")
        parts["[Content_Types].xml"] = parts["[Content_Types].xml"].replace(
            f"{CONTENT}.spreadsheetml.sheet.main+xml".encode(), b"application/vnd.ms-excel.sheet.macroEnabled.main+xml"
        )
    return parts


def _drawing() -> bytes:
    anchor = (
        "<xdr:from><xdr:col>5</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>1</xdr:row><xdr:rowOff>0</xdr:rowOff>"
        "</xdr:from><xdr:to><xdr:col>7</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>5</xdr:row><xdr:rowOff>0"
        "</xdr:rowOff></xdr:to>"
    )
    return (
        f'{HEAD}<xdr:wsDr xmlns:xdr="{DRAWING}/spreadsheetDrawing" xmlns:a="{DRAWING}/main" xmlns:r="{OFFICE}">'
        f'<xdr:twoCellAnchor>{anchor}<xdr:sp macro="" textlink=""><xdr:nvSpPr><xdr:cNvPr id="2" name="Box"/>'
        '<xdr:cNvSpPr txBox="1"/></xdr:nvSpPr><xdr:spPr><a:prstGeom prst="rect"><a:avLst/></a:prstGeom></xdr:spPr>'
        "<xdr:txBody><a:bodyPr/><a:p><a:r><a:t>Do not alter</a:t></a:r></a:p></xdr:txBody></xdr:sp>"
        f'<xdr:clientData/></xdr:twoCellAnchor><xdr:twoCellAnchor>{anchor}<xdr:pic><xdr:nvPicPr><xdr:cNvPr id="3" '
        'name="Picture"/><xdr:cNvPicPr/></xdr:nvPicPr><xdr:blipFill><a:blip r:embed="rId1"/><a:stretch><a:fillRect/>'
        '</a:stretch></xdr:blipFill><xdr:spPr><a:prstGeom prst="rect"><a:avLst/></a:prstGeom></xdr:spPr></xdr:pic>'
        "<xdr:clientData/></xdr:twoCellAnchor></xdr:wsDr>"
    ).encode()
