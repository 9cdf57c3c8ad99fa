import type { PlanePoint } from './local-plane';
import { median } from './median';

/** A fix further out than 99.9 % of a circular normal is taken for one made away from the centre. */
const FAR_SIGMAS = Math.sqrt(-2 * Math.log(0.001));
/** Own choice: fixes within this distance stay, because a receiver that smooths repeats one place and then steps. */
const ALWAYS_KEPT_M = 3;
/** Above this count the start is looked for among an even selection; it costs n². */
const START_AT_MOST = 60;
const MEDIAN_SIGMAS = Math.sqrt(2 * Math.LN2);

const distance = (a: PlanePoint, b: PlanePoint): number => Math.hypot(a.eastM - b.eastM, a.northM - b.northM);
const middleOf = (points: readonly PlanePoint[]): PlanePoint => ({ eastM: median(points.map((p) => p.eastM)), northM: median(points.map((p) => p.northM)) });

/** The fix round which the smallest circle holds half of all, with the radius of that circle. */
function densestStart(points: readonly PlanePoint[]): { readonly at: PlanePoint; readonly radius: number } {
  const every = Math.ceil(points.length / START_AT_MOST);
  const sample = points.filter((_, i) => i % every === 0);
  let best = { at: sample[0]!, radius: Infinity };
  for (const at of sample) {
    const sorted = sample.map((p) => distance(p, at)).sort((a, b) => a - b);
    const radius = sorted[sorted.length >> 1]!;
    if (radius < best.radius) best = { at, radius };
  }
  return best;
}

/**
 * Which fixes were made at the centre: the densest half starts, and all within 3.72 robust standard deviations join.
 *
 * Works while more than half of the fixes were made at the centre, wherever the others were. The spread comes from the
 * median distance, so a few far fixes do not stretch it. Fixes within 3 m of the centre always stay.
 *
 * @param points m in a plane, at least one
 * @returns for each point whether it stays
 * @source smallest half: Rousseeuw 1984, Journal of the American Statistical Association 79:871-880 (the idea, in two dimensions)
 * @example keepFixesAtCentre(points)
 */
export function keepFixesAtCentre(points: readonly PlanePoint[]): readonly boolean[] {
  const start = densestStart(points);
  let centre = start.at;
  let limit = Math.max(ALWAYS_KEPT_M, (FAR_SIGMAS * start.radius) / MEDIAN_SIGMAS);
  let kept = points.map((p) => distance(p, centre) <= limit);
  for (let round = 0; round < 20; round += 1) {
    const inside = points.filter((_, i) => kept[i]);
    centre = middleOf(inside);
    const from = centre;
    limit = Math.max(ALWAYS_KEPT_M, (FAR_SIGMAS * median(inside.map((p) => distance(p, from)))) / MEDIAN_SIGMAS);
    const reach = limit;
    const next = points.map((p) => distance(p, from) <= reach);
    if (!next.some(Boolean) || next.every((k, i) => k === kept[i])) break;
    kept = next;
  }
  return kept;
}
