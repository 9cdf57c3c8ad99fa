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
    <div className={classNames('relative min-w-0 overflow-hidden rounded-lg border-2 bg-paper-raised px-3 pt-1.5 pb-1', active ? 'border-bronze' : 'border-paper-line', doubt && 'pl-5')}>
      {doubt && <span className="doubt-edge absolute inset-y-0 left-0 w-2.5" aria-hidden="true" />}
      <div className="flex items-baseline justify-between">
        <label htmlFor={id} className="text-sm font-bold">{label}<span className="sr-only">, {unit}</span></label>
        {first !== null && <span className="text-sm text-ink-soft">first <b className="digits">{first}</b></span>}
      </div>
      <div className="flex items-baseline gap-1">
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
          className={classNames('digits h-14 w-full min-w-0 bg-transparent p-0 text-4xl outline-none', typing ? 'text-bronze' : 'font-bold text-ink')}
        />
        <span className="text-lg text-ink-soft" aria-hidden="true">{unit}</span>
      </div>
      <p id={`${id}-read`} className={classNames('digits h-5 truncate text-xs leading-5', unreadable ? 'font-bold text-halt' : 'text-ink-soft')}>
        {unreadable ? 'not a number yet' : readAs ?? ''}
      </p>
    </div>
  );
}
