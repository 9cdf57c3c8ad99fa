import 'server-only';
import { QueryTypes } from 'sequelize';
import { openDatabase } from '@/models';

export type ListedVisit = {
  readonly id: string; readonly plot: string; readonly stratum: string; readonly kind: string; readonly state: string; readonly outcome: string | null;
  readonly outcomeNote: string; readonly startedAt: string; readonly finishedAt: string | null; readonly measurer: string | null; readonly recorder: string | null;
  readonly stems: number; readonly heights: number; readonly looks: number; readonly openLooks: number;
};

const SELECT = `SELECT v.id AS id, p.number AS plot, s.name AS stratum, v.kind AS kind, v.state AS state, v.outcome AS outcome, v.outcome_note AS outcomeNote,
  v.started_at AS startedAt, v.finished_at AS finishedAt, a.name AS measurer, b.name AS recorder,
  (SELECT COUNT(*) FROM stem_measurements m WHERE m.visit_id = v.id AND m.deleted = 0) AS stems,
  (SELECT COUNT(*) FROM stem_measurements m WHERE m.visit_id = v.id AND m.deleted = 0 AND m.height_m IS NOT NULL) AS heights,
  (SELECT COUNT(*) FROM second_looks l WHERE l.visit_id = v.id AND l.deleted = 0 AND l.level = 'look') AS looks,
  (SELECT COUNT(*) FROM second_looks l WHERE l.visit_id = v.id AND l.deleted = 0 AND l.level = 'look' AND l.answer = 'open') AS openLooks
  FROM visits v JOIN plots p ON p.id = v.plot_id JOIN strata s ON s.id = p.stratum_id
  LEFT JOIN users a ON a.id = v.measurer_id LEFT JOIN users b ON b.id = v.recorder_id
  WHERE v.project_id = :projectId AND v.deleted = 0`;

/** The visits of a project, newest first; `visitId` narrows to one. */
export async function listVisits(projectId: string, visitId: string | null = null): Promise<readonly ListedVisit[]> {
  const { sequelize } = await openDatabase();
  return sequelize.query<ListedVisit>(`${SELECT}${visitId === null ? '' : ' AND v.id = :visitId'} ORDER BY v.started_at DESC, v.id`, {
    type: QueryTypes.SELECT, replacements: { projectId, visitId },
  });
}
