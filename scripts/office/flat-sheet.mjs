/**
 * A cell of a sheet that LibreOffice is to make into a file.
 *
 * @typedef {object} Cell
 * @property {'text' | 'number' | 'formula' | 'date' | 'empty'} kind
 * @property {string} [value]
 * @property {string} [style] one of `STYLES`
 * @property {number} [span] columns it is merged over
 * @property {Reading} [reading] what a reader must make of it
 */

/**
 * @typedef {object} Reading
 * @property {string} position
 * @property {string} quantity
 * @property {string} [value] with its unit; absent where it must be asked about
 * @property {string} [detail] part of the words it must be asked about with
 */

/**
 * @typedef {object} Sheet
 * @property {string} name
 * @property {boolean} [hidden]
 * @property {readonly number[]} [hiddenColumns]
 * @property {readonly number[]} [hiddenRows]
 * @property {boolean} [formattedToTheEnd] every row there can be carries a format
 * @property {readonly (readonly (Cell | null)[])[]} rows
 */

/** @param {number} places @param {string} [more] */
const digits = (places, more = '') =>
  `<number:number number:decimal-places="${places}" number:min-decimal-places="${places}" number:min-integer-digits="1"${more}/>`;

/** @param {string} text */
const words = (text) => `<number:text>${text}</number:text>`;

/** Formats by name: the element of OpenDocument that they are, and what is in it. */
const STYLES = {
  places4: ['number-style', digits(4)],
  places3: ['number-style', digits(3)],
  inch4: ['number-style', digits(4) + words(' in')],
  mm3: ['number-style', digits(3) + words(' mm')],
  grouped1: ['number-style', digits(1, ' number:grouping="true"')],
  scientific: [
    'number-style',
    '<number:scientific-number number:decimal-places="4" number:min-decimal-places="4" number:min-integer-digits="1" number:min-exponent-digits="2"/>',
  ],
  percent: ['percentage-style', digits(2) + words('%')],
  day: [
    'date-style',
    `<number:day number:style="long"/>${words('.')}<number:month number:style="long"/>${words('.')}<number:year number:style="long"/>`,
  ],
};

/** @param {'en' | 'de'} locale */
const stylesIn = (locale) => {
  const language =
    locale === 'de'
      ? ' number:language="de" number:country="DE"'
      : ' number:language="en" number:country="US"';
  return Object.entries(STYLES)
    .map(
      ([name, [tag, inner]]) =>
        `<number:${tag} style:name="N-${name}"${language}>${inner}</number:${tag}>` +
        `<style:style style:name="${name}" style:family="table-cell" style:parent-style-name="Default" style:data-style-name="N-${name}"/>`,
    )
    .join('');
};

/** @param {string} text */
const escaped = (text) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');

/** @param {Cell | null} cell */
const cellXml = (cell) => {
  if (cell === null || cell.kind === 'empty') return '<table:table-cell/>';
  const { kind, value = '', style, span } = cell;
  const look = style === undefined ? '' : ` table:style-name="${style}"`;
  const merged =
    span === undefined
      ? ''
      : ` table:number-columns-spanned="${span}" table:number-rows-spanned="1"`;
  const covered = '<table:covered-table-cell/>'.repeat((span ?? 1) - 1);
  const open = `<table:table-cell${look}${merged}`;
  if (kind === 'number')
    return `${open} office:value-type="float" office:value="${value}"><text:p>${value}</text:p></table:table-cell>${covered}`;
  if (kind === 'formula')
    return `${open} table:formula="of:=${escaped(value)}" office:value-type="float"/>${covered}`;
  if (kind === 'date')
    return `${open} office:value-type="date" office:date-value="${value}"/>${covered}`;
  return `${open} office:value-type="string"><text:p>${escaped(value)}</text:p></table:table-cell>${covered}`;
};

/** @param {Sheet} sheet */
const sheetXml = ({
  name,
  hidden,
  hiddenColumns = [],
  hiddenRows = [],
  formattedToTheEnd,
  rows,
}) => {
  const width = Math.max(...rows.map((row) => row.length));
  const columns = Array.from(
    { length: width },
    (_, at) =>
      `<table:table-column${hiddenColumns.includes(at) ? ' table:visibility="collapse"' : ''}/>`,
  );
  const lines = rows.map(
    (row, at) =>
      `<table:table-row${hiddenRows.includes(at) ? ' table:visibility="filter"' : ''}>${row.map(cellXml).join('')}</table:table-row>`,
  );
  const rest = formattedToTheEnd
    ? `<table:table-row table:number-rows-repeated="${1_048_576 - rows.length}"><table:table-cell table:style-name="places4" table:number-columns-repeated="${width}"/></table:table-row>`
    : '';
  return `<table:table table:name="${escaped(name)}"${hidden ? ' table:style-name="unseen"' : ''}>${columns.join('')}${lines.join('')}${rest}</table:table>`;
};

const SPACES = [
  ['office', 'urn:oasis:names:tc:opendocument:xmlns:office:1.0'],
  ['table', 'urn:oasis:names:tc:opendocument:xmlns:table:1.0'],
  ['text', 'urn:oasis:names:tc:opendocument:xmlns:text:1.0'],
  ['style', 'urn:oasis:names:tc:opendocument:xmlns:style:1.0'],
  ['number', 'urn:oasis:names:tc:opendocument:xmlns:datastyle:1.0'],
  ['of', 'urn:oasis:names:tc:opendocument:xmlns:of:1.2'],
]
  .map(([prefix, name]) => `xmlns:${prefix}="${name}"`)
  .join(' ');

/**
 * A spreadsheet as flat OpenDocument XML (OASIS ODF 1.2, part 1, 2.1.2), for LibreOffice to open.
 *
 * @param {readonly Sheet[]} sheets
 * @param {'en' | 'de'} locale in which its numbers are shown
 */
export const flatSpreadsheet = (sheets, locale) =>
  `<?xml version="1.0" encoding="UTF-8"?><office:document ${SPACES} office:version="1.2" office:mimetype="application/vnd.oasis.opendocument.spreadsheet"><office:styles><style:style style:name="Default" style:family="table-cell"/></office:styles><office:automatic-styles><style:style style:name="unseen" style:family="table"><style:table-properties table:display="false"/></style:style>${stylesIn(locale)}</office:automatic-styles><office:body><office:spreadsheet>${sheets.map(sheetXml).join('')}</office:spreadsheet></office:body></office:document>`;

/** `A`, `B`, …: no shape is wider than the alphabet. @param {number} at */
const letter = (at) => String.fromCharCode(65 + at);

/**
 * Where every reading stands in the file, and what it must be read as.
 *
 * @param {Sheet} sheet
 * @param {boolean} named whether cells carry the sheet's name
 */
export const expectedOf = ({ name, rows }, named) =>
  rows.flatMap((row, at) => {
    let column = -1;
    return row.flatMap((cell) => {
      column += 1;
      const own = column;
      column += (cell?.span ?? 1) - 1;
      if (cell?.reading === undefined) return [];
      return [{ cell: `${named ? `${name}!` : ''}${letter(own)}${at + 1}`, ...cell.reading }];
    });
  });
