export type ScatterProps = {
  readonly title: string;
  readonly xLabel: string;
  readonly yLabel: string;
  readonly points: readonly { readonly x: number; readonly y: number }[];
  readonly line?: readonly { readonly x: number; readonly y: number }[];
  /** A level line, such as zero for residuals. */
  readonly level?: number;
};

const W = 360;
const H = 240;
const BOX = { left: 44, right: 10, top: 12, bottom: 36 } as const;

/** Round steps (1, 2, 5 times a power of ten) that divide a range into about five. */
export function niceTicks(low: number, high: number): readonly number[] {
  const raw = (high - low) / 5;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw) ?? raw;
  const first = Math.ceil(low / step);
  return Array.from({ length: Math.max(0, Math.floor(high / step) - first + 1) }, (_, i) => Number(((first + i) * step).toPrecision(12)));
}

/** Points with an optional line, axes in words with their units. Draws what it is given and computes nothing of it. */
export function Scatter({ title, xLabel, yLabel, points, line = [], level }: ScatterProps) {
  const all = [...points, ...line];
  if (all.length === 0) return <p className="text-ink-soft">{title}: nothing to draw.</p>;
  const range = (values: readonly number[]) => {
    const [low, high] = values.reduce<readonly [number, number]>(([a, b], value) => [Math.min(a, value), Math.max(b, value)], [Infinity, -Infinity]);
    const pad = (high - low || 1) * 0.05;
    return [low - pad, high + pad] as const;
  };
  const [x0, x1] = range(all.map(({ x }) => x));
  const [y0, y1] = range([...all.map(({ y }) => y), ...(level === undefined ? [] : [level])]);
  const px = (x: number) => BOX.left + ((x - x0) / (x1 - x0)) * (W - BOX.left - BOX.right);
  const py = (y: number) => H - BOX.bottom - ((y - y0) / (y1 - y0)) * (H - BOX.top - BOX.bottom);
  return (
    <figure>
      <figcaption className="text-sm font-bold">{title}</figcaption>
      <svg viewBox={`0 0 ${W} ${H}`} className="block w-full max-w-xl" role="img" aria-label={`${title}: ${points.length} points, ${yLabel} against ${xLabel}.`}>
        {niceTicks(x0, x1).map((tick) => (
          <g key={tick}>
            <line x1={px(tick)} x2={px(tick)} y1={BOX.top} y2={H - BOX.bottom} className="stroke-paper-line" />
            <text x={px(tick)} y={H - BOX.bottom + 14} textAnchor="middle" className="digits fill-ink-soft" fontSize={10}>{tick}</text>
          </g>
        ))}
        {niceTicks(y0, y1).map((tick) => (
          <g key={tick}>
            <line x1={BOX.left} x2={W - BOX.right} y1={py(tick)} y2={py(tick)} className="stroke-paper-line" />
            <text x={BOX.left - 5} y={py(tick) + 3.5} textAnchor="end" className="digits fill-ink-soft" fontSize={10}>{tick}</text>
          </g>
        ))}
        {level !== undefined && <line x1={BOX.left} x2={W - BOX.right} y1={py(level)} y2={py(level)} className="stroke-ink" strokeWidth={1.5} />}
        {points.map(({ x, y }, i) => <circle key={i} cx={px(x)} cy={py(y)} r={2.4} className="fill-none stroke-ink-soft" />)}
        {line.length > 0 && <polyline points={line.map(({ x, y }) => `${px(x)},${py(y)}`).join(' ')} className="fill-none stroke-bronze" strokeWidth={2.5} />}
        <text x={(BOX.left + W - BOX.right) / 2} y={H - 4} textAnchor="middle" className="fill-ink" fontSize={11}>{xLabel}</text>
        <text transform={`translate(11 ${(BOX.top + H - BOX.bottom) / 2}) rotate(-90)`} textAnchor="middle" className="fill-ink" fontSize={11}>{yLabel}</text>
      </svg>
    </figure>
  );
}
