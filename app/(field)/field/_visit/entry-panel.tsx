'use client';
import type { SecondLook } from '@/lib/schema/field';
import { formatValue } from '@/lib/trees/format-value';
import { fromCanonicalCm, fromCanonicalM } from '@/lib/trees/units';
import { doubtSentence, unitOf } from '../_entry/doubt-words';
import type { KnownStem } from '../_entry/next-entry';
import { stemEntry } from '../_entry/stem-entry';
import { standingDigits } from '../_entry/transition';
import { OriginPanel, ReasonPanel } from './answer-panels';
import { DigitPad } from './digit-pad';
import { DoubtPanel } from './doubt-panel';
import type { EntryCardProps } from './entry-card';
import { FormPanel, TagPanel } from './stem-panels';

type Props = EntryCardProps & { readonly sign: ',' | '.'; readonly known: readonly KnownStem[]; readonly newTag: string };

/** Band for the strip: of the height from the checks as they stand, of the diameter from the doubt itself. */
function stripBand({ screen, records, entry, blind, visit }: EntryCardProps, look: SecondLook) {
  if (blind) return null;
  const { measurement } = entry.state;
  if (look.quantity === 'height' && screen && measurement.heightM !== null) {
    const group = measurement.speciesId === null ? null : records.speciesEntry.get(measurement.speciesId)?.curveGroup ?? null;
    const band = screen.band(stemEntry(measurement, visit.plotId, group), 0.99);
    if (band.kind === 'band') return { low: band.lowM, high: band.highM, value: measurement.heightM };
  }
  const { expectedLow: low, expectedHigh: high } = look;
  const value = look.quantity === 'dbh' ? measurement.dbhCm : measurement.heightM;
  return low !== null && high !== null && high > low && value !== null ? { low, high, value } : null;
}

function expectedWords({ project, blind, entry }: EntryCardProps, look: SecondLook): string | null {
  const { expectedLow: low, expectedHigh: high, quantity } = look;
  if (blind || low === null || high === null) return null;
  if (project.expectationShown === 'after-second-reading' && entry.state.readings.filter((reading) => reading.quantity === quantity).length < 2) return null;
  const shown = (canonical: number) => (quantity === 'dbh'
    ? formatValue(fromCanonicalCm(canonical, project.dbhUnit), project.dbhDecimals)
    : formatValue(fromCanonicalM(canonical, project.lengthUnit), project.heightDecimals));
  return `Expected ${shown(low)} to ${shown(high)} ${unitOf(quantity, project)}`;
}

/** The lower half of the card: the pad, or the one question there is. */
export function EntryPanel(props: Props) {
  const { entry, project, sign, known, newTag } = props;
  const { state, send } = entry;
  const { panel, measurement, typing, looks } = state;
  const toPad = () => send({ kind: 'show', panel: { kind: 'pad' } });
  const look = panel.kind === 'doubt' || panel.kind === 'reason' ? looks.find(({ id }) => id === panel.lookId) : undefined;

  if (panel.kind === 'doubt' && look) {
    const readFirst = look.suggestedQuantity ?? look.quantity;
    const other = readFirst === 'dbh' ? 'height' : 'dbh';
    const later = look.quantity === 'dbh' && measurement.heightDigits === null ? () => send({ kind: 'focus', quantity: 'height' }) : toPad;
    return (
      <DoubtPanel
        key={look.id} look={look} sentence={doubtSentence(look, project)} band={stripBand(props, look)} expected={expectedWords(props, look)}
        suggestion={look.suggestedDigits !== null && look.suggestedQuantity !== null
          ? { value: `${look.suggestedDigits} ${unitOf(look.suggestedQuantity, project)}`, quantity: look.suggestedQuantity } : null}
        readFirst={readFirst} readOther={standingDigits(measurement, other) === null ? null : other}
        readAgain={(quantity) => send({ kind: 'read-again', lookId: look.id, quantity })} take={() => send({ kind: 'take-suggestion', lookId: look.id })}
        keep={() => send({ kind: 'show', panel: { kind: 'reason', lookId: look.id } })} later={later} nextTree={entry.nextTree}
      />
    );
  }
  if (panel.kind === 'reason' && look) {
    return (
      <ReasonPanel
        accept={(reason, note) => send({ kind: 'accept', lookId: look.id, reason, note })}
        back={() => send({ kind: 'show', panel: { kind: 'doubt', lookId: look.id } })}
      />
    );
  }
  if (panel.kind === 'origin' && typing) {
    return <OriginPanel first={standingDigits(measurement, typing.quantity) ?? ''} second={typing.digits} choose={(origin) => send({ kind: 'origin', origin })} />;
  }
  if (panel.kind === 'form') {
    return <FormPanel status={measurement.status} form={measurement.form} change={(form) => send({ kind: 'form', ...form })} close={toPad} />;
  }
  if (panel.kind === 'tag') {
    return (
      <TagPanel
        known={known.map(({ stem, label }) => ({ stemId: stem.id, label }))} newTag={newTag}
        choose={entry.chooseKnown} chooseNew={entry.chooseNew} close={toPad}
      />
    );
  }
  const goesToHeight = state.focus === 'dbh' && measurement.heightDigits === null;
  return (
    <DigitPad
      sign={sign} nextLabel={goesToHeight ? 'Height' : 'Done'} press={(key) => send({ kind: 'key', key })} erase={() => send({ kind: 'erase' })}
      next={() => send({ kind: 'next' })} nextTree={entry.nextTree}
    />
  );
}
