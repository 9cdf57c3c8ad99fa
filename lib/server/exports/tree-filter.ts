import 'server-only';
import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';

/** What may narrow the tree table; the same names stand in the address of the page, of the CSV and of the JSON. */
export const treeFilterSchema = z.object({
  /** any: stems with a second look; open: with one not yet answered. */
  doubts: z.enum(['any', 'open']).optional(),
  plot: z.string().max(20).optional(),
  species: idSchema.optional(),
  stratum: idSchema.optional(),
  kind: z.enum(['production', 'blind', 'cold', 'hot']).optional(),
  visit: idSchema.optional(),
});
export type TreeFilter = z.infer<typeof treeFilterSchema>;

/** With the page wanted; at most 500 rows at once. */
export const treePageSchema = treeFilterSchema.extend({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  offset: z.coerce.number().int().min(0).max(10_000_000).default(0),
});

type Clause = { readonly where: string; readonly replacements: Readonly<Record<string, string>> };

/** The filter as SQL over m (stem_measurements), v (visits), p (plots). */
export function filterClause(projectId: string, { doubts, plot, species, stratum, kind, visit }: TreeFilter): Clause {
  const doubted = (more: string) => `EXISTS (SELECT 1 FROM second_looks l WHERE l.measurement_id = m.id AND l.deleted = 0 AND l.level = 'look'${more})`;
  const parts: readonly (readonly [string | undefined, string])[] = [
    [doubts, doubted(doubts === 'open' ? " AND l.answer = 'open'" : '')],
    [plot, 'p.number = :plot'], [species, 'm.species_id = :species'], [stratum, 'p.stratum_id = :stratum'], [kind, 'v.kind = :kind'], [visit, 'v.id = :visit'],
  ];
  const wanted = parts.filter(([value]) => value !== undefined && value !== '').map(([, sql]) => sql);
  const replacements = Object.fromEntries(Object.entries({ projectId, plot, species, stratum, kind, visit }).filter((entry): entry is [string, string] => typeof entry[1] === 'string'));
  return { where: ['m.project_id = :projectId', 'm.deleted = 0', 'v.deleted = 0', ...wanted].join(' AND '), replacements };
}
