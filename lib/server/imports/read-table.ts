import 'server-only';
import Papa from 'papaparse';

export const MOST_BYTES = 20 * 1024 * 1024;
export const MOST_ROWS = 1_000_000;

export type TableIssue = { readonly row: number | null; readonly column: string | null; readonly message: string };
/** `line` is the line of the file on which the row begins, the header being 1. */
export type TableRow = { readonly line: number; readonly cells: Readonly<Record<string, string>> };
export type ReadTable =
  | { readonly ok: true; readonly header: readonly string[]; readonly delimiter: string; readonly rows: readonly TableRow[] }
  | { readonly ok: false; readonly issues: readonly TableIssue[] };

const no = (message: string, row: number | null = null): ReadTable => ({ ok: false, issues: [{ row, column: null, message }] });
const lineBreaks = (text: string): number => text.split('\n').length - 1;

/** The sign that divides the header line, outside quotes; where none does, the file has one column. */
function delimiterOf(text: string): string {
  const header = (/^(?:"(?:[^"]|"")*"|[^"\r\n])*/.exec(text.trimStart())?.[0] ?? '').replace(/"(?:[^"]|"")*"/g, '');
  const counts = [',', ';', '\t'].map((sign) => [sign, header.split(sign).length - 1] as const);
  return counts.reduce((best, one) => (one[1] > best[1] ? one : best))[0];
}

/**
 * Reads a delimited text file (comma, semicolon or tab; RFC 4180 quotes; UTF-8 with or without a byte order mark).
 *
 * @param bytes the whole file, at most 20 MB and 10⁶ rows
 * @returns its rows with their lines, or why it cannot be read
 */
export function readTable(bytes: Uint8Array): ReadTable {
  if (bytes.byteLength > MOST_BYTES) return no('The file is larger than 20 MB. Split it and import the parts one by one.');
  let text: string;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes).replace(/^\uFEFF/, '');
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return no('The file is not UTF-8 text. Save it as "CSV UTF-8" and try again.');
  }
  if (text.trim() === '') return no('The file is empty. It needs a header line and a line for each tree.');
  const parsed = Papa.parse<string[]>(text, { delimiter: delimiterOf(text), skipEmptyLines: false });
  const quote = parsed.errors.find(({ type }) => type === 'Quotes');
  if (quote) {
    const line = 1 + parsed.data.slice(0, quote.row ?? 0).reduce((sum, row) => sum + 1 + row.reduce((inner, cell) => inner + lineBreaks(cell), 0), 0);
    return no(`A quotation mark is opened on or after line ${line} and never closed. Close it, or double it where it is part of the text.`, line);
  }
  const [header = [], ...body] = parsed.data;
  const names = header.map((name) => name.trim());
  const twice = names.find((name, i) => name !== '' && names.indexOf(name) !== i);
  if (twice !== undefined) return no(`Two columns are called "${twice}". Give each column its own name.`, 1);
  if (body.length > MOST_ROWS) return no(`The file has ${body.length} rows; at most ${MOST_ROWS} are taken at once.`);
  const rows: TableRow[] = [];
  let line = 2 + header.reduce((sum, cell) => sum + lineBreaks(cell), 0);
  for (const cells of body) {
    if (cells.some((cell) => cell.trim() !== '')) rows.push({ line, cells: Object.fromEntries(names.map((name, i) => [name, (cells[i] ?? '').trim()])) });
    line += 1 + cells.reduce((sum, cell) => sum + lineBreaks(cell), 0);
  }
  return rows.length === 0 ? no('The file has a header but no rows.') : { ok: true, header: names, delimiter: delimiterOf(text), rows };
}
