/** A difference between a reference value and ours that exceeds its tolerance. */
export type Difference = { readonly where: string; readonly expected: unknown; readonly ours: unknown };
type Tolerance = { readonly abs?: number; readonly rel?: number; readonly ignore?: boolean; readonly fields?: Readonly<Record<string, Tolerance>> };

const isObject = (value: unknown): value is Readonly<Record<string, unknown>> => typeof value === 'object' && value !== null && !Array.isArray(value);

/**
 * Everything in `expected` that ours lacks or misses. A number passes when |ours - expected| <= abs + rel |expected|;
 * the tolerance is that of the deepest key on the path that has one. Keys that only ours has are not looked at.
 */
export function compareReference(expected: unknown, ours: unknown, tolerance: Tolerance): readonly Difference[] {
  const toleranceAt = (path: readonly string[]): Tolerance => path.map((key) => tolerance.fields?.[key]).findLast((t) => t !== undefined) ?? tolerance;
  const walk = (want: unknown, got: unknown, path: readonly string[]): readonly Difference[] => {
    const t = toleranceAt(path);
    const differs = [{ where: path.join('.'), expected: want, ours: got }];
    if (t.ignore) return [];
    if (Array.isArray(want)) return Array.isArray(got) && got.length === want.length ? want.flatMap((v, i) => walk(v, got[i], [...path, String(i)])) : differs;
    if (isObject(want)) return isObject(got) ? Object.keys(want).flatMap((key) => walk(want[key], got[key], [...path, key])) : differs;
    if (typeof want === 'number') return typeof got === 'number' && Math.abs(got - want) <= (t.abs ?? 0) + (t.rel ?? 0) * Math.abs(want) ? [] : differs;
    return want === got ? [] : differs;
  };
  return walk(expected, ours, []);
}
