import type { AcceptReason, StemMeasurement, VisitOutcome } from '@/lib/schema/field';

/** Our code lists, spelled out as they stand on screen. */
export const outcomeWords: Readonly<Record<VisitOutcome, string>> = {
  full: 'Measured in full',
  part: 'Measured in part',
  'no-trees': 'No trees',
  'not-forest': 'Not forest',
  'access-refused': 'Access refused',
  hazard: 'Hazard',
  'not-found': 'Not found',
};

export const outcomeHints: Readonly<Record<VisitOutcome, string>> = {
  full: 'Every tree of the plot is in.',
  part: 'Say below which part.',
  'no-trees': 'Looked at, and there is none: a true zero.',
  'not-forest': 'The point lies outside forest.',
  'access-refused': 'Somebody did not let you through.',
  hazard: 'Not safe, leaving. What is recorded stays.',
  'not-found': 'The plot could not be found again.',
};

export const reasonWords: Readonly<Record<AcceptReason, string>> = {
  'broken-top': 'Broken top',
  swelling: 'Swelling',
  suppressed: 'Suppressed',
  'read-twice': 'Read twice',
  other: 'Other reason',
};

export const statusWords: Readonly<Record<StemMeasurement['status'], string>> = { live: 'Live', dead: 'Dead' };
export const formWords: Readonly<Record<StemMeasurement['form'], string>> = { whole: 'Whole', broken: 'Broken', forked: 'Forked', leaning: 'Leaning' };
