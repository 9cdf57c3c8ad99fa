import type { ReactNode } from 'react';
import { Icon } from './icon';

/** A doubt in a line of text: icon and words, never colour alone. */
export function DoubtTag({ children, answered = false }: { readonly children: ReactNode; readonly answered?: boolean }) {
  return (
    <span className={`inline-flex items-center gap-1 rounded px-1.5 py-0.5 text-sm ${answered ? 'border border-paper-line bg-paper-sunk text-ink' : 'doubt-tag font-bold'}`}>
      <Icon name={answered ? 'check' : 'doubt'} className="size-4" />{children}
    </span>
  );
}
