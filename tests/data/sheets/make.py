"""Makes the small workbooks beside it (invented figures). Python 3, standard library only: python3 make.py"""
import os
import zipfile

HERE = os.path.dirname(os.path.abspath(__file__))
ODS = (
    '<?xml version="1.0" encoding="UTF-8"?><office:document-content '
    'xmlns:office="urn:oasis:names:tc:opendocument:xmlns:office:1.0" '
    'xmlns:table="urn:oasis:names:tc:opendocument:xmlns:table:1.0" '
    'xmlns:text="urn:oasis:names:tc:opendocument:xmlns:text:1.0" office:version="1.2"><office:body>'
    '<office:spreadsheet>{}</office:spreadsheet></office:body></office:document-content>'
)
MANIFEST = (
    '<?xml version="1.0" encoding="UTF-8"?><manifest:manifest '
    'xmlns:manifest="urn:oasis:names:tc:opendocument:xmlns:manifest:1.0" manifest:version="1.2"><manifest:file-entry '
    'manifest:full-path="/" manifest:media-type="application/vnd.oasis.opendocument.spreadsheet"/><manifest:file-entry '
    'manifest:full-path="content.xml" manifest:media-type="text/xml"/></manifest:manifest>'
)


def ods_cell(value):
    if value is None:
        return '<table:table-cell/>'
    if isinstance(value, (int, float)):
        return f'<table:table-cell office:value-type="float" office:value="{value}"><text:p>{value}</text:p></table:table-cell>'
    if value.startswith('='):
        return f'<table:table-cell table:formula="of:{value}"/>'
    return f'<table:table-cell office:value-type="string"><text:p>{value}</text:p></table:table-cell>'


def ods(name, sheets):
    tables = ''
    for sheet, rows in sheets:
        body = ''.join('<table:table-row>' + ''.join(map(ods_cell, row)) + '</table:table-row>' for row in rows)
        tables += f'<table:table table:name="{sheet}">{body}</table:table>'
    write(name, [('mimetype', 'application/vnd.oasis.opendocument.spreadsheet'), ('META-INF/manifest.xml', MANIFEST),
                 ('content.xml', ODS.format(tables))])


def xlsx(name, cells):
    """One sheet `Run 1` of inline cells: what no library writes (a formula without a value)."""
    rows = ''
    for number, row in enumerate(cells, 1):
        rows += f'<row r="{number}">'
        for column, value in zip('ABCDEFG', row):
            place = f'{column}{number}'
            if value is None:
                continue
            if isinstance(value, (int, float)):
                rows += f'<c r="{place}"><v>{value}</v></c>'
            elif value.startswith('='):
                rows += f'<c r="{place}"><f>{value[1:]}</f></c>'
            else:
                rows += f'<c r="{place}" t="inlineStr"><is><t>{value}</t></is></c>'
        rows += '</row>'
    main = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main'
    rel = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships'
    package = 'http://schemas.openxmlformats.org/package/2006'
    head = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>'
    write(name, [
        ('[Content_Types].xml', f'{head}<Types xmlns="{package}/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/><Override PartName="/xl/worksheets/sheet1.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/></Types>'),
        ('_rels/.rels', f'{head}<Relationships xmlns="{package}/relationships"><Relationship Id="rId1" Type="{rel}/officeDocument" Target="xl/workbook.xml"/></Relationships>'),
        ('xl/workbook.xml', f'{head}<workbook xmlns="{main}" xmlns:r="{rel}"><sheets><sheet name="Run 1" sheetId="1" r:id="rId1"/></sheets></workbook>'),
        ('xl/_rels/workbook.xml.rels', f'{head}<Relationships xmlns="{package}/relationships"><Relationship Id="rId1" Type="{rel}/worksheet" Target="worksheets/sheet1.xml"/></Relationships>'),
        ('xl/worksheets/sheet1.xml', f'{head}<worksheet xmlns="{main}"><sheetData>{rows}</sheetData></worksheet>'),
    ])


def write(name, parts):
    with zipfile.ZipFile(os.path.join(HERE, name), 'w', zipfile.ZIP_DEFLATED) as archive:
        for path, text in parts:
            archive.writestr(zipfile.ZipInfo(path, (2026, 12, 1, 0, 0, 0)), text)


HEAD = [['Test of an invented spring'], ['Travel', 'Load', 'Remark'], ['mm', 'N', None]]
ROWS = [[0.5 * n, 5.25 * n, 'ok' if n % 2 else None] for n in range(8)]
ods('good.ods', [('Notes', [['nothing here']]), ('Run 1', HEAD + ROWS)])
ods('text.ods', [('Run 1', HEAD + ROWS[:3] + [[1.5, '15,75', None]] + ROWS[4:])])
ods('formula.ods', [('Run 1', HEAD + ROWS[:3] + [[1.5, '=[.B6]*2', None]] + ROWS[4:])])
ods('empty.ods', [('Run 1', HEAD + ROWS[:3] + [[1.5, None, 'lost']] + ROWS[4:])])
xlsx('formula.xlsx', HEAD + ROWS[:3] + [[1.5, '=B6*2', None]] + ROWS[4:])
far = HEAD + ROWS
xlsx('plain.xlsx', far)
