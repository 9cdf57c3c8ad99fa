'use client';
import { useState } from 'react';
import { BandStrip, bandVerdict } from '@/components/charts/band-strip';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import type { Quantity, SecondLook } from '@/lib/schema/field';
import { quantityWords } from '../_entry/doubt-words';

export type DoubtPanelProps = {
  readonly look: SecondLook;
  readonly sentence: string;
  /** Limits and the value in one unit, for the strip; null where there is no band or none may be shown. */
  readonly band: { readonly low: number; readonly high: number; readonly value: number } | null;
  /** The expected numbers in words, when they may be seen now. */
  readonly expected: string | null;
  /** The suggested value with its unit, and what it would mean. */
  readonly suggestion: { readonly value: string; readonly quantity: Quantity } | null;
  /** Which value to read again first: where the likely cause lies. */
  readonly readFirst: Quantity;
  /** The other value, where it may be that one instead. */
  readonly readOther: Quantity | null;
  readonly readAgain: (quantity: Quantity) => void;
  readonly take: () => void;
  readonly keep: () => void;
  readonly later: () => void;
  readonly nextTree: () => void;
};

/** One doubt: words first, the strip without numbers, then "Read again" as the largest thing to touch. */
export function DoubtPanel(props: DoubtPanelProps) {
  const { look, sentence, band, expected, suggestion, readFirst, readOther } = props;
  const [shown, setShown] = useState(false);
  return (
    <section aria-label={`Second look at the ${look.quantity === 'dbh' ? 'DBH' : 'height'}`} className="relative overflow-hidden rounded-lg border-2 border-doubt bg-doubt-wash pl-5">
      <span className="doubt-edge absolute inset-y-0 left-0 w-3" aria-hidden="true" />
      <div className="space-y-1.5 p-2">
        <p role="alert" className="flex items-start gap-2 text-xl leading-tight font-bold text-doubt"><Icon name="doubt" className="mt-0.5 size-7" />{sentence}</p>
        {band && (
          <div className="rounded-md bg-paper-raised px-2 py-1">
            <BandStrip {...band} what={look.quantity === 'dbh' ? 'DBH' : 'height'} />
            <p className="text-center text-sm">{bandVerdict(band.low, band.high, band.value)}</p>
          </div>
        )}
        {expected !== null && shown && <p className="digits px-1">{expected}</p>}
        <Button size="large" kind="doubt" className="flex w-full items-center justify-center gap-2" onClick={() => props.readAgain(readFirst)}>
          <Icon name="again" className="size-7" />Read again <span className="text-lg font-normal">{quantityWords[readFirst]}</span>
        </Button>
        {suggestion && (
          <Button className="w-full" onClick={props.take}>
            Take <b className="digits">{suggestion.value}</b> as the {suggestion.quantity === 'dbh' ? 'DBH' : 'height'}
          </Button>
        )}
        <div className="grid grid-cols-[1.7fr_1fr_1fr] gap-1.5">
          <Button size="small" className="px-1" onClick={props.keep}>Keep, with a reason</Button>
          <Button size="small" className="px-1" onClick={props.later}>Later</Button>
          <Button size="small" className="px-1" onClick={props.nextTree}>Next tree</Button>
        </div>
        <div className="flex gap-1.5">
          {readOther && <Button size="small" kind="quiet" className="flex-1 px-1" onClick={() => props.readAgain(readOther)}>Read the {readOther === 'dbh' ? 'DBH' : 'height'} instead</Button>}
          {expected !== null && !shown && <Button size="small" kind="quiet" className="flex-1 px-1" onClick={() => setShown(true)}>Show what was expected</Button>}
        </div>
      </div>
    </section>
  );
}
