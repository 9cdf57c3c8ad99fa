'use client';
import type { MouseEvent } from 'react';
import { Icon } from '@/components/ui/icon';

type Props = {
  readonly sign: ',' | '.';
  readonly nextLabel: string;
  readonly press: (key: string) => void;
  readonly erase: () => void;
  readonly next: () => void;
  readonly nextTree: () => void;
};

/** The field keeps the focus while the pad is touched, so that a touch does not count as leaving it. */
const keepFocus = (event: MouseEvent) => event.preventDefault();
const key = 'min-h-target cursor-pointer rounded-lg border-2 border-paper-line bg-paper-raised digits text-3xl font-bold active:bg-bronze-wash';
const side = 'cursor-pointer rounded-lg border-2 px-1 text-base leading-tight font-bold';

/** Our own digit pad: figures, a decimal sign that is typed and never implied, erase, and two ways on. */
export function DigitPad({ sign, nextLabel, press, erase, next, nextTree }: Props) {
  const digit = (text: string) => (
    <button key={text} type="button" className={key} onMouseDown={keepFocus} onClick={() => press(text)}>{text}</button>
  );
  return (
    <div role="group" aria-label="Digit pad" className="grid grid-cols-[1fr_1fr_1fr_1.25fr] grid-rows-4 gap-1.5">
      {['1', '2', '3'].map(digit)}
      <button type="button" className={`${side} row-span-2 border-bronze-strong bg-bronze text-bronze-on active:bg-bronze-strong`} onMouseDown={keepFocus} onClick={next} aria-label={`Next: ${nextLabel}`}>
        <Icon name="next" className="mx-auto mb-1 size-7" />{nextLabel}
      </button>
      {['4', '5', '6'].map(digit)}
      {['7', '8', '9'].map(digit)}
      <button type="button" className={`${side} row-span-2 border-ink-faint bg-paper text-ink active:bg-paper-sunk`} onMouseDown={keepFocus} onClick={nextTree}>
        Next tree
      </button>
      <button type="button" className={key} onMouseDown={keepFocus} onClick={() => press(sign)} aria-label={sign === ',' ? 'Decimal comma' : 'Decimal point'}>{sign}</button>
      {digit('0')}
      <button type="button" className={`${key} grid place-items-center`} onMouseDown={keepFocus} onClick={erase} aria-label="Erase the last digit"><Icon name="erase" className="size-8" /></button>
    </div>
  );
}
