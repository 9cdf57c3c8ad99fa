/** The decimal sign of the phone's language; both are read wherever they are typed. */
export function decimalSign(language: string | undefined = typeof navigator === 'undefined' ? undefined : navigator.language): ',' | '.' {
  const sign = new Intl.NumberFormat(language).formatToParts(1.5).find(({ type }) => type === 'decimal')?.value;
  return sign === ',' ? ',' : '.';
}
