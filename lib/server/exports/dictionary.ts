import 'server-only';
import type { Project } from '@/lib/schema/project';
import type { Row } from './column';
import { lookColumns, treeColumns } from './tree-columns';

/** The columns of every table that a project exports, one row each. */
export function dictionaryRows(project: Project): readonly Row[] {
  const tables = [['trees', treeColumns(project)], ['second_looks', lookColumns(project)]] as const;
  return tables.flatMap(([table, columns]) => columns.map(({ name, meaning, unit, kind, words }) => ({ table, column: name, meaning, unit, kind, words: words?.join('|') ?? null })));
}
