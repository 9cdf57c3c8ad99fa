export type BandStripProps = {
  /** Limits of the expected band and the standing value, all in one unit. */
  readonly low: number;
  readonly high: number;
  readonly value: number;
  /** What is shown, for the accessible name: "height". */
  readonly what: string;
};

const WIDTH = 320;
const HEIGHT = 40;
/** The band takes the middle of the strip, so that a value can stand clearly outside on either side. */
const BAND = { from: WIDTH * 0.32, to: WIDTH * 0.68 } as const;
const EDGE = 10;

/** Where a value stands against a band, in words that can be called aloud. */
export function bandVerdict(low: number, high: number, value: number): string {
  const width = high - low;
  if (value < low) return low - value > width ? 'far below the expected band' : 'below the expected band';
  if (value > high) return value - high > width ? 'far above the expected band' : 'above the expected band';
  return 'inside the expected band';
}

/** Place of a value on the strip, in its own units of width; beyond the edges it stops at them. */
export function bandPlace(low: number, high: number, value: number): { readonly x: number; readonly beyond: -1 | 0 | 1 } {
  const share = (value - low) / (high - low);
  const x = BAND.from + share * (BAND.to - BAND.from);
  if (x < EDGE) return { x: EDGE, beyond: -1 };
  if (x > WIDTH - EDGE) return { x: WIDTH - EDGE, beyond: 1 };
  return { x, beyond: 0 };
}

/**
 * The band strip: the expected band as a bar, the standing value as a tick on it, and no numbers, so that nobody reads
 * off what was expected. A value beyond the strip stands at its edge as an arrow.
 */
export function BandStrip({ low, high, value, what }: BandStripProps) {
  const { x, beyond } = bandPlace(low, high, value);
  const outside = value < low || value > high;
  const tick = beyond === 0 ? `M${x} 3V37` : `M${x - beyond * 9} 8L${x} 20L${x - beyond * 9} 32`;
  return (
    <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} className="block h-10 w-full max-w-md" role="img" aria-label={`The ${what} stands ${bandVerdict(low, high, value)}.`}>
      <line x1={EDGE} x2={WIDTH - EDGE} y1={20} y2={20} className="stroke-ink-faint" strokeWidth={2} strokeDasharray="2 6" strokeLinecap="round" />
      <rect x={BAND.from} y={11} width={BAND.to - BAND.from} height={18} rx={3} className="fill-bronze-wash stroke-bronze" strokeWidth={2} />
      <line x1={(BAND.from + BAND.to) / 2} x2={(BAND.from + BAND.to) / 2} y1={15} y2={25} className="stroke-bronze" strokeWidth={2} />
      <path d={tick} fill="none" className={outside ? 'stroke-doubt' : 'stroke-ink'} strokeWidth={6} strokeLinecap="round" strokeLinejoin="round" />
    </svg>
  );
}
