/** A stratum of the estate. Every name is invented. */
export type EstateStratum = {
  readonly name: string;
  readonly areaHa: number;
  readonly plots: number;
  /** Stems per hectare from the tally threshold up. */
  readonly stemsPerHa: number;
  /** Share of each species code among the stems; sums to 1. */
  readonly mix: Readonly<Record<string, number>>;
  /** Where its forest road starts. */
  readonly gate: string;
};

export const ESTATE_NAME = 'Velmarrow estate';

/** 60 plots on a grid of 280 m, so that a plot stands for about 7.8 ha in every stratum. */
export const estateStrata: readonly EstateStratum[] = [
  { name: 'Upper Tarnholt', areaHa: 157.3, plots: 20, stemsPerHa: 640, mix: { NS: 0.66, SF: 0.14, EB: 0.2 }, gate: 'Tarnholt gate' },
  { name: 'Skarrow side', areaHa: 124.6, plots: 16, stemsPerHa: 520, mix: { NS: 0.22, SF: 0.08, EB: 0.6, SP: 0.1 }, gate: 'Skarrow sawpit' },
  { name: 'Kessen heath', areaHa: 110.2, plots: 14, stemsPerHa: 700, mix: { NS: 0.2, EB: 0.1, SP: 0.7 }, gate: 'Kessen heath barrier' },
  { name: 'Merrin bottom', areaHa: 78.9, plots: 10, stemsPerHa: 560, mix: { NS: 0.4, SF: 0.2, EB: 0.32, SP: 0.08 }, gate: 'Merrin mill bridge' },
];

export type EstateSpecies = { readonly code: string; readonly localName: string; readonly scientificName: string; readonly curveGroup: string; readonly unknown: boolean };

/** In the order of the buttons. */
export const estateSpecies: readonly EstateSpecies[] = [
  { code: 'NS', localName: 'Norway spruce', scientificName: 'Picea abies', curveGroup: 'spruce-fir', unknown: false },
  { code: 'SF', localName: 'silver fir', scientificName: 'Abies alba', curveGroup: 'spruce-fir', unknown: false },
  { code: 'EB', localName: 'European beech', scientificName: 'Fagus sylvatica', curveGroup: 'beech', unknown: false },
  { code: 'SP', localName: 'Scots pine', scientificName: 'Pinus sylvestris', curveGroup: 'pine', unknown: false },
  // No curve of its own: the pooled one serves until a tree is identified.
  { code: 'UN', localName: 'unknown', scientificName: '', curveGroup: 'unknown', unknown: true },
];

/** Number of each plot with its stratum, in grid order: first digit stratum, then two digits. */
export function estatePlotNumbers(): readonly { readonly number: string; readonly stratum: number }[] {
  return estateStrata.flatMap(({ plots }, stratum) =>
    Array.from({ length: plots }, (_, i) => ({ number: `${stratum + 1}${String(i + 1).padStart(2, '0')}`, stratum })));
}
