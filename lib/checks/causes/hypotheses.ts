import type { Cause, Quantity } from '@/lib/schema/field';
import { CM_PER_INCH, M_PER_FOOT } from '@/lib/trees/units';
import type { ProjectUnits } from '../types';
import { slipRates } from './slip-rates';

/** What was meant is what stands times `factor`. All slips here are scalings, so on log scales their Jacobian is one. */
export type Hypothesis = { readonly cause: Cause; readonly quantity: Quantity; readonly factor: number; readonly rate: number };

/** The slips that a project's units allow: its field holds one unit, so the other one can only have been typed into it. */
export function hypotheses({ dbhUnit, lengthUnit }: Pick<ProjectUnits, 'dbhUnit' | 'lengthUnit'>): readonly Hypothesis[] {
  return [
    { cause: 'dbh-other-unit', quantity: 'dbh', factor: dbhUnit === 'cm' ? CM_PER_INCH : 1 / CM_PER_INCH, rate: slipRates['dbh-other-unit'] },
    { cause: 'girth-for-dbh', quantity: 'dbh', factor: 1 / Math.PI, rate: slipRates['girth-for-dbh'] },
    { cause: 'decimal-dbh', quantity: 'dbh', factor: 0.1, rate: slipRates['decimal-dbh'] / 2 },
    { cause: 'decimal-dbh', quantity: 'dbh', factor: 10, rate: slipRates['decimal-dbh'] / 2 },
    { cause: 'height-other-unit', quantity: 'height', factor: lengthUnit === 'm' ? M_PER_FOOT : 1 / M_PER_FOOT, rate: slipRates['height-other-unit'] },
    { cause: 'decimal-height', quantity: 'height', factor: 0.1, rate: slipRates['decimal-height'] / 2 },
    { cause: 'decimal-height', quantity: 'height', factor: 10, rate: slipRates['decimal-height'] / 2 },
  ];
}
