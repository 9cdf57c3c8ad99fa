import { seededRandom } from '@/seeders/seeded-random';

/**
 * An invented stand that follows the model: ln(h − 1.3) = 3.2 + 8·ln(d/(1+d)) + u_plot + e, σ = 0.08, τ² = 0.5,
 * diameters log-normal about 27 cm, twenty trees to a plot.
 */
export function curtisStand(seed: string, n: number): { dCm: number; hM: number; plot: string }[] {
  const random = seededRandom(seed);
  let effect = 0;
  return Array.from({ length: n }, (_, i) => {
    if (i % 20 === 0) effect = 0.08 * Math.sqrt(0.5) * random.normal();
    const dCm = Math.exp(Math.log(27) + 0.3 * random.normal());
    const hM = 1.3 + Math.exp(3.2 + 8 * Math.log(dCm / (1 + dCm)) + effect + 0.08 * random.normal());
    return { dCm, hM, plot: `${seed} ${Math.floor(i / 20)}` };
  });
}
