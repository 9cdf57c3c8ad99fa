import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import type { Quantity } from '@/lib/schema/field';
import { parseDigits } from '@/lib/trees/parse-digits';
import { unitOf } from './doubt-words';

/** What typed digits will be read as: "12,5" gives "read as 12.5 cm"; null while they are no number. */
export function readAsWords(digits: string, quantity: Quantity, units: { readonly dbhUnit: DbhUnit; readonly lengthUnit: LengthUnit }): string | null {
  const parsed = parseDigits(digits);
  if (parsed.kind !== 'value') return null;
  return `read as ${parsed.value.toFixed(parsed.decimals)} ${unitOf(quantity, units)}`;
}
