import 'server-only';
import { QueryTypes } from 'sequelize';
import { openDatabase } from '@/models';
import type { Cell, Row } from './column';
import { filterClause } from './tree-filter';
import type { TreeFilter } from './tree-filter';

const FROM = `FROM stem_measurements m
  JOIN visits v ON v.id = m.visit_id
  JOIN plots p ON p.id = v.plot_id
  JOIN strata s ON s.id = p.stratum_id
  JOIN stems st ON st.id = m.stem_id
  JOIN trees t ON t.id = st.tree_id
  LEFT JOIN species_entries sp ON sp.id = m.species_id`;

const COLUMNS = `p.number AS plot, s.name AS stratum, v.started_at AS visit_started, v.kind AS visit_kind, v.state AS visit_state,
  v.outcome AS visit_outcome, t.tag AS tag, st.label AS stem, sp.code AS species_code, sp.local_name AS species, m.status AS status, m.form AS form,
  m.dbh_digits AS dbh_digits, m.dbh_unit AS dbh_unit, m.dbh_cm AS dbh_cm, m.height_digits AS height_digits, m.height_unit AS height_unit,
  m.height_m AS height_m, m.height_method AS height_method, m.remarks AS remarks, v.id AS visit_id, m.id AS measurement_id`;

/** Rows of other tables that belong to the stems found; asked for by project where there are many, else by id. */
const BY_STEM = `measurement_id IN (SELECT m.id ${FROM} WHERE `;

type LookSummary = { measurement_id: string; level: string; rule: string; cause: string | null; suggested_quantity: string | null; suggested_digits: string | null; answer: string; reason: string | null; answer_note: string };
type ReadingSummary = { measurement_id: string; readings: number; measured_by: string | null; recorded_by: string | null };

function groupBy<T extends { readonly measurement_id: string }>(rows: readonly T[]): ReadonlyMap<string, readonly T[]> {
  const groups = new Map<string, T[]>();
  for (const row of rows) {
    const group = groups.get(row.measurement_id);
    if (group) group.push(row);
    else groups.set(row.measurement_id, [row]);
  }
  return groups;
}

function doubtCells(looks: readonly LookSummary[]): Record<string, Cell> {
  const asked = looks.filter(({ level }) => level === 'look');
  const list = (value: (look: LookSummary) => string) => (asked.length === 0 ? null : asked.map(value).join('|'));
  return {
    looks: asked.length, open_looks: asked.filter(({ answer }) => answer === 'open').length, quiet_marks: looks.length - asked.length,
    rules: list(({ rule }) => rule), causes: list(({ cause }) => cause ?? ''),
    suggested: list(({ suggested_quantity: quantity, suggested_digits: digits }) => (digits === null ? '' : `${quantity ?? ''} ${digits}`)),
    answers: list(({ answer }) => answer), reasons: list(({ reason, answer_note: note }) => [reason, note].filter(Boolean).join(': ')),
  };
}

/**
 * The tree table of a project: one row per stem and visit, by plot, visit and order of entry, with every doubt attached.
 * Row keys are the names of `treeColumns`. `page` null gives all rows.
 */
export async function treeRows(projectId: string, filter: TreeFilter, page: { readonly limit: number; readonly offset: number } | null): Promise<{ readonly total: number; readonly rows: readonly Row[] }> {
  const { sequelize } = await openDatabase();
  const { where, replacements } = filterClause(projectId, filter);
  const ask = <T extends object>(sql: string, more: Readonly<Record<string, unknown>> = {}) => sequelize.query<T>(sql, { type: QueryTypes.SELECT, replacements: { ...replacements, ...more } });
  const [counted] = await ask<{ total: number }>(`SELECT COUNT(*) AS total ${FROM} WHERE ${where}`);
  const limit = page ? ' LIMIT :limit OFFSET :offset' : '';
  const found = await ask<Record<string, Cell>>(
    `SELECT ${COLUMNS} ${FROM} WHERE ${where} ORDER BY p.number, v.started_at, v.id, m.entry_order, m.id${limit}`, page ? { ...page } : {});
  const ids = found.map((row) => String(row.measurement_id));
  const [scope, values] = page ? ['measurement_id IN (:ids)', { ids: ids.length > 0 ? ids : [''] }] : [`${BY_STEM}${where})`, {}];
  const looks = groupBy(await ask<LookSummary>(
    `SELECT measurement_id, level, rule, cause, suggested_quantity, suggested_digits, answer, reason, answer_note FROM second_looks WHERE deleted = 0 AND ${scope} ORDER BY raised_at, id`, values));
  const readings = groupBy(await ask<ReadingSummary>(
    `SELECT r.measurement_id AS measurement_id, COUNT(*) AS readings, MAX(r.taken_at), a.name AS measured_by, b.name AS recorded_by FROM readings r
     LEFT JOIN users a ON a.id = r.measurer_id LEFT JOIN users b ON b.id = r.recorder_id WHERE r.deleted = 0 AND r.${scope} GROUP BY r.measurement_id`, values));
  const conflicts = await ask<{ record_id: string; open: number }>(
    "SELECT record_id, COUNT(*) AS open FROM conflicts WHERE project_id = :projectId AND deleted = 0 AND state = 'open' GROUP BY record_id");
  const twoValues = new Map(conflicts.map(({ record_id: id, open }) => [id, open]));
  return {
    total: counted?.total ?? 0,
    rows: found.map((row) => {
      const id = String(row.measurement_id);
      const reading = readings.get(id)?.[0];
      return {
        ...row, ...doubtCells(looks.get(id) ?? []), readings: reading?.readings ?? 0,
        measured_by: reading?.measured_by ?? null, recorded_by: reading?.recorded_by ?? null, two_values: twoValues.get(id) ?? 0,
      };
    }),
  };
}
