import type { DbhUnit, LengthUnit } from '@/lib/schema/common';
import type { Quantity, SecondLook } from '@/lib/schema/field';

type Units = { readonly dbhUnit: DbhUnit; readonly lengthUnit: LengthUnit };
type Told = Pick<SecondLook, 'quantity' | 'cause' | 'enteredDigits' | 'enteredCanonical' | 'expectedLow' | 'expectedHigh'>;

export const quantityWords: Readonly<Record<Quantity, string>> = { dbh: 'DBH', height: 'Height' };
const unitNames: Readonly<Record<DbhUnit | LengthUnit, string>> = { cm: 'centimetres', in: 'inches', m: 'metres', ft: 'feet' };
const otherUnit: Readonly<Record<DbhUnit | LengthUnit, DbhUnit | LengthUnit>> = { cm: 'in', in: 'cm', m: 'ft', ft: 'm' };

/** The unit a quantity is typed in, and the one it is mistaken for. */
export function unitOf(quantity: Quantity, units: Units): DbhUnit | LengthUnit {
  return quantity === 'dbh' ? units.dbhUnit : units.lengthUnit;
}

function unexplained({ quantity, enteredCanonical, expectedLow, expectedHigh }: Told, said: string): string {
  if (enteredCanonical !== null && expectedHigh !== null && enteredCanonical > expectedHigh) {
    return quantity === 'height' ? `${said} is tall for this tree.` : `${said} is thick for this plot.`;
  }
  if (enteredCanonical !== null && expectedLow !== null && enteredCanonical < expectedLow) {
    return quantity === 'height' ? `${said} is short for this tree.` : `${said} is thin for this plot.`;
  }
  return `${said} does not look right.`;
}

/** One short sentence that can be called across the plot. It names no expected number. */
export function doubtSentence(look: Told, units: Units): string {
  const said = `${quantityWords[look.quantity]}${look.enteredDigits === null ? '' : ` ${look.enteredDigits}`}`;
  const other = (quantity: Quantity) => {
    const unit = unitOf(quantity, units);
    return `${unitNames[otherUnit[unit]]}, not ${unitNames[unit]}`;
  };
  // The cause may lie in the other field than the one that stands out.
  const at = (quantity: Quantity) => (quantity === look.quantity ? said : quantityWords[quantity]);
  switch (look.cause) {
    case 'dbh-other-unit':
      return `${at('dbh')} looks like ${other('dbh')}.`;
    case 'height-other-unit':
      return `${at('height')} looks like ${other('height')}.`;
    case 'girth-for-dbh':
      return `${at('dbh')} looks like the girth, not the diameter.`;
    case 'decimal-dbh':
      return `${at('dbh')} looks like a slipped decimal.`;
    case 'decimal-height':
      return `${at('height')} looks like a slipped decimal.`;
    case 'digits-swapped-dbh':
      return `${at('dbh')} looks like two digits swapped.`;
    case 'digits-swapped-height':
      return `${at('height')} looks like two digits swapped.`;
    case 'digit-replaced-dbh':
      return `${at('dbh')} looks like a slip on the pad.`;
    case 'digit-replaced-height':
      return `${at('height')} looks like a slip on the pad.`;
    case 'fields-swapped':
      return 'DBH and height look swapped.';
    case 'angle-unit':
      return `${at('height')} looks like degrees taken for percent.`;
    case 'other-tree':
      return `${said} looks like another tree's.`;
    case 'unexplained':
    case null:
      return unexplained(look, said);
  }
}
