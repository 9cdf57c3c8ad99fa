export type CurveForm = 'curtis' | 'michailoff' | 'wykoff' | 'power';

/**
 * The regressor x(d) of each height curve ln(h − bh) = β0 + β1·x(d), d in cm, h and bh in m.
 * Sources: Curtis 1967; Michailoff 1943; Wykoff, Crookston & Stage 1982; power: allometry, common practice.
 */
export const curveForms: Readonly<Record<CurveForm, (dCm: number) => number>> = {
  curtis: (d) => Math.log(d / (1 + d)),
  michailoff: (d) => 1 / d,
  wykoff: (d) => 1 / (d + 1),
  power: (d) => Math.log(d),
};
