import { parseArgs } from 'node:util';
import { dbhUnitSchema, lengthUnitSchema } from '@/lib/schema/common';
import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import { curveFormSchema } from '@/lib/schema/design';
import type { CurveForm } from '@/lib/schema/design';

export const IMPORT_USAGE = `Usage: npm run import -- --project NAME FILE.csv --dbh-unit cm|in --height-unit m|ft [options]

  --project NAME         the project, by its name or id
  --dbh-unit cm|in       unit of the diameters in the file; must be the project's
  --height-unit m|ft     unit of the heights in the file; must be the project's
  --dbh COLUMN           column of the diameters at breast height (default: dbh)
  --height COLUMN        column of the total heights (default: height)
  --species COLUMN       column of the species, by code or name in the project, or
  --species-name NAME    one species for all trees of the file
  --plot COLUMN          column of the plot, where the trees come from plots
  --publish              fit the height curves anew afterwards and publish them
  --form FORM            curve form to fit: curtis, michailoff, wykoff or power (default: the project's)
  --note TEXT            where the trees come from; kept with them
  --by EMAIL             who imports (default: the first administrator)

A file is taken whole or not at all. Exit code: 0 taken, 1 refused, 2 the command does not say what it must.`;

export type ImportArguments = {
  readonly project: string;
  readonly file: string;
  readonly dbhUnit: DbhUnit;
  readonly lengthUnit: LengthUnit;
  readonly columns: { readonly dbh: string; readonly height: string; readonly species: string | null; readonly plot: string | null };
  /** One species for all trees; then there is no species column. */
  readonly speciesName: string | null;
  readonly publish: boolean;
  readonly form: CurveForm | null;
  readonly note: string;
  readonly by: string | null;
};

export type ParsedImportArguments =
  | { readonly kind: 'run'; readonly arguments: ImportArguments }
  | { readonly kind: 'help' }
  | { readonly kind: 'usage'; readonly faults: readonly string[] };

const options = {
  project: { type: 'string' }, dbh: { type: 'string', default: 'dbh' }, height: { type: 'string', default: 'height' }, species: { type: 'string' },
  'species-name': { type: 'string' }, plot: { type: 'string' }, 'dbh-unit': { type: 'string' }, 'height-unit': { type: 'string' },
  publish: { type: 'boolean', default: false }, form: { type: 'string' }, note: { type: 'string', default: '' }, by: { type: 'string' },
  help: { type: 'boolean', default: false },
} as const;

/** Reads the arguments of the import command; all faults at once. */
export function parseImportArguments(args: readonly string[]): ParsedImportArguments {
  let parsed;
  try {
    parsed = parseArgs({ args: [...args], options, allowPositionals: true, strict: true });
  } catch (error) {
    return { kind: 'usage', faults: [error instanceof Error ? error.message : String(error)] };
  }
  const { values, positionals } = parsed;
  if (values.help) return { kind: 'help' };
  const faults: string[] = [];
  const dbhUnit = dbhUnitSchema.safeParse(values['dbh-unit']);
  const lengthUnit = lengthUnitSchema.safeParse(values['height-unit']);
  const form = curveFormSchema.optional().safeParse(values.form);
  if (!values.project) faults.push('Name the project with --project NAME.');
  if (positionals.length === 0) faults.push('Name the file.');
  if (positionals.length > 1) faults.push(`One file at a time: ${positionals.join(', ')}.`);
  if (!dbhUnit.success) faults.push('State the unit of the diameters: --dbh-unit cm or --dbh-unit in.');
  if (!lengthUnit.success) faults.push('State the unit of the heights: --height-unit m or --height-unit ft.');
  if (!form.success) faults.push('--form is one of curtis, michailoff, wykoff, power.');
  if (values.form !== undefined && !values.publish) faults.push('--form says how to fit; it needs --publish.');
  if (values.species === undefined && values['species-name'] === undefined) {
    faults.push('Say which species the trees are: --species COLUMN, or --species-name NAME for all of them.');
  }
  if (values.species !== undefined && values['species-name'] !== undefined) faults.push('Give --species or --species-name, not both.');
  const [file] = positionals;
  if (faults.length > 0 || !values.project || file === undefined || !dbhUnit.success || !lengthUnit.success || !form.success) return { kind: 'usage', faults };
  return {
    kind: 'run',
    arguments: {
      project: values.project, file, dbhUnit: dbhUnit.data, lengthUnit: lengthUnit.data,
      columns: { dbh: values.dbh, height: values.height, species: values.species ?? null, plot: values.plot ?? null },
      speciesName: values['species-name'] ?? null, publish: values.publish, form: form.data ?? null, note: values.note, by: values.by ?? null,
    },
  };
}
