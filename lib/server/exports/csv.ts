import 'server-only';
import Papa from 'papaparse';
import type { Cell, Column, Row } from './column';

/** Characters that a spreadsheet takes for the start of a formula, with their full-width forms. */
const FORMULA = /^[=+\-@\t\r\n＝＋－＠]/;

function textCell(value: string): string {
  return FORMULA.test(value) ? `'${value}` : value;
}

function cell(value: Cell | undefined, kind: Column['kind']): string | number {
  if (value === null || value === undefined) return '';
  return kind === 'text' ? textCell(String(value)) : Number(value);
}

/**
 * Rows as CSV (RFC 4180, UTF-8, CRLF), columns in the order of the dictionary. Text that could run as a formula gets a
 * leading apostrophe; numbers stay numbers with a decimal point.
 */
export function toCsv(columns: readonly Column[], rows: readonly Row[]): string {
  const data = rows.map((row) => columns.map(({ name, kind }) => cell(row[name], kind)));
  return `${Papa.unparse({ fields: columns.map(({ name }) => name), data }, { newline: '\r\n' })}\r\n`;
}

/** A CSV answer to be saved under a file name. */
export function csvResponse(fileName: string, columns: readonly Column[], rows: readonly Row[]): Response {
  const safe = fileName.replace(/[^A-Za-z0-9._-]+/g, '-');
  return new Response(toCsv(columns, rows), {
    headers: { 'Content-Type': 'text/csv; charset=utf-8', 'Content-Disposition': `attachment; filename="${safe}"` },
  });
}
