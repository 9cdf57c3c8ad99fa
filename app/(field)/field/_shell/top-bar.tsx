'use client';
import type { ReactNode } from 'react';
import { Icon } from '@/components/ui/icon';
import { useField } from './field-context';
import type { FieldRoute } from './router';

type Props = {
  readonly back: FieldRoute | null;
  readonly backLabel?: string;
  /** Small line above the title. */
  readonly over?: string;
  readonly title: string;
  readonly children?: ReactNode;
};

/** The head of a page of the field book: one step back, where one is, and a few things to do. */
export function TopBar({ back, backLabel = 'Back', over, title, children }: Props) {
  const { go } = useField();
  return (
    <header className="book-head sticky top-0 z-10 flex min-h-[64px] items-center gap-1 bg-paper pr-2">
      {back ? (
        <button type="button" aria-label={backLabel} onClick={() => go(back)} className="grid min-h-target min-w-target cursor-pointer place-items-center text-ink">
          <Icon name="back" className="size-7" />
        </button>
      ) : <span className="w-4" />}
      <div className="min-w-0 flex-1 py-2">
        {over && <p className="truncate text-sm leading-tight text-ink-soft">{over}</p>}
        <h1 className="truncate text-2xl leading-tight font-bold">{title}</h1>
      </div>
      {children}
    </header>
  );
}
