/** Exact by definition: international foot and inch, and the acre made of them (US Federal Register 2020-21902). */
export const CM_PER_INCH = 2.54;
export const M_PER_FOOT = 0.3048;
export const M2_PER_ACRE = 4046.8564224;

type DbhUnit = 'cm' | 'in';
type LengthUnit = 'm' | 'ft';

/** A diameter in cm from its unit. */
export function toCanonicalCm(value: number, unit: DbhUnit): number {
  return unit === 'cm' ? value : value * CM_PER_INCH;
}

/** A length in m from its unit. */
export function toCanonicalM(value: number, unit: LengthUnit): number {
  return unit === 'm' ? value : value * M_PER_FOOT;
}

/** A diameter given in cm, in `unit`. */
export function fromCanonicalCm(cm: number, unit: DbhUnit): number {
  return unit === 'cm' ? cm : cm / CM_PER_INCH;
}

/** A length given in m, in `unit`. */
export function fromCanonicalM(m: number, unit: LengthUnit): number {
  return unit === 'm' ? m : m / M_PER_FOOT;
}
