import 'server-only';
import { QueryTypes } from 'sequelize';
import type { Project } from '@/lib/schema/project';
import { projectSchema } from '@/lib/schema/project';
import { openDatabase } from '@/models';
import { Problem } from '../errors';

/** A project by its id. Errors: Problem not-found. */
export async function readProject(projectId: string): Promise<Project> {
  const { models } = await openDatabase();
  const row = await models.Project.findOne({ where: { id: projectId, deleted: false } });
  if (!row) throw new Problem('not-found');
  return projectSchema.parse(row.get({ plain: true }));
}

export type ProjectOverview = {
  readonly project: Project;
  readonly strata: readonly { readonly id: string; readonly name: string; readonly areaHa: number; readonly plots: number; readonly begun: number; readonly ended: number }[];
  readonly species: readonly { readonly id: string; readonly code: string; readonly localName: string; readonly curveGroup: string }[];
  readonly people: readonly { readonly id: string; readonly name: string; readonly role: string }[];
  readonly openLooks: number;
  readonly stems: number;
  readonly quarantined: number;
  readonly twoValues: number;
  readonly lastArrivalAt: string | null;
};

const WEEKS_OF_ROUND = 52;

/**
 * What an analyst wants to see first of a project. Plots are begun or ended by production visits that started in the round under
 * way, taken to last no longer than a year before `now` (common practice, no source).
 */
export async function projectOverview(projectId: string, now: Date): Promise<ProjectOverview> {
  const project = await readProject(projectId);
  const { sequelize } = await openDatabase();
  const since = new Date(now.getTime() - WEEKS_OF_ROUND * 7 * 86_400_000).toISOString();
  const ask = <T extends object>(sql: string) => sequelize.query<T>(sql, { type: QueryTypes.SELECT, replacements: { projectId, since } });
  const [strata, species, people, [counts]] = await Promise.all([
    ask<ProjectOverview['strata'][number]>(`SELECT s.id AS id, s.name AS name, s.area_ha AS areaHa, COUNT(DISTINCT p.id) AS plots,
      COUNT(DISTINCT CASE WHEN v.state = 'open' OR v.state = 'sentBack' THEN p.id END) AS begun, COUNT(DISTINCT CASE WHEN v.state IN ('finished', 'signedOff') THEN p.id END) AS ended
      FROM strata s LEFT JOIN plots p ON p.stratum_id = s.id AND p.deleted = 0
      LEFT JOIN visits v ON v.plot_id = p.id AND v.deleted = 0 AND v.kind = 'production' AND v.started_at >= :since
      WHERE s.project_id = :projectId AND s.deleted = 0 GROUP BY s.id ORDER BY s.name`),
    ask<ProjectOverview['species'][number]>('SELECT id, code, local_name AS localName, curve_group AS curveGroup FROM species_entries WHERE project_id = :projectId AND deleted = 0 ORDER BY position'),
    ask<ProjectOverview['people'][number]>('SELECT u.id AS id, u.name AS name, m.role AS role FROM memberships m JOIN users u ON u.id = m.user_id WHERE m.project_id = :projectId ORDER BY u.name'),
    ask<{ openLooks: number; stems: number; quarantined: number; twoValues: number; lastArrivalAt: string | null }>(`SELECT
      (SELECT COUNT(*) FROM second_looks WHERE project_id = :projectId AND deleted = 0 AND level = 'look' AND answer = 'open') AS openLooks,
      (SELECT COUNT(*) FROM stem_measurements WHERE project_id = :projectId AND deleted = 0) AS stems,
      (SELECT COUNT(*) FROM change_log WHERE project_id = :projectId AND state = 'quarantined') AS quarantined,
      (SELECT COUNT(*) FROM conflicts WHERE project_id = :projectId AND deleted = 0 AND state = 'open') AS twoValues,
      (SELECT MAX(received_at) FROM change_log WHERE project_id = :projectId) AS lastArrivalAt`),
  ]);
  return { project, strata, species, people, openLooks: 0, stems: 0, quarantined: 0, twoValues: 0, lastArrivalAt: null, ...counts };
}
