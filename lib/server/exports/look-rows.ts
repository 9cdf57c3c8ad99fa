import 'server-only';
import { QueryTypes } from 'sequelize';
import type { Project } from '@/lib/schema/project';
import { fromCanonicalCm, fromCanonicalM } from '@/lib/trees/units';
import { openDatabase } from '@/models';
import type { Cell, Row } from './column';

/** Every second look of a project, by plot and time. Row keys are the names of `lookColumns`; limits in the project's units. */
export async function lookRows(project: Pick<Project, 'id' | 'dbhUnit' | 'lengthUnit'>): Promise<readonly Row[]> {
  const { sequelize } = await openDatabase();
  const found = await sequelize.query<Record<string, Cell>>(
    `SELECT p.number AS plot, t.tag AS tag, st.label AS stem, sp.code AS species_code, l.level AS level, l.rule AS rule, l.quantity AS quantity,
       l.entered_digits AS entered, l.expected_low AS expected_low, l.expected_high AS expected_high, l.tail_probability AS tail_probability,
       l.cause AS cause, l.cause_probability AS cause_probability, l.suggested_quantity AS suggested_quantity, l.suggested_digits AS suggested,
       l.answer AS answer, l.reason AS reason, l.answer_note AS note, u.name AS answered_by, l.answered_at AS answered_at, r.digits AS answer_digits,
       l.raised_at AS raised_at, l.raised_by AS raised_by, l.id AS look_id, l.measurement_id AS measurement_id
     FROM second_looks l
       JOIN stem_measurements m ON m.id = l.measurement_id
       JOIN visits v ON v.id = m.visit_id JOIN plots p ON p.id = v.plot_id
       JOIN stems st ON st.id = m.stem_id JOIN trees t ON t.id = st.tree_id
       LEFT JOIN species_entries sp ON sp.id = m.species_id
       LEFT JOIN users u ON u.id = l.answered_by_id LEFT JOIN readings r ON r.id = l.answer_reading_id
     WHERE l.project_id = :projectId AND l.deleted = 0 ORDER BY p.number, l.raised_at, l.id`,
    { type: QueryTypes.SELECT, replacements: { projectId: project.id } });
  const shown = (value: Cell | undefined, quantity: Cell | undefined): Cell => {
    if (typeof value !== 'number') return null;
    const own = quantity === 'dbh' ? fromCanonicalCm(value, project.dbhUnit) : fromCanonicalM(value, project.lengthUnit);
    return Math.round(own * 1e4) / 1e4;
  };
  return found.map((row) => ({ ...row, expected_low: shown(row.expected_low, row.quantity), expected_high: shown(row.expected_high, row.quantity) }));
}
