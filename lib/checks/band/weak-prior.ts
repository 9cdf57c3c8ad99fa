import { curveForms } from '@/lib/stats/forms/curve-forms';
import type { CurveForm } from '@/lib/stats/forms/curve-forms';
import type { PlotInterceptPrior } from '@/lib/stats/mixed/plot-intercept';

/**
 * What may be believed of heights in a forest nobody has measured yet. Two anchors: about 13.5 m at 15 cm and 23 m at
 * 40 cm, slenderness 90 and 58, the middle of the usual 40–130 (common practice, no source). Each is uncertain by a
 * factor of about 1.5 (0.40 on the log scale), trees of one stand spread by 9 %. So a 30 cm tree of 12 m or 38 m is
 * nothing odd, while 21 m entered in feet (70) is a tail of about 0.003: the slip is caught from the first tree on.
 * The spread counts as 20 trees (a = 10): fewer would give tails so heavy that nothing could be doubted.
 */
const anchors = [{ dCm: 15, heightM: 13.5 }, { dCm: 40, heightM: 23 }] as const;
const ANCHOR_SD = 0.4;
const TREE_SD = 0.09;
const SHAPE = 10;

/** Diameters for which the weak prior dares a band, cm. */
export const WEAK_D_MIN_CM = 4;
export const WEAK_D_MAX_CM = 120;
/** Diameters before any are known: median 22 cm, nine in ten between about 8 and 60 cm (common practice, no source). */
export const weakDiameters = { mean: Math.log(22), sd: 0.6, worthTrees: 4 } as const;

/** The weak starting prior in terms of a curve form. bh in m. */
export function weakPrior(form: CurveForm, breastHeightM: number, tauSquared: number): PlotInterceptPrior {
  const [low, high] = anchors.map(({ dCm, heightM }) => ({ x: curveForms[form](dCm), y: Math.log(heightM - breastHeightM) }));
  const slope = (high!.y - low!.y) / (high!.x - low!.x);
  const weight = (TREE_SD / ANCHOR_SD) ** 2;
  return {
    mean: [low!.y - slope * low!.x, slope],
    precision: [2 * weight, weight * (low!.x + high!.x), weight * (low!.x ** 2 + high!.x ** 2)],
    a: SHAPE, s: SHAPE * TREE_SD ** 2, tauSquared,
  };
}
