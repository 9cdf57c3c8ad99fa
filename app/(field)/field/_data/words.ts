import type { VisitOutcome } from '@/lib/schema/field';

export { formWords, outcomeWords, reasonWords, statusWords } from '@/lib/schema/words';

export const outcomeHints: Readonly<Record<VisitOutcome, string>> = {
  full: 'Every tree of the plot is in.',
  part: 'Say below which part.',
  'no-trees': 'Looked at, and there is none: a true zero.',
  'not-forest': 'The point lies outside forest.',
  'access-refused': 'Somebody did not let you through.',
  hazard: 'Not safe, leaving. What is recorded stays.',
  'not-found': 'The plot could not be found again.',
};
