/** Width of a bin on ln d: about a tenth of a diameter. */
const BIN = 0.1;

/**
 * Smallest and largest of the diameters that taught, as trees come and go. Diameters lie in bins of ln d, so that taking
 * the largest one away looks through one bin and not through every tree of the project.
 * Cost: O(1) to add; to remove, O(1) unless the diameter was the smallest or largest of its bin, then the bin's own size.
 * All diameters in cm and positive.
 */
export class DiameterRange {
  readonly #bins = new Map<number, { readonly counts: Map<number, number>; least: number; most: number }>();

  /** A diameter may be added more than once. */
  add(dCm: number): void {
    const key = Math.floor(Math.log(dCm) / BIN);
    const bin = this.#bins.get(key);
    if (!bin) {
      this.#bins.set(key, { counts: new Map([[dCm, 1]]), least: dCm, most: dCm });
      return;
    }
    bin.counts.set(dCm, (bin.counts.get(dCm) ?? 0) + 1);
    bin.least = Math.min(bin.least, dCm);
    bin.most = Math.max(bin.most, dCm);
  }

  /** Takes one of these diameters away; nothing happens when there is none. */
  remove(dCm: number): void {
    const key = Math.floor(Math.log(dCm) / BIN);
    const bin = this.#bins.get(key);
    const count = bin?.counts.get(dCm);
    if (!bin || count === undefined) return;
    if (count > 1) {
      bin.counts.set(dCm, count - 1);
      return;
    }
    bin.counts.delete(dCm);
    if (bin.counts.size === 0) {
      this.#bins.delete(key);
    } else if (dCm === bin.least || dCm === bin.most) {
      // Different diameters in one bin are few: they are typed to a millimetre, and the bin spans a tenth.
      bin.least = Infinity;
      bin.most = 0;
      for (const d of bin.counts.keys()) {
        bin.least = Math.min(bin.least, d);
        bin.most = Math.max(bin.most, d);
      }
    }
  }

  /** Smallest and largest of all, widened to take in `known`. */
  around(known: readonly [number, number]): readonly [number, number] {
    let [least, most] = known;
    for (const bin of this.#bins.values()) {
      least = Math.min(least, bin.least);
      most = Math.max(most, bin.most);
    }
    return [least, most];
  }
}
