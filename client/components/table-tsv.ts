import type { Column } from './table-column';

/** Rows as tab-separated text with a head line, for pasting into a spreadsheet or a file. */
export function tableTsv<Row>(columns: readonly Column<Row>[], rows: readonly Row[]): string {
  const head = columns.map((column) =>
    tsvCell(column.unit ? `${column.header} (${column.unit})` : column.header),
  );
  const lines = rows.map((row) => columns.map((column) => tsvCell(cellText(column, row))).join('\t'));
  return `${[head.join('\t'), ...lines].join('\n')}\n`;
}

/** The text of one cell as it is copied; numbers get the plain minus that programs read. */
export function cellText<Row>(column: Column<Row>, row: Row): string {
  if (column.text !== undefined) return column.text(row);
  const shown = column.cell(row);
  if (typeof shown !== 'string' && typeof shown !== 'number') return '';
  const text = String(shown);
  if (column.numeric !== true) return text;
  return text === '–' ? '' : text.replace(/−(?=[\d.])/g, '-').replace(/(?<=\d),(?=\d{3})/g, '');
}

/** Number, angle or signed sexagesimal: begins with a sign and is no formula. */
const SIGNED_NUMBER = /^[+-][\d.:\s°′″'"hms]+(e[+-]?\d+)?$/i;

/**
 * One cell: line ends and tabs become blanks, and text that a spreadsheet would run as a formula gets a leading
 * apostrophe (common practice, no source).
 */
export function tsvCell(text: string): string {
  const flat = text.replace(/[\t\r\n]+/g, ' ');
  const formula = /^[=@]/.test(flat) || (/^[+-]/.test(flat) && !SIGNED_NUMBER.test(flat));
  return formula ? `'${flat}` : flat;
}
