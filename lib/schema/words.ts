import type { Role } from './common';
import type { AcceptReason, Answer, Cause, StemMeasurement, Visit, VisitOutcome } from './field';

/** Our code lists, spelled out as they stand on every screen and in every dictionary of columns. */
export const outcomeWords: Readonly<Record<VisitOutcome, string>> = {
  full: 'Measured in full',
  part: 'Measured in part',
  'no-trees': 'No trees',
  'not-forest': 'Not forest',
  'access-refused': 'Access refused',
  hazard: 'Hazard',
  'not-found': 'Not found',
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

export const causeWords: Readonly<Record<Cause, string>> = {
  'dbh-other-unit': 'DBH in the other unit',
  'height-other-unit': 'height in the other unit',
  'girth-for-dbh': 'girth taken for DBH',
  'decimal-dbh': 'slipped decimal in DBH',
  'decimal-height': 'slipped decimal in height',
  'digits-swapped-dbh': 'two digits of DBH swapped',
  'digits-swapped-height': 'two digits of height swapped',
  'digit-replaced-dbh': 'slip on the pad in DBH',
  'digit-replaced-height': 'slip on the pad in height',
  'fields-swapped': 'DBH and height swapped',
  'angle-unit': 'degrees taken for percent',
  'other-tree': 'another tree’s row',
  unexplained: 'unexplained',
};

export const answerWords: Readonly<Record<Answer, string>> = {
  open: 'Open',
  'measured-again': 'Measured again',
  'read-again': 'Read again',
  converted: 'Suggested value taken',
  accepted: 'Kept, with a reason',
  'settled-in-office': 'Settled in the office',
  withdrawn: 'Withdrawn',
};

export const visitKindWords: Readonly<Record<Visit['kind'], string>> = { production: 'Production', blind: 'Blind check', cold: 'Cold check', hot: 'Hot check' };
export const visitStateWords: Readonly<Record<Visit['state'], string>> = { open: 'Open', finished: 'Finished', signedOff: 'Signed off', sentBack: 'Sent back' };
export const roleWords: Readonly<Record<Role | 'admin', string>> = { crew: 'Crew', lead: 'Crew lead', analyst: 'Analyst', admin: 'Administrator' };

/** What a rule asks about, in words. */
export const ruleWords: Readonly<Record<string, string>> = {
  'height-band': 'height and DBH do not go together',
  'dbh-range': 'DBH far from all others of its species',
  'hard-limits': 'no tree is like that',
  'height-not-above-breast-height': 'height not above breast height',
  slenderness: 'height out of proportion to DBH',
};
