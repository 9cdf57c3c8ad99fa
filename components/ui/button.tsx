import type { ButtonHTMLAttributes } from 'react';
import { classNames } from './class-names';

const kinds = {
  /** The one thing to do here. */
  main: 'bg-bronze text-bronze-on border-2 border-bronze-strong font-bold active:bg-bronze-strong',
  plain: 'bg-paper-raised text-ink border-2 border-ink-faint active:bg-paper-sunk',
  quiet: 'bg-transparent text-ink border-2 border-transparent underline decoration-2 underline-offset-4 decoration-bronze active:bg-paper-sunk',
  doubt: 'bg-doubt text-doubt-on border-2 border-doubt font-bold active:opacity-90',
  halt: 'bg-halt text-halt-on border-2 border-halt font-bold active:opacity-90',
} as const;

/** Height and type go together: two utilities for one property would leave the choice to the order of the stylesheet. */
const sizes = {
  small: 'min-h-target text-base',
  normal: 'min-h-target text-lg',
  large: 'min-h-glove text-2xl',
} as const;

type Props = ButtonHTMLAttributes<HTMLButtonElement> & { readonly kind?: keyof typeof kinds; readonly size?: keyof typeof sizes };

/** A button big enough for a wet thumb. */
export function Button({ kind = 'plain', size = 'normal', className, type = 'button', ...rest }: Props) {
  return (
    <button
      type={type}
      className={classNames('min-w-target cursor-pointer rounded-lg py-2 leading-tight disabled:cursor-default disabled:opacity-60', sizes[size], /(^| )px-/.test(className ?? '') ? '' : 'px-4', kinds[kind], className)}
      {...rest}
    />
  );
}
