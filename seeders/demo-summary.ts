import type { DemoPerson } from './demo-people';

export type DemoProject = { readonly id: string; readonly name: string; readonly describes: string };

/**
 * What the demo holds. `sown`: made now; `kept`: made by an earlier start and left as people have changed it since;
 * `foreign`: the database holds something else and was not touched.
 */
export type DemoSummary =
  | { readonly state: 'sown' | 'kept'; readonly people: readonly DemoPerson[]; readonly projects: readonly DemoProject[] }
  | { readonly state: 'foreign' };
