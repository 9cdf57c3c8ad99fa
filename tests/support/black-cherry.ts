import { readFileSync } from 'node:fs';

export type CherryTree = { readonly diameterIn: number; readonly heightFt: number };

/** The 31 black cherry trees of Ryan, Joiner and Ryan 1976 (tests/reference/black-cherry). */
export const blackCherry: readonly CherryTree[] = readFileSync(new URL('../reference/black-cherry/trees.csv', import.meta.url), 'utf8')
  .trim().split('\n').slice(1).map((line) => {
    const [diameterIn, heightFt] = line.split(',').map(Number);
    return { diameterIn: diameterIn!, heightFt: heightFt! };
  });
