'use client';
import { useEffect, useId, useRef } from 'react';
import { classNames } from '@/components/ui/class-names';

type Props = {
  readonly label: string;
  readonly unit: string;
  readonly active: boolean;
  /** What stands in the field now: digits being typed, or those of the value. */
  readonly digits: string;
  readonly typing: boolean;
  /** The first reading, kept beside while a second one is typed. */
  readonly first: string | null;
  /** What the digits will be read as, in words; null while there are none. */
  readonly readAs: string | null;
  readonly unreadable: boolean;
  readonly doubt: boolean;
  readonly type: (digits: string) => void;
  readonly focus: () => void;
  readonly leave: () => void;
  readonly next: () => void;
};

/** One measured value: a real text field without the phone's keyboard, so that the pad and a keyboard both type in it. */
export function ValueField(props: Props) {
  const { label, unit, active, digits, typing, first, readAs, unreadable, doubt } = props;
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    if (active) input.current?.focus({ preventScroll: true });
  }, [active]);
  return (
    <div className={classNames('value-field relative h-[94px] min-w-0 overflow-hidden rounded-lg border-2 bg-paper-raised', active ? 'border-bronze' : 'border-paper-line')}>
      {doubt && <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />}
      <div className={classNames('pointer-events-none absolute inset-x-0 top-1.5 flex items-baseline justify-between pr-3', doubt ? 'pl-5' : 'pl-3')}>
        <label htmlFor={id} className="text-sm font-bold">{label}<span className="sr-only">, {unit}</span></label>
        {first !== null && <span className="text-sm text-ink-soft">first <b className="digits">{first}</b></span>}
      </div>
      <input
        ref={input} id={id} inputMode="none" autoComplete="off" enterKeyHint="next" value={digits} aria-describedby={`${id}-read`} aria-invalid={unreadable || undefined}
        onChange={(event) => props.type(event.target.value)}
        onFocus={(event) => {
          if (!typing) event.target.select();
          if (!active) props.focus();
        }}
        onBlur={(event) => {
          // A touch on the entry's own buttons decides for itself whether the field is left.
          const to = event.relatedTarget;
          if (!(to instanceof HTMLElement && to.closest('[data-entry-card]'))) props.leave();
        }}
        onKeyDown={(event) => {
          if (event.key !== 'Enter') return;
          event.preventDefault();
          props.next();
        }}
        className={classNames('digits size-full bg-transparent pt-4 pr-9 pb-3 text-4xl', doubt ? 'pl-5' : 'pl-3', typing ? 'text-bronze' : 'font-bold text-ink')}
      />
      <span className="pointer-events-none absolute top-[38px] right-3 text-lg text-ink-soft" aria-hidden="true">{unit}</span>
      <p id={`${id}-read`} className={classNames('digits pointer-events-none absolute bottom-1 truncate text-xs leading-5', doubt ? 'left-5' : 'left-3', unreadable ? 'font-bold text-halt' : 'text-ink-soft')}>
        {unreadable ? 'not a number yet' : readAs ?? ''}
      </p>
    </div>
  );
}
