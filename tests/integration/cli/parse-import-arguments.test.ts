import { describe, expect, it } from 'vitest';
import { parseImportArguments } from '@/lib/cli/import/parse-import-arguments';

const stated = ['--project', 'Dunmorrow tract', 'trees.csv', '--dbh-unit', 'in', '--height-unit', 'ft'];
const faultsOf = (...args: string[]) => {
  const parsed = parseImportArguments(args);
  return parsed.kind === 'usage' ? parsed.faults : [];
};

describe('arguments of npm run import', () => {
  it('reads project, file, units, columns, species and what to do afterwards', () => {
    expect(parseImportArguments([...stated, '--dbh', 'Girth', '--height', 'Height', '--species-name', 'black cherry', '--publish', '--form', 'wykoff', '--by', 'a@b.example']))
      .toEqual({
        kind: 'run',
        arguments: {
          project: 'Dunmorrow tract', file: 'trees.csv', dbhUnit: 'in', lengthUnit: 'ft',
          columns: { dbh: 'Girth', height: 'Height', species: null, plot: null }, speciesName: 'black cherry', publish: true, form: 'wykoff', note: '', by: 'a@b.example',
        },
      });
  });

  it('units have no default: a file without stated units is refused', () => {
    expect(faultsOf('--project', 'x', 'f.csv', '--species', 'sp')).toEqual([
      'State the unit of the diameters: --dbh-unit cm or --dbh-unit in.', 'State the unit of the heights: --height-unit m or --height-unit ft.',
    ]);
    expect(faultsOf('--project', 'x', 'f.csv', '--species', 'sp', '--dbh-unit', 'mm', '--height-unit', 'yd')).toHaveLength(2);
  });

  it('says all that is missing at once', () => {
    expect(faultsOf()).toHaveLength(5);
  });

  it.each([
    [['--species', 'a', '--species-name', 'b'], /not both/],
    [['--species', 'a', 'second.csv'], /One file at a time/],
    [['--species', 'a', '--form', 'curtis'], /needs --publish/],
    [['--species', 'a', '--publish', '--form', 'straight'], /curtis, michailoff/],
    [['--species', 'a', '--girth', 'x'], /Unknown option '--girth'/],
  ])('%j is refused', (more, fault) => {
    expect(faultsOf(...stated, ...more).join(' ')).toMatch(fault);
  });

  it('--help needs nothing else', () => {
    expect(parseImportArguments(['--help'])).toEqual({ kind: 'help' });
  });
});
