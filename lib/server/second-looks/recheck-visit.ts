import 'server-only';
import { createScreen } from '@/lib/checks/screen';
import type { StemEntry } from '@/lib/checks/types';
import { heightCurveSchema } from '@/lib/schema/design';
import type { SecondLook, StemMeasurement } from '@/lib/schema/field';
import { openDatabase } from '@/models';
import { readProject } from '../projects/project-overview';

/** Whether the server's own screening of a stem as it stands asks what the device asked. */
export type Recheck = { readonly state: 'agrees' | 'differs'; readonly rules: readonly string[] };

/**
 * Screens the stems of a visit on the server, in their order of entry, with the published curves and what the visit itself
 * teaches, and compares the rules that ask with those of the device's looks that were not withdrawn. A device had other plots to
 * learn from too, so a difference near an edge is no fault by itself.
 */
export async function recheckVisit(projectId: string, visitId: string, measurements: readonly StemMeasurement[], looks: ReadonlyMap<string, readonly SecondLook[]>): Promise<ReadonlyMap<string, Recheck>> {
  const { models } = await openDatabase();
  const [project, curves, species, visit] = await Promise.all([
    readProject(projectId),
    models.HeightCurve.findAll({ where: { projectId, deleted: false } }),
    models.SpeciesEntry.findAll({ where: { projectId } }),
    models.Visit.findByPk(visitId),
  ]);
  const { dbhUnit, lengthUnit, dbhDecimals, heightDecimals, breastHeightM, alarmRatePer100, tauSquared, curveForm } = project;
  const screen = createScreen({
    units: { dbhUnit, lengthUnit, dbhDecimals, heightDecimals, breastHeightM }, alarmRatePer100, tauSquared, curveForm,
    curves: curves.map((curve) => heightCurveSchema.parse(curve.get({ plain: true }))),
  });
  const groups = new Map(species.map(({ id, curveGroup }) => [id, curveGroup]));
  return new Map(measurements.map((measurement) => {
    const { id, speciesId, status, form, dbhDigits, dbhCm, heightDigits, heightM, heightMethod } = measurement;
    const stem: StemEntry = {
      id, plotId: visit?.plotId ?? visitId, speciesId, curveGroup: speciesId === null ? null : groups.get(speciesId) ?? null,
      status, form, dbhDigits, dbhCm, heightDigits, heightM, heightMethod,
    };
    const mine = (looks.get(id) ?? []).filter(({ level, answer }) => level === 'look' && answer !== 'withdrawn');
    const asked = screen.screen(stem).filter(({ level }) => level === 'look').map(({ rule }) => rule);
    const standing = mine.filter(({ answer }) => answer === 'open' || answer === 'accepted' || answer === 'measured-again').map(({ rule }) => rule);
    screen.teach(stem, mine.some(({ answer }) => answer === 'open') ? 'open' : mine.some(({ answer }) => answer === 'measured-again') ? 'measured-twice' : mine.some(({ answer }) => answer === 'accepted') ? 'accepted' : 'undoubted');
    const agrees = asked.every((rule) => standing.includes(rule)) && (standing.length === 0 || asked.length > 0);
    return [id, { state: agrees ? 'agrees' : 'differs', rules: asked } as const];
  }));
}
