import 'server-only';
import { answerSchema, causeSchema, stemFormSchema, stemStatusSchema, visitOutcomeSchema, visitSchema } from '@/lib/schema/field';
import type { Project } from '@/lib/schema/project';
import type { Column } from './column';

const text = (name: string, meaning: string, words?: readonly string[]): Column => ({ name, meaning, unit: '', kind: 'text', ...(words ? { words } : {}) });
const whole = (name: string, meaning: string): Column => ({ name, meaning, unit: 'count', kind: 'whole' });

/** The columns of the tree table, one row per stem and visit; also its dictionary. */
export function treeColumns({ dbhUnit, lengthUnit }: Pick<Project, 'dbhUnit' | 'lengthUnit'>): readonly Column[] {
  return [
    text('plot', 'number of the plot'),
    text('stratum', 'name of the stratum'),
    { ...text('visit_started', 'when the visit began, clock of the device'), unit: 'ISO 8601, UTC' },
    text('visit_kind', 'production visit or kind of check', visitSchema.shape.kind.options),
    text('visit_state', 'how far the visit has come', visitSchema.shape.state.options),
    text('visit_outcome', 'how the visit ended; empty while it is open', visitOutcomeSchema.options),
    text('tag', 'tag of the tree on its plot'),
    text('stem', 'label of the stem on its tree'),
    text('species_code', 'code of the project'),
    text('species', 'local name of the species'),
    text('status', 'live or dead', stemStatusSchema.options),
    text('form', 'whole, or why no height is expected', stemFormSchema.options),
    text('dbh_digits', `diameter at breast height as typed, in ${dbhUnit}`),
    text('dbh_unit', 'unit of dbh_digits'),
    { name: 'dbh_cm', meaning: 'diameter at breast height, converted once', unit: 'cm', kind: 'number' },
    text('height_digits', `total height as typed, in ${lengthUnit}`),
    text('height_unit', 'unit of height_digits'),
    { name: 'height_m', meaning: 'total height, converted once', unit: 'm', kind: 'number' },
    text('height_method', 'how the height was got', ['measured', 'estimated']),
    whole('readings', 'readings taken for this stem at this visit, all of them kept'),
    whole('looks', 'second looks that wanted an answer'),
    whole('open_looks', 'second looks not yet answered'),
    whole('quiet_marks', 'marks that asked nothing'),
    text('rules', 'rules that asked, separated by |'),
    text('causes', 'likely cause named for each look, separated by |', causeSchema.options),
    text('suggested', 'suggested value for each look, quantity and digits in the unit of the project, separated by |'),
    text('answers', 'answer to each look, separated by |', answerSchema.options),
    text('reasons', 'reason or note of each answer, separated by |'),
    whole('two_values', 'open conflicts: two devices gave different values'),
    text('measured_by', 'who measured, last reading'),
    text('recorded_by', 'who recorded, last reading'),
    text('remarks', 'remarks'),
    text('visit_id', 'id of the visit'),
    text('measurement_id', 'id of this row'),
  ];
}

/** The columns of the second looks, one row per doubt. */
export function lookColumns({ dbhUnit, lengthUnit }: Pick<Project, 'dbhUnit' | 'lengthUnit'>): readonly Column[] {
  const unit = `${dbhUnit} for dbh, ${lengthUnit} for height`;
  return [
    text('plot', 'number of the plot'),
    text('tag', 'tag of the tree on its plot'),
    text('stem', 'label of the stem on its tree'),
    text('species_code', 'code of the project'),
    text('level', 'look wants an answer, quiet is a mark', ['look', 'quiet']),
    text('rule', 'rule that asked'),
    text('quantity', 'what it asked about', ['dbh', 'height']),
    { ...text('entered', 'digits as typed'), unit },
    { name: 'expected_low', meaning: 'lower limit of what was expected', unit, kind: 'number' },
    { name: 'expected_high', meaning: 'upper limit of what was expected', unit, kind: 'number' },
    { name: 'tail_probability', meaning: 'two-sided predictive probability of a value at least as far out', unit: '0 to 1', kind: 'number' },
    text('cause', 'likely cause, where one was clear', causeSchema.options),
    { name: 'cause_probability', meaning: 'its posterior probability', unit: '0 to 1', kind: 'number' },
    text('suggested_quantity', 'what the suggestion is for', ['dbh', 'height']),
    { ...text('suggested', 'suggested digits'), unit },
    text('answer', 'what became of it', answerSchema.options),
    text('reason', 'reason, where the value was kept'),
    text('note', 'note to the answer'),
    text('answered_by', 'who answered'),
    { ...text('answered_at', 'when, clock of the device'), unit: 'ISO 8601, UTC' },
    { ...text('answer_digits', 'digits of the reading that answered it'), unit },
    { ...text('raised_at', 'when it was raised, clock of the device'), unit: 'ISO 8601, UTC' },
    text('raised_by', 'device or server', ['device', 'server']),
    text('look_id', 'id of the second look'),
    text('measurement_id', 'id of the stem and visit'),
  ];
}

/** Columns of the dictionary itself. */
export const dictionaryColumns: readonly Column[] = [
  text('table', 'which table', ['trees', 'second_looks']),
  text('column', 'name of the column'),
  text('meaning', 'what it holds'),
  text('unit', 'unit or way of writing'),
  text('kind', 'text, number or whole number', ['text', 'number', 'whole']),
  text('words', 'allowed words, separated by |'),
];
