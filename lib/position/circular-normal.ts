import { refuse } from './refusal';
import type { Refused } from './refusal';

/**
 * Radius of the circle that holds a share of a circular normal distribution, in units of its per-axis standard deviation.
 *
 * @param share between 0 and 1, both excluded
 * @returns sqrt(-2 ln(1 - share))
 * @source Rayleigh distribution; FGDC-STD-007.3-1998 (NSSDA), appendix 3-A, for 0.95
 * @example circularRadius(0.95) // 2.44775
 */
export function circularRadius(share: number): { readonly kind: 'radius'; readonly sigmas: number } | Refused<'share-outside'> {
  if (!(share > 0 && share < 1)) return refuse('share-outside');
  return { kind: 'radius', sigmas: Math.sqrt(-2 * Math.log1p(-share)) };
}

/**
 * Share of a circular normal distribution within a radius given in per-axis standard deviations.
 *
 * @example circularShare(Math.SQRT2) // 0.63212, the share within DRMS
 */
export function circularShare(sigmas: number): number {
  return -Math.expm1(-(sigmas ** 2) / 2);
}

/** 95 % radius over per-axis standard deviation. */
export const R95_PER_SIGMA = Math.sqrt(-2 * Math.log(0.05));
/** From a radius that holds 68 % to one that holds 95 % (1.6215): Android describes its value as the former. */
export const R95_PER_R68 = Math.sqrt(Math.log(0.05) / Math.log(0.32));
/** From distance root mean square to the 95 % radius (1.7308): Apple describes its value as the former. */
export const R95_PER_DRMS = R95_PER_SIGMA / Math.SQRT2;
