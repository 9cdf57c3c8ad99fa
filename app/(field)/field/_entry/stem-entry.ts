import type { StemEntry, Teaching } from '@/lib/checks/types';
import type { SecondLook, StemMeasurement } from '@/lib/schema/field';

/** A measurement as the checks see it. The measurement's id names it: a stem is another entry at each visit. */
export function stemEntry(measurement: StemMeasurement, plotId: string, curveGroup: string | null): StemEntry {
  const { id, speciesId, status, form, dbhDigits, dbhCm, heightDigits, heightM, heightMethod } = measurement;
  return { id, plotId, speciesId, curveGroup, status, form, dbhDigits, dbhCm, heightDigits, heightM, heightMethod };
}

/** How far a stem's doubts are answered, which decides how much it teaches (design §2, statistics §1.4). */
export function teachingOf(looks: readonly SecondLook[]): Teaching {
  const asked = looks.filter(({ level, deleted }) => level === 'look' && !deleted);
  if (asked.some(({ answer }) => answer === 'open')) return 'open';
  if (asked.some(({ answer }) => answer === 'accepted' || answer === 'settled-in-office')) return 'accepted';
  const twice = asked.some(({ answer, answerReadingId }) => answer === 'measured-again' || (answer === 'read-again' && answerReadingId !== null));
  return twice ? 'measured-twice' : 'undoubted';
}
