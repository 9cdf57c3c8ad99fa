import { predictiveInterval } from '@/lib/stats/mixed/plot-intercept';
import type { Predictive } from '@/lib/stats/mixed/plot-intercept';

/** Diameters between which the share `level` of the species' trees should lie, cm. */
export function diameterInterval(logDiameter: Predictive, level: number): readonly [number, number] {
  const [low, high] = predictiveInterval(logDiameter, level);
  return [Math.exp(low), Math.exp(high)];
}
