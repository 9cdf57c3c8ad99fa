import { createScreen } from '@/lib/checks/screen';
import type { Screen } from '@/lib/checks/types';
import type { SecondLook } from '@/lib/schema/field';
import { stemEntry, teachingOf } from '../_entry/stem-entry';
import type { ProjectRecords } from './project-records';

const NO_LOOKS: readonly SecondLook[] = [];

function looksByMeasurement(records: ProjectRecords): ReadonlyMap<string, readonly SecondLook[]> {
  const found = new Map<string, SecondLook[]>();
  for (const look of records.secondLook.values()) {
    const mine = found.get(look.measurementId);
    if (mine) mine.push(look);
    else found.set(look.measurementId, [look]);
  }
  return found;
}

/**
 * Teaches one stem as it now stands; one that is deleted, or of a visit that does not teach, is forgotten. Visits begun before
 * `since` are in the published curve already, at the weight that another year deserves.
 */
function teachOne(screen: Screen, records: ProjectRecords, measurementId: string, looks: readonly SecondLook[], since: string): void {
  const measurement = records.stemMeasurement.get(measurementId);
  const visit = measurement && records.visit.get(measurement.visitId);
  if (!measurement || measurement.deleted || !visit || visit.deleted || visit.kind !== 'production' || visit.startedAt < since) {
    screen.forget(measurementId);
    return;
  }
  const group = measurement.speciesId === null ? null : records.speciesEntry.get(measurement.speciesId)?.curveGroup ?? null;
  screen.teach(stemEntry(measurement, visit.plotId, group), teachingOf(looks));
}

/** The stems that changes touch, to be taught anew. */
export function teachChanged(screen: Screen, records: ProjectRecords, measurementIds: ReadonlySet<string>, since: string): void {
  for (const id of measurementIds) teachOne(screen, records, id, [...records.secondLook.values()].filter((look) => look.measurementId === id), since);
}

/**
 * The checks of a project with all that its stems of the round begun at `since` teach. `without` leaves out the visits of a plot:
 * a blind visit uses nothing of what it checks.
 */
export function projectScreen(records: ProjectRecords, projectId: string, since: string, without: string | null = null): Screen | null {
  const project = records.project.get(projectId);
  if (!project) return null;
  const { dbhUnit, lengthUnit, dbhDecimals, heightDecimals, breastHeightM, alarmRatePer100, tauSquared, curveForm } = project;
  const screen = createScreen({
    units: { dbhUnit, lengthUnit, dbhDecimals, heightDecimals, breastHeightM }, alarmRatePer100, tauSquared, curveForm,
    curves: [...records.heightCurve.values()].filter(({ deleted }) => !deleted),
  });
  const looks = looksByMeasurement(records);
  for (const { id, visitId } of records.stemMeasurement.values()) {
    if (without === null || records.visit.get(visitId)?.plotId !== without) teachOne(screen, records, id, looks.get(id) ?? NO_LOOKS, since);
  }
  return screen;
}
