import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { root, sourceFiles } from './source-files';

const read = (file: string) => readFileSync(path.join(root, file), 'utf8');
const code = /\.(ts|tsx|mjs|css)$/;

type Manifest = Readonly<Record<'dependencies' | 'devDependencies', Record<string, string>>>;

/** Hex of 3, 4, 6 or 8 digits as a value, and the colour functions of CSS. */
const colourLiteral = /(?<![\w&/#-])#(?:[0-9a-f]{8}|[0-9a-f]{6}|[0-9a-f]{3,4})\b(?!-)|\b(?:rgba?|hsla?|oklch|oklab|lab|lch|hwb|color-mix)\(/gi;

describe('form of the source', () => {
  it('no file has 600 lines', () => {
    const long = sourceFiles(code).map((file) => ({ file, lines: read(file).split('\n').length })).filter(({ lines }) => lines >= 600);
    expect(long).toEqual([]);
  });

  it('colours stand in app/globals.css only; where no CSS reaches (theme colour, manifest) they repeat one of its', () => {
    const tokens = new Set(read('app/globals.css').match(colourLiteral));
    const mayRepeat = new Set(['app/layout.tsx', 'app/manifest.ts']);
    const found = sourceFiles(/^(app|components|lib|tailwind\.config)(\/|\.).*(ts|tsx|css)$/)
      .filter((file) => file !== 'app/globals.css')
      .flatMap((file) => read(file).split('\n').flatMap((line, i) => [...line.matchAll(colourLiteral)]
        .filter(([literal]) => !(mayRepeat.has(file) && tokens.has(literal))).map(([literal]) => `${file}:${i + 1} ${literal}`)));
    expect(found).toEqual([]);
  });

  it.each(['#fff', '#8a0f5c', '#11223344', 'rgb(0 0 0)', 'hsla(1, 2%, 3%, 1)'])('%s is seen as a colour', (literal) => {
    expect(`color: ${literal};`.match(colourLiteral)).toHaveLength(1);
  });

  it('a route file has less than 120 lines', () => {
    const long = sourceFiles(/^app\/.*\/route\.ts$/).map((file) => ({ file, lines: read(file).split('\n').length })).filter(({ lines }) => lines >= 120);
    expect(long).toEqual([]);
  });

  it('every package version is exact', () => {
    const { dependencies, devDependencies } = JSON.parse(read('package.json')) as Manifest;
    const loose = Object.entries({ ...dependencies, ...devDependencies }).filter(([, version]) => !/^\d+\.\d+\.\d+(-[\w.]+)?$/.test(version));
    expect(loose).toEqual([]);
  });

  it('file names are kebab-case', () => {
    const named = sourceFiles(/^(components|lib|models|seeders|tests)\/.*\.(ts|tsx|mjs)$/);
    expect(named.filter((file) => !/^[a-z0-9]+([-.][a-z0-9]+)*\.(ts|tsx|mjs)$/.test(path.basename(file)))).toEqual([]);
  });

  it('no check is switched off and nothing is left for later', () => {
    const marks = new RegExp(['eslint-' + 'disable', '@ts-' + '(ignore|nocheck|expect-error)', '\\b(TO' + 'DO|FIX' + 'ME)\\b', '\\b(it|describe|test)\\.(skip|only|todo)\\b'].join('|'));
    const found = sourceFiles(code).flatMap((file) => read(file).split('\n').flatMap((line, i) => (marks.test(line) ? [`${file}:${i + 1} ${line.trim()}`] : [])));
    expect(found).toEqual([]);
  });
});
